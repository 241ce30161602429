import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import type { Browser, BrowserContext } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { demoId } from '@/lib/demo/cast';
import { DEMO_PASSWORD } from '@/lib/demo/sign-ins';
import { launchBrowser, signIn, takeSeat } from '../support/browser';

const ORDER = demoId('order being cut');
const KEY = 'a-key-for-this-test';

interface Route {
  readonly file: string;
  readonly method: 'GET' | 'POST' | 'PUT';
  readonly at: string;
  /** What answers a stranger who asks soundly. */
  readonly stranger: number;
  readonly body?: unknown;
  readonly headers?: Readonly<Record<string, string>>;
}

/** Every route handler of our own; next-auth's are next-auth's. Anything not listed here fails. */
const ROUTES: readonly Route[] = [
  { file: 'api/health/route.ts', method: 'GET', at: '/api/health', stranger: 200 },
  { file: 'api/v1/feed/route.ts', method: 'GET', at: '/api/v1/feed', stranger: 200 },
  { file: 'api/v1/files/route.ts', method: 'POST', at: '/api/v1/files', stranger: 422 },
  { file: 'api/v1/files/[fileId]/route.ts', method: 'GET', at: `/api/v1/files/${ORDER}`, stranger: 404 },
  {
    file: 'api/v1/orders/[orderId]/readings/route.ts',
    method: 'GET',
    at: `/api/v1/orders/${ORDER}/readings`,
    stranger: 404,
  },
  {
    file: 'api/v1/orders/[orderId]/readings/route.ts',
    ...{
      method: 'POST',
      at: `/api/v1/orders/${ORDER}/readings`,
      stranger: 404,
      headers: { 'idempotency-key': KEY },
    },
    body: {
      readings: [
        {
          id: ORDER,
          lineId: ORDER,
          feature: '1',
          position: 'x',
          unit: 'in',
          stage: 'cut',
          text: '2.1150',
          takenAt: '2026-12-01T08:00:00Z',
        },
      ],
    },
  },
  {
    file: 'api/v1/orders/[orderId]/seen/route.ts',
    ...{ method: 'PUT', at: `/api/v1/orders/${ORDER}/seen`, stranger: 404, body: { seq: 1 } },
  },
  {
    file: 'api/v1/worksheets/[worksheetId]/route.ts',
    ...{
      method: 'PUT',
      at: `/api/v1/worksheets/${ORDER}`,
      stranger: 404,
      headers: { 'if-match': '"1"' },
      body: { raw: {} },
    },
  },
];

function handlersIn(folder: string, below = ''): string[] {
  return readdirSync(path.join(folder, below), { withFileTypes: true }).flatMap((entry) => {
    const name = path.posix.join(below, entry.name);
    if (entry.isDirectory()) return handlersIn(folder, name);
    if (entry.name !== 'route.ts' || name.includes('[...nextauth]')) return [];
    const text = readFileSync(path.join(folder, name), 'utf8');
    return ['GET', 'POST', 'PUT', 'PATCH', 'DELETE']
      .filter((method) => new RegExp(`export (const|async function) ${method}\\b`).test(text))
      .map((method) => `${method} ${name}`);
  });
}

let browser: Browser;
let stranger: BrowserContext;
let cookie = '';
beforeAll(async () => {
  browser = await launchBrowser();
  const seat = await takeSeat(browser, { origin: inject('web') });
  await signIn(seat.page, 'owner@rods.example', DEMO_PASSWORD);
  stranger = seat.context;
  cookie = (await stranger.cookies()).map(({ name, value }) => `${name}=${value}`).join('; ');
});
afterAll(() => browser.close());

interface Asking {
  readonly signedIn: boolean;
  readonly headers?: Readonly<Record<string, string>>;
  readonly body?: string;
}

async function ask(route: Route, { signedIn, headers = {}, body }: Asking): Promise<number> {
  const stop = new AbortController();
  const sent = body ?? (route.body === undefined ? undefined : JSON.stringify(route.body));
  const answer = await fetch(`${inject('web')}${route.at}`, {
    method: route.method,
    redirect: 'manual',
    signal: stop.signal,
    headers: {
      ...(signedIn ? { cookie } : {}),
      ...(sent === undefined ? {} : { 'content-type': 'application/json' }),
      ...route.headers,
      ...headers,
    },
    ...(sent === undefined ? {} : { body: sent }),
  });
  stop.abort();
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
      for (const headers of foreign) expect(await ask(route, { signedIn: true, headers })).toBe(403);
    },
  );

  it.each(ROUTES.filter(({ at }) => at !== '/api/health'))(
    '$method $at answers nobody with 401',
    async (route) => {
      expect(await ask(route, { signedIn: false, headers: OWN })).toBe(401);
    },
  );

  it.each(ROUTES)('$method $at shows a stranger nothing of the order', async (route) => {
    expect(await ask(route, { signedIn: true, headers: OWN })).toBe(route.stranger);
  });

  it('ask for the key of a POST and the version of a PUT, and take JSON only', async () => {
    const [post, put] = [ROUTES[5], ROUTES[6]];
    if (!post || !put) throw new Error('The list has changed');
    expect(await ask(post, { signedIn: true, headers: { ...OWN, 'idempotency-key': '' } })).toBe(422);
    expect(await ask(put, { signedIn: true, headers: { ...OWN, 'if-match': '' } })).toBe(428);
    expect(await ask(put, { signedIn: true, headers: OWN, body: '{' })).toBe(422);
    expect(await ask(put, { signedIn: true, headers: { ...OWN, 'content-type': 'text/plain' } })).toBe(422);
    expect(await ask(put, { signedIn: true, headers: OWN, body: '{"raw":{},"shop_id":"x"}' })).toBe(422);
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
