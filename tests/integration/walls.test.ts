import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { begin, type Tx } from '@/db/client';
import { lendWorksheet } from '@/lib/services/worksheets';
import { ownDatabase, readAsSuperuser } from '../support/database';
import {
  buildDraft,
  fullOrder,
  handOver,
  makeClear,
  price,
  rodSizes,
  type TestOrder,
} from '../support/orders';
import { buildPartner } from '../support/shops';

const own = ownDatabase();
const read = <T>(sql: string, values: readonly unknown[] = []) =>
  readAsSuperuser<T>(own.superuserUrl(), sql, values);

type Row = Record<string, unknown>;
type Side = 'sender' | 'partner';

/** What each side writes on an order, and what makes a copied row a new one. */
const AUTHORED: readonly (readonly [table: string, by: Side, fresh: Row])[] = [
  ['revs', 'sender', { number: 2 }],
  ['repeat_backs', 'partner', { id: randomUUID(), matches: false }],
  ['quotes', 'partner', { revision: 2 }],
  ['quote_answers', 'sender', { id: randomUUID(), answer: 'ask' }],
  ['custody_moves', 'partner', { id: randomUUID() }],
  ['readings', 'partner', { id: randomUUID() }],
  ['restamps', 'partner', { id: randomUUID() }],
  ['snags', 'partner', { id: randomUUID() }],
  ['snag_answers', 'sender', { id: randomUUID() }],
  ['holds', 'sender', { id: randomUUID() }],
  ['line_decisions', 'sender', { round: 2 }],
  ['messages', 'partner', { id: randomUUID() }],
];

function insert(tx: Tx, table: string, row: Row): Promise<unknown> {
  const prepared = Object.fromEntries(
    Object.entries(row).map(([name, value]) => [
      name,
      name === 'extras' ? JSON.stringify(value) : (value as never),
    ]),
  );
  return tx(table).insert(prepared);
}

describe('a party writes in its own name only', () => {
  let order: TestOrder;
  const sampleOf = async (table: string, by: Side): Promise<Row> => {
    const [row] = await read<Row>(`select * from ${table} where order_id = $1 and shop_id = $2 limit 1`, [
      order.id,
      order[by].shopId,
    ]);
    if (!row) throw new Error(`No row in ${table}`);
    return row;
  };
  beforeAll(async () => {
    order = await fullOrder();
  });

  it.each(AUTHORED)('%s: not under the other shop’s name', async (table, by, fresh) => {
    const row = { ...(await sampleOf(table, by)), ...fresh };
    const other = by === 'sender' ? 'partner' : 'sender';
    await expect(begin(order[other].owner, (tx) => insert(tx, table, row))).rejects.toThrow(
      'row-level security',
    );
  });

  it.each(AUTHORED)('%s: not under a colleague’s name', async (table, by, fresh) => {
    const [someone] = await read<{ id: string }>(
      `select person_id as id from memberships where shop_id = $1`,
      [order[by === 'sender' ? 'partner' : 'sender'].shopId],
    );
    const row = { ...(await sampleOf(table, by)), ...fresh, person_id: someone?.id };
    await expect(begin(order[by].owner, (tx) => insert(tx, table, row))).rejects.toThrow(
      'row-level security',
    );
  });

  // Only the sender releases sizes and decides on the work; only the partner names prices, repeats back and raises snags.
  it.each([
    ['revs', 'partner', { number: 2 }],
    ['line_decisions', 'partner', { round: 2 }],
    ['quotes', 'sender', { revision: 2 }],
    ['repeat_backs', 'sender', { id: randomUUID(), matches: false }],
    ['snags', 'sender', { id: randomUUID() }],
  ] as const)('%s: not by the %s at all', async (table, side, fresh) => {
    const author = side === 'sender' ? 'partner' : 'sender';
    const [person] = await read<{ id: string }>(
      `select person_id as id from memberships where shop_id = $1`,
      [order[side].shopId],
    );
    const own = { shop_id: order[side].shopId, person_id: person?.id };
    const row = { ...(await sampleOf(table, author)), ...fresh, ...own };
    await expect(begin(order[side].owner, (tx) => insert(tx, table, row))).rejects.toThrow(
      'row-level security',
    );
  });

  it('adds no size, working or amount to what the other shop has written', async () => {
    const rows: readonly (readonly [table: string, by: Side, fresh: Row])[] = [
      ['rev_sizes', 'partner', { feature: '9' }],
      ['rev_lines', 'partner', { line_id: order.lineIds[0] }],
      ['quote_lines', 'sender', { amount_minor: 1 }],
    ];
    for (const [table, by, fresh] of rows) {
      const [row] = await read<Row>(`select * from ${table} where order_id = $1 limit 1`, [order.id]);
      const json = table === 'rev_lines' ? { inputs: '{}', steps: '[]', checks: '[]' } : {};
      await expect(
        begin(order[by].owner, (tx) => insert(tx, table, { ...row, ...fresh, ...json })),
        table,
      ).rejects.toThrow('row-level security');
    }
  });

  it('leaves lines and parts of an order that was sent to nobody to add or take away', async () => {
    const line = { id: randomUUID(), order_id: order.id, position: 9, operation: 'polish', title: 'Polish' };
    for (const side of ['sender', 'partner'] as const) {
      await expect(
        begin(order[side].owner, (tx) =>
          tx('order_lines').insert({ ...line, catalogue_version: 1, needs_sizes: false }),
        ),
        side,
      ).rejects.toThrow('row-level security');
      await begin(order[side].owner, (tx) => tx('order_line_parts').where({ order_id: order.id }).delete());
    }
    expect(await read('select 1 from order_line_parts where order_id = $1', [order.id])).toHaveLength(2);
  });
});

