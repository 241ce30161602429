import 'server-only';
import { z } from 'zod';
import {
  draftAnswer,
  fileAnswer,
  keptAnswer,
  orderAnswer,
  problemAnswer,
  readingsAnswer,
  seenAnswer,
  versionAnswer,
  workOrdersAnswer,
} from '@/lib/schemas/api';
import { draftSchema } from '@/lib/schemas/order-draft';
import { seenSchema } from '@/lib/schemas/order-forms';
import { readingsSchema } from '@/lib/schemas/readings';
import { WORK_ORDER_QUERY } from '@/lib/schemas/work-orders';
import { worksheetSchema } from '@/lib/schemas/worksheet';

/** One operation of the interface for programs. */
export interface ApiOperation {
  readonly method: 'get' | 'post' | 'put';
  readonly path: string;
  readonly summary: string;
  readonly query?: Readonly<Record<string, z.ZodType>>;
  readonly body?: z.ZodType;
  readonly answer: z.ZodType | 'redirect' | 'stream' | 'document';
  readonly status?: number;
  readonly ifMatch?: true;
}

/** Every operation under /api; a test holds this list against the routes there are. */
export const API_OPERATIONS: readonly ApiOperation[] = [
  {
    ...{ method: 'get', path: '/api/health', summary: 'Whether the program and its records answer' },
    answer: z.strictObject({ status: z.enum(['up', 'down']), database: z.literal('away').optional() }),
  },
  {
    ...{ method: 'get', path: '/api/v1/openapi.json', summary: 'This document', answer: 'document' },
  },
  {
    ...{ method: 'get', path: '/api/v1/work-orders', summary: 'Work orders, a page at a time' },
    query: WORK_ORDER_QUERY,
    answer: workOrdersAnswer,
  },
  {
    ...{ method: 'get', path: '/api/v1/orders/{orderId}', summary: 'One order with its sizes' },
    answer: orderAnswer,
  },
  {
    ...{ method: 'put', path: '/api/v1/orders/{orderId}/seen', summary: 'Messages read up to an entry' },
    ...{ body: seenSchema, answer: seenAnswer },
  },
  {
    ...{ method: 'get', path: '/api/v1/orders/{orderId}/readings', summary: 'Readings that stand' },
    answer: readingsAnswer,
  },
  {
    ...{
      method: 'post',
      path: '/api/v1/orders/{orderId}/readings',
      summary: 'Post readings, each once by its id',
    },
    ...{ body: readingsSchema, answer: keptAnswer, status: 201 },
  },
  {
    ...{ method: 'put', path: '/api/v1/drafts/{orderId}', summary: 'Keep a draft; version 0 makes it' },
    ...{ body: draftSchema, answer: draftAnswer, ifMatch: true },
  },
  {
    ...{ method: 'put', path: '/api/v1/worksheets/{worksheetId}', summary: 'Keep what was typed on a sheet' },
    ...{ body: worksheetSchema, answer: versionAnswer, ifMatch: true },
  },
  {
    ...{ method: 'post', path: '/api/v1/files', summary: 'Keep a picture or PDF of an order (multipart)' },
    ...{ answer: fileAnswer, status: 201 },
  },
  {
    ...{ method: 'get', path: '/api/v1/files/{fileId}', summary: 'Open a file by a link of one minute' },
    answer: 'redirect',
  },
  {
    ...{ method: 'get', path: '/api/v1/feed', summary: 'What happens, as server-sent events' },
    answer: 'stream',
  },
];

/** The OpenAPI 3.1 document, made from the schemas that check the requests. */
export function openApiDocument(origin: string): Record<string, unknown> {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const operation of API_OPERATIONS) {
    (paths[operation.path] ??= {})[operation.method] = describe(operation);
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Wiretag',
      version: '1',
      description:
        'Work orders between an engine rebuilder and its machine shops. Lengths are whole nanometres, money is in minor units. Problems are RFC 9457.',
    },
    servers: [{ url: origin }],
    security: [{ signIn: [] }],
    paths,
    components: {
      securitySchemes: {
        signIn: { type: 'apiKey', in: 'cookie', name: 'the session cookie of a signed-in person' },
      },
      schemas: { Problem: jsonSchema(problemAnswer) },
    },
  };
}

function describe(operation: ApiOperation): Record<string, unknown> {
  const { summary, body, status = 200 } = operation;
  const problem = {
    description: 'A problem',
    content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
  };
  return {
    summary,
    parameters: parametersOf(operation),
    ...(body
      ? { requestBody: { required: true, content: { 'application/json': { schema: jsonSchema(body) } } } }
      : {}),
    responses: { ...answersOf(operation.answer, status), default: problem },
  };
}

function parametersOf({ path, query = {}, method, ifMatch, body }: ApiOperation): unknown[] {
  const inPath = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => ({
    ...{ name, in: 'path', required: true, schema: { type: 'string', format: 'uuid' } },
  }));
  const inQuery = Object.entries(query).map(([name, schema]) => ({
    name,
    in: 'query',
    schema: jsonSchema(schema),
  }));
  const header = (name: string, description: string) => ({
    ...{ name, in: 'header', required: true, description, schema: { type: 'string' } },
  });
  return [
    ...inPath,
    ...inQuery,
    ...(method === 'post' && body ? [header('Idempotency-Key', '8 to 128 letters, figures, - or _')] : []),
    ...(ifMatch ? [header('If-Match', 'The version seen, in quotes')] : []),
  ];
}

function answersOf(answer: ApiOperation['answer'], status: number): Record<string, unknown> {
  if (answer === 'redirect') return { 302: { description: 'The file is there for one minute' } };
  if (answer === 'stream') return { 200: { description: 'Events', content: { 'text/event-stream': {} } } };
  if (answer === 'document')
    return { 200: { description: 'OpenAPI 3.1', content: { 'application/json': {} } } };
  return {
    [status]: { description: 'Done', content: { 'application/json': { schema: jsonSchema(answer) } } },
  };
}

function jsonSchema(schema: z.ZodType): unknown {
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' });
  return rest;
}
