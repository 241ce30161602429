import 'server-only';
import { unstable_rethrow } from 'next/navigation';
import type { z } from 'zod';
import { type BrowserTicket, requireTicket } from '@/lib/auth/ticket';
import { AppError, UNWRITABLE } from '@/lib/errors';
import { toProblemResponse } from '@/lib/http/problem';
import { requireSameOrigin } from '@/lib/http/same-origin';

interface RouteSpec<P, B> {
  readonly params: z.ZodType<P>;
  readonly body?: z.ZodType<B>;
  /** Changes carry the version they were made from in If-Match. */
  readonly ifMatch?: true;
  readonly handle: (asked: {
    readonly ticket: BrowserTicket;
    readonly params: P;
    readonly body: B;
    readonly requestKey: string;
    readonly version: number;
    readonly request: Request;
  }) => Promise<Response>;
}

/** Builds a route handler: same site, who is asking, is the input sound, do it, answer failures. */
export function route<P, B = undefined>(spec: RouteSpec<P, B>) {
  return async (request: Request, context: { params: Promise<unknown> }): Promise<Response> => {
    try {
      requireSameOrigin(request);
      const ticket = await requireTicket();
      const params = parse(spec.params, await context.params, 'not_found');
      const body = spec.body ? parse(spec.body, await readJson(request), 'invalid') : (undefined as B);
      const requestKey = request.method === 'POST' ? requireKey(request) : '';
      const version = spec.ifMatch ? requireVersion(request) : 0;
      return await spec.handle({ ticket, params, body, requestKey, version, request });
    } catch (error) {
      unstable_rethrow(error);
      return toProblemResponse(error);
    }
  };
}

/** Answers JSON that nobody may keep. */
export function answerJson(
  body: unknown,
  more: { readonly status?: number; readonly version?: number } = {},
): Response {
  const headers = new Headers({
    'content-type': 'application/json; charset=utf-8',
    'cache-control': 'no-store',
  });
  if (more.version !== undefined) headers.set('etag', `"${more.version}"`);
  return new Response(JSON.stringify(body), { status: more.status ?? 200, headers });
}

function parse<T>(schema: z.ZodType<T>, value: unknown, code: 'invalid' | 'not_found'): T {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  if (code === 'not_found') throw new AppError('not_found', 'There is no such thing.');
  const fields: Record<string, string[]> = {};
  for (const issue of parsed.error.issues) (fields[issue.path.join('/')] ??= []).push(issue.message);
  throw new AppError('invalid', 'Check the marked fields.', { fields });
}

async function readJson(request: Request): Promise<unknown> {
  if (!/^application\/json\b/i.test(request.headers.get('content-type') ?? ''))
    throw new AppError('invalid', 'Send JSON.');
  const text = await request.text();
  if (text.length > 1_000_000) throw new AppError('invalid', 'This is too much at once.');
  if (text.includes('\\u0000')) throw new AppError('invalid', UNWRITABLE);
  try {
    return JSON.parse(text) as unknown;
  } catch {
    throw new AppError('invalid', 'This is not JSON.');
  }
}

function requireKey(request: Request): string {
  const key = request.headers.get('idempotency-key') ?? '';
  if (!/^[\w-]{8,128}$/.test(key))
    throw new AppError('invalid', 'Send an Idempotency-Key of 8 to 128 letters, figures, - or _.');
  return key;
}

function requireVersion(request: Request): number {
  const match = /^"(\d{1,9})"$/.exec(request.headers.get('if-match') ?? '');
  if (match?.[1] === undefined) throw new AppError('version_required', 'Send the version in If-Match.');
  return Number(match[1]);
}