describe('a sheet that is lent', () => {
  it('can be filled in by the partner, and not thrown away', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    const [sheet] = await read<{ id: string }>('select id from worksheets where order_id = $1', [order.id]);
    const id = sheet?.id ?? '';
    await lendWorksheet(order.sender.owner, id, true);
    const kept = await begin(order.partner.owner, (tx) =>
      tx('worksheets').where({ id }).update({ raw: '{}' }),
    );
    expect(kept).toBe(1);
    const gone = await begin(order.partner.owner, (tx) => tx('worksheets').where({ id }).delete());
    expect(gone).toBe(0);
  });

  it('is lent and taken back by its own shop only', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    const [sheet] = await read<{ id: string }>('select id from worksheets where order_id = $1', [order.id]);
    const id = sheet?.id ?? '';
    await lendWorksheet(order.sender.owner, id, true);
    await expect(lendWorksheet(order.partner.owner, id, false)).rejects.toMatchObject({ code: 'not_found' });
  });
});

describe('the database asks a second time before metal is cut', () => {
  const startInSql = (order: TestOrder, lineId: string) =>
    begin(order.partner.owner, (tx) =>
      tx('order_lines').where({ id: lineId }).update({ started_at: new Date() }),
    );

  it('lets a line be started that is clear', async () => {
    const order = await buildDraft();
    await makeClear(order);
    for (const lineId of order.lineIds) await startInSql(order, lineId);
  });

  it.each<readonly [string, (order: TestOrder, rods: string) => Promise<unknown>]>([
    [
      'a hold on the line',
      (order, lineId) =>
        order.act('partner', {
          ...{ do: 'hold', id: randomUUID(), lineId, reason: 'machine', words: 'belt', waitsFor: 'partner' },
        }),
    ],
    [
      'a snag on the line',
      (order, lineId) =>
        order.act('partner', {
          ...{ do: 'raise_snag', id: randomUUID(), lineId, kind: 'crack', words: 'w', proposal: 'p' },
          ...{ priceMinor: 0, days: 0 },
        }),
    ],
    [
      'a newer rev that is not repeated back',
      (order, lineId) =>
        order.act('sender', { do: 'release', lines: [rodSizes(lineId, '1.8840', '1.8835')], reason: 'new' }),
    ],
  ])('and not one with %s', async (_what, spoil) => {
    const order = await buildDraft();
    await makeClear(order);
    const rods = order.lineIds[1] ?? '';
    await spoil(order, rods);
    await expect(startInSql(order, rods)).rejects.toThrow('not clear to cut');
  });

  it('and not without the work’s own price, the pieces, or sizes', async () => {
    const order = await buildDraft();
    const [crack = '', rods = ''] = order.lineIds;
    await order.act('sender', { do: 'send' });
    const inspection = { ...price([crack], 3_000), kind: 'inspection', promiseDays: null } as never;
    await order.act('partner', inspection);
    await order.act('sender', { do: 'agree', revision: 1 });
    await expect(startInSql(order, crack)).rejects.toThrow('pieces');
    await order.act('sender', handOver('sent', order.partId));
    await order.act('partner', handOver('checked_in', order.partId));
    await startInSql(order, crack);
    await expect(startInSql(order, rods)).rejects.toThrow('price');
    await order.act('partner', price(order.lineIds));
    await order.act('sender', { do: 'agree', revision: 2 });
    await expect(startInSql(order, rods)).rejects.toThrow('sizes');
  });

  it('takes a match only with the words and limits of the rev that stands', async () => {
    const order = await buildDraft();
    await makeClear(order);
    const rods = order.lineIds[1] ?? '';
    const [row] = await read<Row>('select * from repeat_backs where order_id = $1', [order.id]);
    await order.act('sender', { do: 'release', lines: [rodSizes(rods, '1.8840', '1.8835')], reason: 'new' });
    const write = (fresh: Row) =>
      begin(order.partner.owner, (tx) => insert(tx, 'repeat_backs', { ...row, id: randomUUID(), ...fresh }));
    await expect(write({})).rejects.toThrow('equals the rev');
    await expect(write({ what: 'Mains', since: 2 })).rejects.toThrow('equals the rev');
  });

  it('keeps a price in the order’s money, and its total the sum of its lines', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    await order.act('partner', price(order.lineIds.slice(0, 1)));
    const [quote] = await read<Row>('select * from quotes where order_id = $1', [order.id]);
    await expect(
      begin(order.partner.owner, (tx) =>
        insert(tx, 'quotes', { ...quote, revision: 2, currency: 'EUR', total_minor: 0 }),
      ),
    ).rejects.toThrow('currency');
    const line = { order_id: order.id, revision: 1, line_id: order.lineIds[1], amount_minor: 500 };
    await expect(begin(order.partner.owner, (tx) => insert(tx, 'quote_lines', line))).rejects.toThrow(
      'total',
    );
  });

  it('lets clock legs neither overlap nor run backwards', async () => {
    const order = await buildDraft();
    await makeClear(order);
    const [leg] = await read<Row>('select * from clock_legs where order_id = $1 order by n desc limit 1', [
      order.id,
    ]);
    const earlier = {
      n: Number(leg?.['n']) + 1,
      started_at: '2001-01-01T00:00:00Z',
      ended_at: '2001-01-02T00:00:00Z',
    };
    await expect(
      begin(order.partner.owner, (tx) => insert(tx, 'clock_legs', { ...leg, ...earlier })),
    ).rejects.toThrow('begins where');
  });
});

