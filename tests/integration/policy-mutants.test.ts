import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { begin, type Tx } from '@/db/client';
import type { Ticket } from '@/lib/domain/actor';
import { notePartner } from '@/lib/services/partners';
import { lendWorksheet } from '@/lib/services/worksheets';
import { setClosedDay } from '@/lib/services/shop-settings';
import { seeThread } from '@/lib/services/messages';
import { ownDatabase, readAsSuperuser } from '../support/database';
import { buildDraft, fullOrder, type TestOrder } from '../support/orders';
import { buildPartner, buildPerson, buildShop } from '../support/shops';

const own = ownDatabase();
const asOwner = <T>(sql: string) => readAsSuperuser<T>(own.ownerUrl(), sql);
const read = <T>(sql: string, values: readonly unknown[] = []) =>
  readAsSuperuser<T>(own.superuserUrl(), sql, values);

interface Policy {
  readonly table: string;
  readonly name: string;
  readonly kind: string;
  readonly command: string;
  readonly using: string | null;
  readonly check: string | null;
}

let order: TestOrder;
let draft: TestOrder;
let askers: readonly Ticket[];
let tables: readonly string[];
let writes: readonly ((tx: Tx) => Promise<unknown>)[];

beforeAll(async () => {
  order = await fullOrder();
  const { sender, partner } = order;
  const other = await buildPartner(sender, 'Another Grinding');
  const stranger = await buildShop('Strangers');
  const bench = await buildPerson(sender, ['bench']);
  draft = await buildDraft(undefined, { sender, partner });
  const lent = await buildDraft(undefined, { sender, partner });
  await lent.act('sender', { do: 'send' });
  const [sheet] = await read<{ id: string }>('select id from worksheets where order_id = $1', [lent.id]);
  await lendWorksheet(sender.owner, sheet?.id ?? '', true);
  await notePartner(sender.owner, partner.shopId, 'x');
  await setClosedDay(sender.owner, '2099-12-25', { note: '' });
  await seeThread(partner.owner, order.id, 3);
  await begin(sender.owner, (tx) =>
    tx('instruments').insert({ id: randomUUID(), shop_id: sender.shopId, name: 'x', kind: 'mike' }),
  );
  await read(
    `insert into attachments (id, shop_id, order_id, key, name, type, sha256, state, person_id)
     select gen_random_uuid(), e.shop_id, e.order_id, 'k', 'n', 't', 's', 'ready', e.person_id from events e where e.order_id = $1 limit 1`,
    [order.id],
  );
  await read(
    `insert into order_references (shop_id, order_id, text) values ($1, $2, 'x') on conflict do nothing`,
    [partner.shopId, order.id],
  );
  askers = [sender.owner, bench, partner.owner, other.owner, stranger.owner];
  tables = (
    await read<{ name: string }>(
      `select c.relname as name from pg_class c where c.relnamespace = 'public'::regnamespace and c.relkind = 'r'
       and has_table_privilege('wiretag_app', c.oid, 'select') or c.relname in ('people', 'sign_ins', 'invitations') order by 1`,
    )
  ).map(({ name }) => name);
  writes = await forgeries();
});

