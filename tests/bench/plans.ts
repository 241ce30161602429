import { begin, database, type Tx } from '@/db/client';
import { loadBench } from '@/db/read-models/bench';
import { loadBuild, loadBuilds, loadParts, loadPartsToSend } from '@/db/read-models/builds';
import { loadCalendars } from '@/db/read-models/calendars';
import { loadFeed } from '@/db/read-models/feed';
import { loadOrder } from '@/db/read-models/order-page';
import { loadMoves } from '@/db/read-models/order-parts';
import { loadQuotes } from '@/db/read-models/order-price';
import { loadReadings } from '@/db/read-models/order-readings';
import { loadSizes } from '@/db/read-models/order-sizes';
import { loadPartners, loadPeople } from '@/db/read-models/partners';
import { loadShop } from '@/db/read-models/shop';
import { loadFinished } from '@/db/read-models/turnaround';
import { loadWorkOrders } from '@/db/read-models/work-orders';
import type { Actor, Ticket } from '@/lib/domain/actor';
import { workOrderFilterSchema } from '@/lib/schemas/work-orders';

type Work = (tx: Tx, actor: Actor) => Promise<unknown>;

/** A table that a statement read from end to end. */
export interface Scan {
  readonly page: string;
  readonly table: string;
  readonly rows: number;
}

const FRAME = 1;

function list(asked: Record<string, string>): readonly [string, Work] {
  const filter = workOrderFilterSchema.parse(asked);
  return [
    `work orders ${JSON.stringify(asked)}`,
    async (tx, actor) => {
      await loadWorkOrders(tx, actor, filter);
      await loadPartners(tx, actor);
    },
  ];
}

/** What each page reads besides the one statement of the frame around it, with the order and build of the demonstration. */
export function pagesOf(
  orderId: string,
  buildId: string,
  otherShopId: string,
): readonly (readonly [string, Work])[] {
  const tab = (name: string, work: Work): readonly [string, Work] => [
    `order: ${name}`,
    async (tx, actor) => {
      await loadOrder(tx, actor, orderId);
      await work(tx, actor);
    },
  ];
  return [
    [
      'bench',
      async (tx, actor) => {
        await loadBench(tx, actor);
        await loadCalendars(tx, [actor.shopId]);
      },
    ],
    list({}),
    list({ show: 'all' }),
    list({ show: 'ended', sort: 'waiting' }),
    list({ show: 'all', sort: 'needed' }),
    list({ show: 'all', find: 'marl six crank' }),
    list({ show: 'all', with: otherShopId, sort: 'waiting' }),
    list({ move: 'mine' }),
    tab('history', () => Promise.resolve()),
    tab('sizes', (tx) => loadSizes(tx, orderId)),
    tab('readings', (tx) => loadReadings(tx, orderId)),
    tab('parts', (tx) => loadMoves(tx, orderId)),
    tab('price', (tx) => loadQuotes(tx, orderId)),
    [
      'new order',
      async (tx, actor) => {
        await loadOrder(tx, actor, orderId);
        await loadPartners(tx, actor);
        await loadPartsToSend(tx, actor, orderId);
      },
    ],
    ['builds', (tx, actor) => loadBuilds(tx, actor, { limit: 100, below: null })],
    ['build', (tx, actor) => loadBuild(tx, actor, buildId)],
    ['parts', (tx, actor) => loadParts(tx, actor, { limit: 100, after: null })],
    ['shops', loadPartners],
    [
      'settings',
      async (tx, actor) => {
        await loadShop(tx, actor, '');
        await loadPeople(tx, actor);
      },
    ],
    [
      'turnaround',
      async (tx, actor) => {
        await loadFinished(tx, actor, new Date(Date.now() - 365 * 86_400_000));
        await loadCalendars(tx, [actor.shopId]);
      },
    ],
    ['feed', (tx, actor) => loadFeed(tx, actor, 0)],
  ];
}

/** How many statements a page takes, the frame's and the question who is asking among them. */
export async function countStatements(ticket: Ticket, work: Work): Promise<number> {
  return FRAME + (await statementsOf(ticket, work)).length;
}

interface Statement {
  readonly sql: string;
  readonly bindings: readonly unknown[];
}

/** The statements of one reading, without the transaction's own. */
async function statementsOf(ticket: Ticket, work: Work): Promise<Statement[]> {
  const seen: Statement[] = [];
  const note = ({ sql, bindings }: { sql: string; bindings?: readonly unknown[] }) => {
    if (!/^(BEGIN|COMMIT|ROLLBACK)/i.test(sql)) seen.push({ sql, bindings: bindings ?? [] });
  };
  database().on('query', note);
  try {
    await begin(ticket, work);
  } finally {
    database().off('query', note);
  }
  return seen;
}

interface PlanNode {
  readonly 'Node Type': string;
  readonly 'Relation Name'?: string;
  readonly 'Actual Loops': number;
  readonly 'Actual Rows': number;
  readonly Plans?: readonly PlanNode[];
}

/** Reads the plans of each reading's statements and answers every scan of a table of more than a thousand rows. */
export async function scansOf(ticket: Ticket, pages: readonly (readonly [string, Work])[]): Promise<Scan[]> {
  const scans: Scan[] = [];
  for (const [page, work] of pages) {
    for (const { sql, bindings } of await statementsOf(ticket, work)) {
      if (sql.includes('app_begin')) continue;
      scans.push(...(await begin(ticket, (tx) => scansIn(tx, page, { sql, bindings }))));
    }
  }
  return scans;
}

async function scansIn(tx: Tx, page: string, { sql, bindings }: Statement): Promise<Scan[]> {
  // Statements arrive numbered, as the driver sends them; named marks are put back for asking again.
  const { rows } = await tx.raw<{ rows: { 'QUERY PLAN': { Plan: PlanNode }[] }[] }>(
    `explain (analyze, timing off, format json) ${sql.replaceAll(/\$\d+/g, '?')}`,
    [...bindings] as string[],
  );
  const tables = rows.flatMap((row) => row['QUERY PLAN'].flatMap(({ Plan }) => scannedIn(Plan)));
  const scans: Scan[] = [];
  for (const table of new Set(tables)) {
    const found = await tx.raw<{ rows: { rows: number }[] }>(
      'select reltuples::int as rows from pg_class where relname = ?',
      [table],
    );
    const count = found.rows[0]?.rows ?? 0;
    if (count > 1000) scans.push({ page, table, rows: count });
  }
  return scans;
}

function scannedIn(node: PlanNode): string[] {
  const own =
    node['Node Type'] === 'Seq Scan' && node['Actual Loops'] > 0 && node['Relation Name'] !== undefined
      ? [node['Relation Name']]
      : [];
  return [...own, ...(node.Plans ?? []).flatMap(scannedIn)];
}