describe('what ended partners and other orders may see', () => {
  it('is not the instruments of a shop whose partnership has ended', async () => {
    const order = await buildDraft();
    await begin(order.sender.owner, (tx) =>
      tx('instruments').insert({
        id: randomUUID(),
        shop_id: order.sender.shopId,
        name: 'Mike 2–3',
        kind: 'mike',
      }),
    );
    const seen = () => begin(order.partner.owner, (tx) => tx('instruments').select('id'));
    expect(await seen()).toHaveLength(1);
    await begin(order.sender.owner, (tx) => tx('partnerships').update({ state: 'ended' }));
    expect(await seen()).toEqual([]);
  });

  it('is one order alone where a link opens one order alone', async () => {
    const order = await fullOrder();
    const other = await buildDraft(undefined, order);
    await other.act('sender', { do: 'send' });
    const tables = await read<{ name: string }>(
      `select c.table_name as name from information_schema.columns c
       join information_schema.tables t using (table_schema, table_name)
       where c.table_schema = 'public' and c.column_name = 'order_id' and t.table_type = 'BASE TABLE'
         and has_table_privilege('wiretag_app', quote_ident(c.table_name), 'select')
         and not exists (select 1 from pg_policies p where p.tablename = c.table_name and p.policyname = c.table_name || '_shop')`,
    );
    expect(tables.length).toBeGreaterThan(15);
    for (const { name } of tables) {
      const seen: unknown[] = await begin(order.partner.owner, async (tx) => {
        await tx.raw(`select set_config('app.only_order', ?, true)`, [other.id]);
        return tx(name).where({ order_id: order.id }).select(tx.raw('1'));
      });
      expect(seen, name).toEqual([]);
    }
  });

  it('lets nobody send mail in the name of a shop that is not theirs', async () => {
    const order = await buildDraft();
    const stranger = await buildPartner(order.sender, 'Another Grinding');
    await expect(
      begin(stranger.owner, (tx) =>
        tx.raw(`select tell_address(?, ?, 'x@shop.example', 'invitation', '{}'::jsonb)`, [
          randomUUID(),
          order.sender.shopId,
        ]),
      ),
    ).rejects.toThrow('not your shop');
  });
});
