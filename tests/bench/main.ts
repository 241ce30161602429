import { randomUUID } from 'node:crypto';
import { rmSync } from 'node:fs';
import { loadavg } from 'node:os';
import path from 'node:path';
import pg from 'pg';
import type { Cookie } from 'playwright-core';
import { nextProgram } from '@/lib/cli/start/build';
import { runProgram, TYPESCRIPT } from '@/lib/cli/start/children';
import { holdPort } from '@/lib/cli/start/ports';
import { reachableDataDir, removeCluster } from '@/lib/cli/start/postgres';
import { type Product, startProduct } from '@/lib/cli/start/product';
import { homeFolder } from '@/lib/cli/start/settings';
import { demoId } from '@/lib/demo/cast';
import { DEMO_PASSWORD } from '@/lib/demo/sign-ins';
import { launchBrowser, signIn } from '../support/browser';
import { type Ask, measure, ratioOf } from './load';
import { weigh } from './page-weight';

const ROUNDS = 5;
const root = process.cwd();
const words = process.argv.slice(2);
const orders = words.includes('--orders') ? Number(words[words.indexOf('--orders') + 1]) : 100_000;
const say = (line: string) => console.log(line);

interface Line {
  readonly id: string;
  readonly what: string;
  readonly is: string;
  readonly goal: string;
  /** Null where the number is said and not asked for yet. */
  readonly met: boolean | null;
}
const lines: Line[] = [];
const note = (line: Line) => {
  lines.push(line);
  const verdict = line.met === null ? 'said' : line.met ? 'met' : 'NOT MET';
  say(
    `${line.id.padEnd(4)} ${line.what.padEnd(58)} ${line.is.padStart(22)}   goal ${line.goal.padEnd(12)} ${verdict}`,
  );
};

const home = path.join(homeFolder(root), 'bench');
const bareFolder = path.join(root, 'tests', 'bench', 'bare');