/** Rows written in other people's names, on the wrong side, or where nothing may be written any more. */
async function forgeries(): Promise<((tx: Tx) => Promise<unknown>)[]> {
  const [last] = await read<{ seq: number }>('select max(seq) as seq from events where order_id = $1', [
    order.id,
  ]);
  const fresh: Readonly<Record<string, object>> = {
    ...{ revs: { number: 2 }, quotes: { revision: 2, extras: '[]' }, line_decisions: { round: 9 } },
    repeat_backs: { id: randomUUID(), matches: false },
    events: { id: undefined, seq: Number(last?.seq) + 1, payload: '{}', did: '{}' },
    rev_lines: { inputs: '{}', steps: '[]', checks: '[]', line_id: order.lineIds[0] },
    rev_sizes: { feature: '99' },
    quote_lines: { amount_minor: 0 },
  };
  const authored = [
    ...['revs', 'repeat_backs', 'quotes', 'quote_answers', 'custody_moves', 'readings', 'restamps', 'snags'],
    ...[
      'snag_answers',
      'holds',
      'line_decisions',
      'messages',
      'events',
      'rev_lines',
      'rev_sizes',
      'quote_lines',
    ],
  ];
  const people = await read<{ shop: string; person: string }>(
    'select shop_id as shop, person_id as person from memberships',
  );
  const forged: ((tx: Tx) => Promise<unknown>)[] = [];
  for (const table of authored) {
    const [row] = await read<Record<string, unknown>>(`select * from ${table} where order_id = $1 limit 1`, [
      order.id,
    ]);
    if (!row) throw new Error(`No row in ${table}`);
    const { id: _id, ...plain } = { ...row, ...('id' in row ? { id: randomUUID() } : {}) } as Record<
      string,
      unknown
    >;
    const withId = table === 'events' || !('id' in row) ? plain : { ...plain, id: randomUUID() };
    const insert = (more: object) => (tx: Tx) => tx(table).insert({ ...withId, ...fresh[table], ...more });
    forged.push(insert({}));
    if ('person_id' in row)
      for (const { shop, person } of people.filter((one) =>
        [order.sender.shopId, order.partner.shopId].includes(one.shop),
      ))
        forged.push(
          insert({ shop_id: shop, person_id: person }),
          insert({ shop_id: shop, person_id: row['person_id'] }),
          insert({ shop_id: row['shop_id'], person_id: person }),
        );
  }
  const line = {
    id: randomUUID(),
    order_id: order.id,
    position: 99,
    operation: 'x',
    title: 'x',
    catalogue_version: 1,
  };
  return [
    ...forged,
    (tx) => tx('order_lines').insert({ ...line, needs_sizes: false }),
    (tx) => tx('order_line_parts').where({ order_id: order.id }).delete(),
    (tx) => tx('order_lines').where({ order_id: order.id }).delete(),
    (tx) => tx('order_parts').where({ order_id: order.id }).delete(),
    (tx) =>
      tx('order_parts').insert({
        ...{ order_id: order.id, part_id: draft.partId, kind: 'x', stamp: '', maker_no: '', pieces: 1 },
      }),
    (tx) =>
      tx('order_line_parts').insert({
        ...{ line_id: order.lineIds[0], order_id: order.id, part_id: order.partId },
      }),
    (tx) => tx('attachments').update({ width: 1 }),
    ...[order.sender.shopId, order.partner.shopId].flatMap((shop_id) => [
      (tx: Tx) => tx('instruments').insert({ id: randomUUID(), shop_id, name: 'y', kind: 'mike' }),
      (tx: Tx) => tx('shop_closed_days').insert({ shop_id, day: '2099-01-01' }),
    ]),
    (tx) => tx('orders').where({ id: order.id }).delete(),
    (tx) => tx('worksheets').where({ shared: true }).update({ raw: '{}' }),
    (tx) => tx('worksheets').where({ shared: true }).delete(),
    (tx) => tx('people').update({ name: 'x' }),
    (tx) => tx('sign_ins').update({ ended_at: null }),
    (tx) => tx('shops').update({ house: '{}' }),
    (tx) => tx('partnerships').update({ guard_band_nm: null }),
  ];
}

/** What everybody sees and may do: numbers of rows, and how each forgery ends. Nothing is kept. */
async function probe(): Promise<string> {
  const seen: string[] = [];
  for (const ticket of askers) {
    await begin(ticket, async (tx) => {
      for (const table of tables) {
        const { rows } = await tx.raw<{ rows: { n: number }[] }>(
          `select count(*)::int as n from (select 1 from ${table}) x`,
        );
        seen.push(String(rows[0]?.n));
      }
      for (const write of writes) {
        await tx.raw('savepoint forgery');
        const end = await write(tx).then(
          (done) => `did ${typeof done === 'number' ? done : ''}`,
          (error: unknown) => (error instanceof Error && error.message.includes('row-level') ? 'wall' : 'no'),
        );
        seen.push(end);
        await tx.raw('rollback to savepoint forgery');
      }
    });
  }
  return seen.join(' ');
}

describe('every policy', () => {
  it('is needed: without it somebody sees or may do something else', async () => {
    const policies = await read<Policy>(
      `select tablename as "table", policyname as name, permissive as kind, cmd as command, qual as "using", with_check as "check"
       from pg_policies where schemaname = 'public' and policyname <> tablename || '_owner' order by 1, 2`,
    );
    expect(policies.length).toBeGreaterThan(70);
    const before = await probe();
    expect(await probe()).toBe(before);
    const idle: string[] = [];
    for (const policy of policies) {
      await asOwner(`drop policy "${policy.name}" on "${policy.table}"`);
      if ((await probe()) === before) idle.push(`${policy.table}: ${policy.name}`);
      await asOwner(
        `create policy "${policy.name}" on "${policy.table}" as ${policy.kind} for ${policy.command} to wiretag_app
         ${policy.using === null ? '' : `using (${policy.using})`} ${policy.check === null ? '' : `with check (${policy.check})`}`,
      );
    }
    expect(await probe()).toBe(before);
    expect(idle).toEqual([]);
  }, 240_000);
});
