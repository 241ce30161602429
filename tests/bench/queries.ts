import knex from 'knex';
import { begin, closeDatabase } from '@/db/client';
import { loadWorkOrders, type WorkOrderPlace } from '@/db/read-models/work-orders';
import { demoId } from '@/lib/demo/cast';
import { workOrderFilterSchema } from '@/lib/schemas/work-orders';
import { median } from './load';
import { countStatements, pagesOf, scansOf } from './plans';

const works = { personId: demoId('works-owner'), shopId: demoId('works') };
const grinding = { personId: demoId('grinding-owner'), shopId: demoId('grinding') };
const ALL = workOrderFilterSchema.parse({ show: 'all' });

async function timed(work: () => Promise<unknown>, times = 200): Promise<number> {
  for (let warm = 0; warm < 20; warm += 1) await work();
  const taken: number[] = [];
  for (let turn = 0; turn < times; turn += 1) {
    const began = performance.now();
    await work();
    taken.push(performance.now() - began);
  }
  return median(taken);
}

/** First page, deepest page, and what tenancy costs, in milliseconds. */
async function depth(): Promise<unknown> {
  const page = (after: WorkOrderPlace | null) => () =>
    begin(works, (tx, actor) => loadWorkOrders(tx, actor, { ...ALL, after }));
  const { rows } = await begin(works, (tx) =>
    tx.raw<{ rows: { key: string; orderId: string; orders: number }[] }>(
      `select number::text as key, order_id as "orderId", (select count(*)::int from order_sides where shop_id = ?) as orders
       from order_sides where shop_id = ? order by number, order_id offset 55 limit 1`,
      [works.shopId, works.shopId],
    ),
  );
  const last = rows[0];
  if (!last) throw new Error('The shop has too few orders');
  const sql = `select order_id, number, title from order_sides where shop_id = ? order by number desc, order_id desc limit 50`;
  const asOwner = knex({
    client: 'pg',
    connection: process.env['OWNER_DATABASE_URL'] ?? '',
    pool: { min: 1, max: 1 },
  });
  const under = await timed(() => begin(works, (tx) => tx.raw<unknown>(sql, [works.shopId])));
  const plain = await timed(() => asOwner.transaction((tx) => tx.raw<unknown>(sql, [works.shopId])));
  await asOwner.destroy();
  return {
    orders: last.orders,
    first: await timed(page(null)),
    deep: await timed(page({ key: last.key, orderId: last.orderId })),
    isolation: under / plain,
  };
}

/** Statements of each page for a large shop and a small one, and the tables that are read from end to end. */
async function plans(): Promise<unknown> {
  const pages = pagesOf(demoId('order being cut'), demoId('build six'), demoId('grinding'));
  const statements = [];
  for (const [page, work] of pages) {
    statements.push({
      page,
      count: await countStatements(works, work),
      few: await countStatements(grinding, work),
    });
  }
  const scans = await scansOf(works, pages);
  return {
    statements,
    scans: scans.filter(({ page }) => page !== 'turnaround'),
    reports: scans.filter(({ page }) => page === 'turnaround'),
  };
}

const answer = process.argv[2] === 'depth' ? await depth() : await plans();
console.log(JSON.stringify(answer));
await closeDatabase();
