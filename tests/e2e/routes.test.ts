import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import type { z } from 'zod';
import { beforeAll, describe, expect, inject, it } from 'vitest';
import { demoId } from '@/lib/demo/cast';
import { orderAnswer, readingsAnswer, seenAnswer, workOrdersAnswer } from '@/lib/schemas/api';
import { ASKERS, type Asker, type PerAsker, seatEverybody } from '../support/askers';

const ORDER = demoId('order being cut');
const DRAFT = demoId('order a draft');
const KEY = 'a-key-for-this-test';
const DRAFT_BODY = {
  ...{ partnerShopId: '', partIds: [], operations: [], neededBackOn: '', transport: 'delivered' },
  ...{ acceptRule: 'own_check', notes: '', standingInstruction: '', reference: '' },
};

const everybody = (code: number): PerAsker<number> => ({
  ...{ ownOwner: code, ownBench: code, ownCounter: code },
  ...{ partnerOwner: code, partnerBench: code, partnerCounter: code },
  ...{ otherPartner: code, stranger: code },
});
/** The parties of the order get one answer, everybody else hears that there is no such thing. */
const parties = (code: number): PerAsker<number> => ({
  ...everybody(code),
  otherPartner: 404,
  stranger: 404,
});

interface Route {
  readonly file: string;
  readonly method: 'GET' | 'POST' | 'PUT';
  readonly at: string;
  readonly answers: PerAsker<number>;
  readonly body?: unknown;
  readonly headers?: Readonly<Record<string, string>>;
  /** What a sound answer to the owner must look like, exactly. */
  readonly shape?: z.ZodType;
  /** Answered to nobody too. */
  readonly isOpen?: true;
}

const READING = {
  ...{ id: ORDER, lineId: ORDER, feature: '1', position: 'x', unit: 'in', stage: 'cut', text: '2.1150' },
  takenAt: '2026-12-01T08:00:00Z',
};

/** Every route handler of our own; next-auth's are next-auth's. Anything not listed here fails. */
const ROUTES: readonly Route[] = [
  {
    ...{
      file: 'api/health/route.ts',
      method: 'GET',
      at: '/api/health',
      answers: everybody(200),
      isOpen: true,
    },
  },
  {
    ...{ file: 'api/v1/openapi.json/route.ts', method: 'GET', at: '/api/v1/openapi.json' },
    ...{ answers: everybody(200), isOpen: true },
  },
  { file: 'api/v1/feed/route.ts', method: 'GET', at: '/api/v1/feed', answers: everybody(200) },
  { file: 'api/v1/files/route.ts', method: 'POST', at: '/api/v1/files', answers: everybody(422) },
  {
    ...{ file: 'api/v1/files/[fileId]/route.ts', method: 'GET', at: `/api/v1/files/${ORDER}` },
    answers: everybody(404),
  },
  {
    ...{ file: 'api/v1/work-orders/route.ts', method: 'GET', at: '/api/v1/work-orders?show=all&sort=needed' },
    ...{ answers: everybody(200), shape: workOrdersAnswer },
  },
  {
    ...{ file: 'api/v1/orders/[orderId]/route.ts', method: 'GET', at: `/api/v1/orders/${ORDER}` },
    ...{ answers: parties(200), shape: orderAnswer },
  },
  {
    ...{ file: 'api/v1/orders/[orderId]/readings/route.ts', method: 'GET' },
    ...{ at: `/api/v1/orders/${ORDER}/readings`, answers: parties(200), shape: readingsAnswer },
  },
  {
    ...{ file: 'api/v1/orders/[orderId]/readings/route.ts', method: 'POST' },
    ...{ at: `/api/v1/orders/${ORDER}/readings`, headers: { 'idempotency-key': KEY } },
    body: { readings: [READING] },
    // A line that is not on the order; the counter takes no readings at all, whosever order it is.
    answers: { ...parties(422), ownCounter: 403, partnerCounter: 403 },
  },
  {
    ...{ file: 'api/v1/orders/[orderId]/seen/route.ts', method: 'PUT', at: `/api/v1/orders/${ORDER}/seen` },
    ...{ body: { seq: 1 }, answers: parties(200), shape: seenAnswer },
  },
  {
    ...{ file: 'api/v1/drafts/[orderId]/route.ts', method: 'PUT', at: `/api/v1/drafts/${DRAFT}` },
    ...{ headers: { 'if-match': '"999"' }, body: DRAFT_BODY },
    // A version nobody has seen: stale for the draft's own shop, no such draft for everybody else.
    answers: { ...everybody(404), ownOwner: 412, ownBench: 412, ownCounter: 412 },
  },
  {
    ...{ file: 'api/v1/worksheets/[worksheetId]/route.ts', method: 'PUT', at: `/api/v1/worksheets/${ORDER}` },
    ...{ headers: { 'if-match': '"1"' }, body: { raw: {} } },
    answers: { ...everybody(404), ownCounter: 403, partnerCounter: 403 },
  },
];

function handlersIn(folder: string, below = ''): string[] {
  return readdirSync(path.join(folder, below), { withFileTypes: true }).flatMap((entry) => {
    const name = path.posix.join(below, entry.name);
    if (entry.isDirectory()) return handlersIn(folder, name);
    if (entry.name !== 'route.ts' || name.includes('[...nextauth]')) return [];
    const text = readFileSync(path.join(folder, name), 'utf8');
    return ['GET', 'POST', 'PUT', 'PATCH', 'DELETE']
      .filter((method) => new RegExp(`export (const|async function|function) ${method}\\b`).test(text))
      .map((method) => `${method} ${name}`);
  });
}

