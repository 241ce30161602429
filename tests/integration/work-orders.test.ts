import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { begin } from '@/db/client';
import { loadWorkOrders, type WorkOrderFilter } from '@/db/read-models/work-orders';
import { workOrderFilterSchema, workOrdersAddress } from '@/lib/schemas/work-orders';
import { ownDatabase, readAsSuperuser } from '../support/database';
import { buildDraft } from '../support/orders';
import { buildPartner, buildShop } from '../support/shops';

const own = ownDatabase();
const ALL: WorkOrderFilter = { show: 'all', find: '', with: null, move: 'any', sort: 'number', after: null };
const list = (order: { sender: { owner: { tokenHash: string } } }, filter: Partial<WorkOrderFilter>) =>
  begin(order.sender.owner, (tx, actor) => loadWorkOrders(tx, actor, { ...ALL, ...filter }));

describe('the list of work orders', () => {
  it('finds by the beginnings of number, stamp, engine and the other shop, and nothing of other shops', async () => {
    const order = await buildDraft();
    const [found] = (await list(order, {})).rows;
    for (const find of [String(found?.number), 'f31', 'marr 215', 'TEST grind', 'crank']) {
      expect(
        (await list(order, { find })).rows.map(({ orderId }) => orderId),
        find,
      ).toEqual([order.id]);
    }
    for (const find of ['marrick 999', '%', 'zzz'])
      expect((await list(order, { find })).rows.length, find).toBe(find === '%' ? 1 : 0);
    const stranger = await buildShop('Strangers');
    expect((await list({ sender: stranger }, {})).rows).toEqual([]);
  });

  it('goes through all orders page by page, once each, also where numbers are the same', async () => {
    const order = await buildDraft();
    // Side rows of orders that are nowhere else: only the list reads them, so foreign keys are left out for this once.
    await readAsSuperuser(
      own.superuserUrl(),
      'alter table order_sides drop constraint order_sides_order_id_fkey',
    );
    await readAsSuperuser(
      own.superuserUrl(),
      `insert into order_sides (shop_id, order_id, side, number, status, open, clock, clock_since, title, price_punch, parts_punch, sizes_punch, stopped, clear, needed_back_on)
       select s.shop_id, o.id, 'partner', 500 + o.n / 3, 'sent', true, 'partner', now() - make_interval(hours => o.n / 4, secs => 0.123456), 'copy', 'unmet', 'unmet', 'unmet', false, false, case when o.n % 3 > 0 then date '2026-12-01' + o.n / 5 end
       from order_sides s, (select n, gen_random_uuid() as id from generate_series(1, 120) n) o where s.order_id = $1 and s.side = 'sender'`,
      [order.id],
    );
    const all = await readAsSuperuser<{ id: string; needed: string | null; since: Date; number: number }>(
      own.superuserUrl(),
      `select order_id as id, needed_back_on::text as needed, clock_since as since, number from order_sides where shop_id = $1`,
      [order.sender.shopId],
    );
    expect(all.length).toBe(121);
    const ascending = (a: string | number, b: string | number) => (a < b ? -1 : a > b ? 1 : 0);
    const sorted = {
      number: all.toSorted((a, b) => b.number - a.number || ascending(b.id, a.id)),
      needed: all.toSorted((a, b) => ascending(a.needed ?? '9', b.needed ?? '9') || ascending(a.id, b.id)),
      waiting: all.toSorted((a, b) => ascending(Number(a.since), Number(b.since)) || ascending(a.id, b.id)),
    };
    for (const sort of ['number', 'waiting', 'needed'] as const) {
      const seen: string[] = [];
      let address: string | null = workOrdersAddress({ ...ALL, sort });
      while (address !== null) {
        // Each page is opened by its address, as a browser does.
        const asked = Object.fromEntries(new URL(address, 'http://shop.example').searchParams);
        const filter = workOrderFilterSchema.parse(asked);
        const page = await list(order, filter);
        seen.push(...page.rows.map(({ orderId }) => orderId));
        address = page.next === null ? null : workOrdersAddress({ ...filter, after: page.next });
      }
      expect(seen, sort).toEqual(sorted[sort].map(({ id }) => id));
    }
  });

  it('narrows to one other shop and to whose move it is', async () => {
    const order = await buildDraft();
    const other = await buildDraft(undefined, {
      sender: order.sender,
      partner: await buildPartner(order.sender, 'Another Grinding'),
    });
    await other.act('sender', { do: 'send' });
    const ids = async (filter: Partial<WorkOrderFilter>) =>
      (await list(order, filter)).rows.map(({ orderId }) => orderId);
    expect(await ids({ with: other.partner.shopId })).toEqual([other.id]);
    expect(await ids({ move: 'theirs' })).toEqual([other.id]);
    expect(await ids({ move: 'mine' })).toEqual([order.id]);
    expect(await ids({ move: 'mine', show: 'open' })).toEqual([]);
  });

  it('takes an odd address for the first page of open orders', () => {
    const odd = { show: 'x', after: 'y', find: ['a', 'b'], with: '1', move: '2', sort: '3' };
    expect(workOrderFilterSchema.parse(odd)).toEqual({ ...ALL, show: 'open', find: 'a' });
    const place = `2026-12-01~${randomUUID()}`;
    expect(workOrderFilterSchema.parse({ sort: 'needed', after: place }).after?.key).toBe('2026-12-01');
    expect(workOrderFilterSchema.parse({ sort: 'number', after: place }).after).toBeNull();
  });
});
