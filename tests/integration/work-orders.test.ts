import { describe, expect, it } from 'vitest';
import { begin } from '@/db/client';
import { loadWorkOrders, type WorkOrderFilter } from '@/db/read-models/work-orders';
import { workOrderFilterSchema } from '@/lib/schemas/work-orders';
import { ownDatabase, readAsSuperuser } from '../support/database';
import { buildDraft } from '../support/orders';
import { buildShop } from '../support/shops';

const own = ownDatabase();
const list = (order: { sender: { owner: { tokenHash: string } } }, filter: Partial<WorkOrderFilter>) =>
  begin(order.sender.owner, (tx, actor) =>
    loadWorkOrders(tx, actor, { show: 'all', find: '', before: null, ...filter }),
  );

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
      `insert into order_sides (shop_id, order_id, side, number, status, open, clock, clock_since, title, price_punch, parts_punch, sizes_punch, stopped, clear)
       select s.shop_id, o.id, 'partner', 500 + o.n / 3, 'sent', true, 'partner', now(), 'copy', 'unmet', 'unmet', 'unmet', false, false
       from order_sides s, (select n, gen_random_uuid() as id from generate_series(1, 120) n) o where s.order_id = $1 and s.side = 'sender'`,
      [order.id],
    );
    const seen: string[] = [];
    let before: WorkOrderFilter['before'] = null;
    do {
      const page = await list(order, { before });
      seen.push(...page.rows.map(({ orderId }) => orderId));
      before = page.next;
    } while (before !== null);
    const all = await readAsSuperuser<{ id: string }>(
      own.superuserUrl(),
      'select order_id as id from order_sides where shop_id = $1',
      [order.sender.shopId],
    );
    expect(all.length).toBe(121);
    expect(seen.length).toBe(all.length);
    expect(new Set(seen)).toEqual(new Set(all.map(({ id }) => id)));
  });

  it('takes an odd address for the first page of open orders', () => {
    expect(workOrderFilterSchema.parse({ show: 'x', before: 'y', find: ['a', 'b'] })).toEqual({
      show: 'open',
      before: null,
      find: 'a',
    });
  });
});