/** Starts the product with a large shop, and the bare twin beside it on the same rows. */
async function prepare(): Promise<{ product: Product; bare: string; barePid: number }> {
  const product = await startProduct({
    ...{ root, secretsHome: homeFolder(root), home, mode: 'production', demo: true, throwaway: true },
    firstPorts: { web: 3600, files: 9600, smtp: 2800, mailbox: 8600 },
    say,
  });
  const superuserUrl = product.cluster.superuserUrl('wiretag');
  const held = await holdPort(3700);
  const env = {
    ...{ NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' },
    ...{ BARE_DATABASE_URL: superuserUrl, BARE_SHOP: demoId('works') },
  };
  say('Building the bare twin');
  await runProgram({ name: 'bare build', args: [nextProgram(root), 'build'], env, cwd: bareFolder });
  await held.release();
  const bare = {
    name: 'bare',
    args: [nextProgram(root), 'start', '-H', '127.0.0.1', '-p', String(held.port)],
  };
  await product.children.start({ ...bare, env, cwd: bareFolder }, /Ready in|✓ Ready/);
  await onDatabase(superuserUrl, (client) =>
    client.query(
      'create table bare_writes (id bigint generated always as identity primary key, text text not null)',
    ),
  );
  return { product, bare: `http://127.0.0.1:${held.port}`, barePid: product.children.pidOf('bare') ?? 0 };
}

async function onDatabase<T>(url: string, work: (client: pg.Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

async function fill(product: Product, count: number): Promise<void> {
  const args = [...TYPESCRIPT, 'lib/cli/demo-load.ts', '--orders', String(count)];
  say((await runProgram({ name: 'demo:load', args, env: product.env, cwd: root })).trim());
}

async function inProcess(product: Product, what: 'plans' | 'depth'): Promise<Record<string, unknown>> {
  const args = [...TYPESCRIPT, 'tests/bench/queries.ts', what];
  const said = await runProgram({ name: what, args, env: product.env, cwd: root });
  return JSON.parse(said.trim().split('\n').at(-1) ?? '{}') as Record<string, unknown>;
}

async function measureServer(
  { product, bare, barePid }: Awaited<ReturnType<typeof prepare>>,
  cookie: string,
): Promise<void> {
  const pid = product.children.pidOf('application') ?? 0;
  const order = demoId('order being cut');
  const get =
    (url: string): Ask =>
    () => ({ url, headers: { cookie } });
  const cpu =
    (server: number, ask: Ask, requests = 120) =>
    async () =>
      (await measure(server, ask, requests, 10)).cpu;
  const pages: readonly (readonly [string, string])[] = [
    ['Bench', '/bench'],
    ['Work orders', '/orders?show=all'],
    ['the order page', `/orders/${order}/sizes`],
  ];
  for (const [name, address] of pages) {
    await measure(pid, get(product.web + address), 40, 10);
    await measure(barePid, get(`${bare}/list`), 40, 10);
    const found = await ratioOf(
      ROUNDS,
      cpu(pid, get(product.web + address)),
      cpu(barePid, get(`${bare}/list`)),
    );
    note({
      id: 'P1',
      what: `${name}: server CPU a request ÷ bare page of 50 rows`,
      ...said(found),
      goal: '≤ 2.0',
      met: null,
    });
  }
  const api = cpu(pid, get(`${product.web}/api/v1/orders/${order}/readings`), 300);
  const bareApi = cpu(barePid, get(`${bare}/api/one?id=${order}`), 300);
  note({
    id: 'P2',
    what: 'readings of an order: CPU ÷ bare lookup',
    ...said(await ratioOf(ROUNDS, api, bareApi)),
    goal: '≤ 2.0',
    met: null,
  });
  await measureWrites({ product, bare, barePid }, cookie);
}

async function measureWrites(
  { product, bare, barePid }: Awaited<ReturnType<typeof prepare>>,
  cookie: string,
): Promise<void> {
  const pid = product.children.pidOf('application') ?? 0;
  const targets = await onDatabase(product.cluster.superuserUrl('wiretag'), async (client) => {
    const { rows } = await client.query<{ order_id: string; line_id: string }>(
      `select l.order_id, l.id as line_id from order_lines l join orders o on o.id = l.order_id where o.status = 'closed' limit 500`,
    );
    return rows;
  });
  let turn = 0;
  const ours: Ask = () => {
    const target = targets[(turn += 1) % targets.length];
    const reading = {
      ...{
        id: randomUUID(),
        lineId: target?.line_id,
        feature: '1',
        position: 'x',
        unit: 'in',
        stage: 'finished',
      },
      ...{ text: '2.1150', takenAt: new Date().toISOString() },
    };
    return {
      ...{ url: `${product.web}/api/v1/orders/${target?.order_id ?? ''}/readings`, method: 'POST' },
      headers: {
        ...{ cookie, origin: product.web, 'content-type': 'application/json' },
        'idempotency-key': randomUUID(),
      },
      body: JSON.stringify({ readings: [reading] }),
    };
  };
  const theirs: Ask = () => ({
    ...{ url: `${bare}/api/write`, method: 'POST', headers: { 'content-type': 'application/json' } },
    body: JSON.stringify({ text: '2.1150' }),
  });
  const p50 = (server: number, ask: Ask) => async () => (await measure(server, ask, 150, 1)).p50;
  await measure(pid, ours, 30, 1);
  await measure(barePid, theirs, 30, 1);
  const found = await ratioOf(ROUNDS, p50(pid, ours), p50(barePid, theirs));
  note({
    id: 'P3',
    what: 'posting a reading: p50 at one at a time ÷ bare insert',
    ...said(found),
    goal: '≤ 3.0',
    met: null,
  });
}

function said({ ratio, ours, bare, spread }: Awaited<ReturnType<typeof ratioOf>>): { is: string } {
  return {
    is: `${ratio.toFixed(2)} (${ours.toFixed(2)}/${bare.toFixed(2)} ms, ±${Math.round(spread * 50)} %)`,
  };
}

async function weighPages(
  { product, bare }: Awaited<ReturnType<typeof prepare>>,
  cookies: readonly Cookie[],
): Promise<void> {
  const browser = await launchBrowser();
  const seat = cookies.map(({ name, value }) => ({ name, value, url: product.web }));
  const order = demoId('order being cut');
  const pages: readonly (readonly [string, string, boolean])[] = [
    ['/sign-in', '/sign-in', true],
    ['/bench', '/bench', true],
    ['/orders', '/orders', true],
    ['/orders/new', '/orders/new', false],
    ['an order’s sizes', `/orders/${order}/sizes`, false],
    ['an order’s readings', `/orders/${order}/readings`, false],
    ['a worksheet', await worksheetAddress(product), false],
  ];
  try {
    const reference = await weigh(browser, bare, '/');
    for (const [name, address, isEntry] of pages) {
      const { scripts, all } = await weigh(browser, product.web, address, name === '/sign-in' ? [] : seat);
      const ratio = scripts / reference.scripts;
      const most = isEntry ? 1.35 : 1.5;
      const is = `${ratio.toFixed(2)} (${kb(scripts)}/${kb(reference.scripts)} KB)`;
      note({ id: 'P9', what: `${name}: JavaScript ÷ bare page`, is, goal: `≤ ${most}`, met: ratio <= most });
      note({
        id: 'P9',
        what: `${name}: whole first view`,
        is: `${kb(all)} KB`,
        goal: '≤ 300 KB',
        met: all <= 300 * 1024,
      });
    }
  } finally {
    await browser.close();
  }
}

async function worksheetAddress(product: Product): Promise<string> {
  const rows = await onDatabase(product.cluster.superuserUrl('wiretag'), (client) =>
    client.query<{ id: string; order_id: string }>(
      `select w.id, w.order_id from worksheets w where w.order_id = $1 order by w.id limit 1`,
      [demoId('order waits for sizes')],
    ),
  );
  const sheet = rows.rows[0];
  return `/orders/${sheet?.order_id ?? ''}/sheets/${sheet?.id ?? ''}`;
}

const kb = (bytes: number) => String(Math.round(bytes / 1024));

async function sitDown(product: Product): Promise<readonly Cookie[]> {
  const browser = await launchBrowser();
  const context = await browser.newContext({ baseURL: product.web });
  await signIn(await context.newPage(), 'owner@works.example', DEMO_PASSWORD);
  const cookies = await context.cookies();
  await browser.close();
  return cookies;
}

async function measureQueries(product: Product): Promise<void> {
  const small = (await inProcess(product, 'depth')) as unknown as Depth;
  await fill(product, orders);
  const large = (await inProcess(product, 'depth')) as unknown as Depth;
  const { statements, scans, reports } = (await inProcess(product, 'plans')) as unknown as Plans;
  const most = Math.max(...statements.map(({ count }) => count));
  note({
    id: 'P4',
    what: `statements of a page, the most of ${statements.length}`,
    is: String(most),
    goal: '≤ 6',
    met: most <= 6,
  });
  const grown = statements.filter(({ count, few }) => count !== few);
  note({
    id: 'P4',
    what: 'pages with other statements for a large shop than a small',
    is: String(grown.length),
    goal: '0',
    met: grown.length === 0,
  });
  note({
    id: 'P4',
    what: `tables over 1 000 rows read end to end, ${orders} orders`,
    is: String(scans.length),
    goal: '0',
    met: scans.length === 0,
  });
  for (const { page, table } of scans) say(`       ${page} reads all of ${table}`);
  for (const { page, table } of reports) say(`       (the report ${page} reads all of ${table})`);
  const depth = large.deep / large.first;
  note({
    id: 'P5',
    what: 'deepest page of work orders ÷ first page',
    is: depth.toFixed(2),
    goal: '≤ 1.2',
    met: depth <= 1.2,
  });
  const growth = large.first / small.first;
  note({
    id: 'P5',
    what: `first page: ${large.orders} orders ÷ ${small.orders}`,
    is: growth.toFixed(2),
    goal: '≤ 1.5',
    met: growth <= 1.5,
  });
  note({
    id: 'P6',
    what: 'tenant transaction under policies ÷ plain query',
    is: large.isolation.toFixed(2),
    goal: '≤ 1.5',
    met: null,
  });
}

interface Depth {
  readonly orders: number;
  readonly first: number;
  readonly deep: number;
  readonly isolation: number;
}
interface Plans {
  readonly statements: readonly { page: string; count: number; few: number }[];
  readonly scans: readonly { page: string; table: string }[];
  readonly reports: readonly { page: string; table: string }[];
}

async function bench(): Promise<number> {
  const twins = await prepare();
  try {
    await fill(twins.product, 1000);
    await measureQueries(twins.product);
    const cookies = await sitDown(twins.product);
    await weighPages(twins, cookies);
    await measureServer(twins, cookies.map(({ name, value }) => `${name}=${value}`).join('; '));
  } finally {
    await twins.product.stop();
    removeCluster(reachableDataDir(path.join(home, 'database')));
    rmSync(home, { recursive: true, force: true });
  }
  const unmet = lines.filter(({ met }) => met === false);
  say(
    `${lines.length} numbers, medians of ${ROUNDS} rounds where two servers are compared; ${unmet.length} not met.`,
  );
  say(
    `Load of the machine at the end: ${loadavg()
      .map((load) => load.toFixed(1))
      .join(', ')}`,
  );
  return unmet.length === 0 ? 0 : 1;
}

process.exit(await bench());