let cookies: ReadonlyMap<Asker, string>;
beforeAll(async () => {
  cookies = await seatEverybody(inject('web'));
});

interface Asking {
  readonly by: Asker | null;
  readonly headers?: Readonly<Record<string, string>>;
  readonly body?: string;
}

async function answerTo(route: Route, { by, headers = {}, body }: Asking): Promise<Response> {
  const sent = body ?? (route.body === undefined ? undefined : JSON.stringify(route.body));
  return fetch(`${inject('web')}${route.at}`, {
    method: route.method,
    redirect: 'manual',
    headers: {
      ...(by === null ? {} : { cookie: cookies.get(by) ?? '' }),
      ...(sent === undefined ? {} : { 'content-type': 'application/json' }),
      ...route.headers,
      ...headers,
    },
    ...(sent === undefined ? {} : { body: sent }),
  });
}

async function ask(route: Route, asking: Asking): Promise<number> {
  const answer = await answerTo(route, asking);
  await answer.body?.cancel();
  return answer.status;
}

const OWN = { 'sec-fetch-site': 'same-origin' };
const changing = ROUTES.filter(({ method }) => method !== 'GET');

describe('routes', () => {
  it('are all listed', () => {
    expect(ROUTES.map(({ method, file }) => `${method} ${file}`).toSorted()).toEqual(
      handlersIn(path.join(process.cwd(), 'app')).toSorted(),
    );
  });

  it.each(changing)(
    '$method $at refuses what another site sends, or what does not say where it comes from',
    async (route) => {
      const foreign = [
        { 'sec-fetch-site': 'cross-site' },
        { 'sec-fetch-site': 'same-site' },
        { 'sec-fetch-site': 'none' },
        { origin: 'https://elsewhere.example' },
        { origin: 'null' },
        {},
      ];
      for (const headers of foreign) expect(await ask(route, { by: 'ownOwner', headers })).toBe(403);
    },
  );

  it.each(ROUTES.filter(({ isOpen }) => isOpen !== true))(
    '$method $at answers nobody with 401',
    async (route) => {
      expect(await ask(route, { by: null, headers: OWN })).toBe(401);
    },
  );

  it.each(ROUTES)('$method $at answers each role of each shop as it should', async (route) => {
    const found: Partial<Record<Asker, number>> = {};
    for (const by of Object.keys(ASKERS) as Asker[]) found[by] = await ask(route, { by, headers: OWN });
    expect(found).toEqual(route.answers);
  });

  it.each(ROUTES.filter(({ shape }) => shape !== undefined))(
    '$method $at answers exactly what its description says',
    async (route) => {
      for (const by of ['ownOwner', 'partnerBench'] as const) {
        const answer = await answerTo(route, { by, headers: OWN });
        const checked = route.shape?.safeParse(await answer.json());
        expect(checked?.error?.issues ?? []).toEqual([]);
      }
    },
  );

  it('are the operations of the OpenAPI document, no more and no fewer', async () => {
    const answer = await fetch(`${inject('web')}/api/v1/openapi.json`);
    const { paths } = (await answer.json()) as { paths: Record<string, Record<string, unknown>> };
    const described = Object.entries(paths).flatMap(([at, methods]) =>
      Object.keys(methods).map((method) => `${method.toUpperCase()} ${at}`),
    );
    const there = ROUTES.map(
      ({ method, file }) => `${method} /${file.replace('/route.ts', '').replaceAll(/\[(\w+)\]/g, '{$1}')}`,
    );
    expect(described.toSorted()).toEqual([...new Set(there)].toSorted());
  });

  it('ask for the key of a POST and the version of a PUT, and take JSON only', async () => {
    const post = ROUTES.find(({ method, at }) => method === 'POST' && at.endsWith('/readings'));
    const put = ROUTES.find(({ at }) => at.startsWith('/api/v1/worksheets'));
    if (!post || !put) throw new Error('The list has changed');
    expect(await ask(post, { by: 'ownOwner', headers: { ...OWN, 'idempotency-key': '' } })).toBe(422);
    expect(await ask(put, { by: 'ownOwner', headers: { ...OWN, 'if-match': '' } })).toBe(428);
    expect(await ask(put, { by: 'ownOwner', headers: OWN, body: '{' })).toBe(422);
    expect(await ask(put, { by: 'ownOwner', headers: OWN, body: '{"raw":{"least":"a\\u0000"}}' })).toBe(422);
    expect(await ask(put, { by: 'ownOwner', headers: { ...OWN, 'content-type': 'text/plain' } })).toBe(422);
    expect(await ask(put, { by: 'ownOwner', headers: OWN, body: '{"raw":{},"shop_id":"x"}' })).toBe(422);
  });

  it('carry the headers that keep a page to itself', async () => {
    for (const at of ['/sign-in', '/api/health', '/nothing-here']) {
      const { headers } = await fetch(`${inject('web')}${at}`);
      expect(headers.get('x-content-type-options')).toBe('nosniff');
      expect(headers.get('x-frame-options')).toBe('DENY');
      expect(headers.get('x-powered-by')).toBeNull();
    }
    const policies = await Promise.all(
      [1, 2].map(
        async () => (await fetch(`${inject('web')}/sign-in`)).headers.get('content-security-policy') ?? '',
      ),
    );
    expect(policies[0]).not.toBe(policies[1]);
    expect(policies.join()).not.toContain('unsafe-');
  });
});
