import 'server-only';
import knex, { type Knex } from 'knex';

/** Tables of an order, in the order in which they are written. */
const TABLES = [
  'orders',
  'order_sides',
  'order_words',
  'order_references',
  'order_parts',
  'order_lines',
  'order_line_parts',
  'worksheets',
  'revs',
  'rev_lines',
  'rev_sizes',
  'repeat_backs',
  'quotes',
  'quote_lines',
  'quote_answers',
  'custody_moves',
  'restamps',
  'snags',
  'snag_answers',
  'holds',
  'line_decisions',
  'readings',
  'events',
  'clock_legs',
] as const;

/** Ids that a copy shares with its template: who, never what. */
const SHARED = new Set([
  'shop_id',
  'person_id',
  'sender_shop_id',
  'partner_shop_id',
  'other_shop_id',
  'calendar_shop_id',
  'private_to',
  'with_shop_id',
  'instrument_id',
]);

interface Column {
  readonly table: string;
  readonly name: string;
  readonly type: string;
}

/**
 * Copies the orders that a shop has sent until it has so many more, whole: rows, log and clock legs, with ids and
 * numbers of their own. One INSERT … SELECT a table, as the owner of the tables; messages and files are left out.
 * Ended orders are copied in turn; of the open ones one in fifty, as a shop that has worked for years has them.
 */
export async function copyOrders(ownerUrl: string, shopId: string, orders: number): Promise<void> {
  const owner = knex({ client: 'pg', connection: ownerUrl, pool: { min: 1, max: 1 } });
  try {
    await owner.transaction(async (tx) => {
      await chooseTemplates(tx, shopId, orders);
      const columns = await readColumns(tx);
      const tables = [...TABLES, 'builds', 'parts', 'part_places'];
      // What the triggers keep is copied as it stands, so they rest meanwhile; foreign keys and checks do not.
      for (const table of tables) await tx.raw('alter table ?? disable trigger user', [table]);
      const named = 'join order_parts op on op.part_id = t.part_id join copies c on c.template = op.order_id';
      const builds = `join (select o.build_id, c.k, min(c.number) as number from copies c join orders o on o.id = c.template group by 1, 2) c on c.build_id = t.id`;
      await insert(tx, 'builds', columns, builds);
      await insert(tx, 'parts', columns, named.replace('t.part_id', 't.id'));
      for (const table of TABLES) {
        await insert(
          tx,
          table,
          columns,
          `join copies c on c.template = t.${table === 'orders' ? 'id' : 'order_id'}`,
        );
      }
      await insert(tx, 'part_places', columns, named);
      await tx.raw(
        `update shop_counters set order_no = greatest(order_no, (select max(number) from copies)) where shop_id = ?`,
        [shopId],
      );
      await tx.raw('set constraints all immediate');
      for (const table of tables) await tx.raw('alter table ?? enable trigger user', [table]);
    });
    await owner.raw('analyze');
  } finally {
    await owner.destroy();
  }
}

async function chooseTemplates(tx: Knex.Transaction, shopId: string, orders: number): Promise<void> {
  await tx.raw(`
    -- An id made here is of version 7; a copy's is of version 8 and holds the copy's number: the same id in rows and in the log comes out the same.
    create function pg_temp.copy_text(words text, k integer) returns text language sql immutable as $$
      select regexp_replace(words, '([0-9a-f]{8}-[0-9a-f]{4}-)7[0-9a-f]{3}(-[89ab])[0-9a-f]{3}(-[0-9a-f]{12})',
        '\\18' || lpad(to_hex(k % 4096), 3, '0') || '\\2' || lpad(to_hex(k / 4096), 3, '0') || '\\3', 'g') $$;
    create function pg_temp.copy_id(id uuid, k integer) returns uuid language sql immutable as $$
      select pg_temp.copy_text(id::text, k)::uuid $$;
    create function pg_temp.copy_json(words jsonb, k integer, one text, other text) returns jsonb language sql immutable as $$
      select replace(replace(pg_temp.copy_text(words::text, k), pg_temp.copy_text(one, k), one), pg_temp.copy_text(other, k), other)::jsonb $$;
  `);
  await tx.raw(
    `create temporary table copies on commit drop as
     with mine as (select o.id, o.number, o.ended_at is null as is_open, o.sender_shop_id::text as one, o.partner_shop_id::text as other,
         substr(o.id::text, 15, 1) = '8' as is_copy,
         ('x' || substr(o.id::text, 21, 3) || substr(o.id::text, 16, 3))::bit(24)::int as k
       from orders o where o.sender_shop_id = ? and o.status <> 'draft' and o.partner_shop_id is not null),
     base as (select coalesce(max(k) filter (where is_copy), 0) as k, (select order_no from shop_counters where shop_id = ?) as number from mine),
     templates as (select * from mine where not is_copy)
     select t.id as template, t.number as was, t.one, t.other, base.k + c.k as k,
       (base.number + row_number() over (order by c.k, t.id))::int as number
     from templates t cross join base
     cross join generate_series(1, 1 + ? / greatest(1, (select count(*)::int from templates where not is_open))) as c (k)
     where not t.is_open or c.k % 50 = 0
     order by c.k, t.id limit ?`,
    [shopId, shopId, orders, orders],
  );
  await tx.raw('create index on copies (template); analyze copies');
}

async function readColumns(tx: Knex.Transaction): Promise<readonly Column[]> {
  const { rows } = await tx.raw<{ rows: Column[] }>(
    `select table_name as "table", column_name as name, udt_name as type from information_schema.columns
     where table_schema = 'public' and is_identity = 'NO' and is_generated = 'NEVER' order by table_name, ordinal_position`,
  );
  return rows;
}

async function insert(
  tx: Knex.Transaction,
  table: string,
  columns: readonly Column[],
  from: string,
): Promise<void> {
  const own = columns.filter((column) => column.table === table && column.name !== 'copied_from_id');
  const names = own.map(({ name }) => `"${name}"`).join(', ');
  await tx.raw(
    `insert into "${table}" (${names}) select ${own.map(copyOf).join(', ')} from "${table}" t ${from}`,
  );
}

/** Columns that come out otherwise than as they stand. */
const COPIED: Readonly<Record<string, string>> = {
  'builds.number': 'c.number',
  'orders.number': 'c.number',
  'order_sides.number': 'c.number',
  'orders.words': 'array_replace(t.words, c.was::text, c.number::text)',
  'order_words.word': 'case when t.word = c.was::text then c.number::text else t.word end',
  'events.payload': 'pg_temp.copy_json(t.payload, c.k, c.one, c.other)',
  'events.did': 'pg_temp.copy_json(t.did, c.k, c.one, c.other)',
};

function copyOf({ table, name, type }: Column): string {
  const isOwn = type === 'uuid' && !SHARED.has(name);
  return COPIED[`${table}.${name}`] ?? (isOwn ? `pg_temp.copy_id(t."${name}", c.k)` : `t."${name}"`);
}
