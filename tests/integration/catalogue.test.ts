import { beforeAll, describe, expect, it } from 'vitest';
import { begin, database } from '@/db/client';
import { ownDatabase, readAsSuperuser } from '../support/database';
import { buildDraft, makeClear, type TestOrder } from '../support/orders';
import { buildPartner, buildShop } from '../support/shops';

const own = ownDatabase();
const read = <T>(sql: string, values: readonly unknown[] = []) =>
  readAsSuperuser<T>(own.superuserUrl(), sql, values);

/** Tables that only the migration tool writes. */
const TOOL_TABLES = ['knex_migrations', 'knex_migrations_lock'];

/** Functions that run with their owner's rights, each looked at. */
const DEFINERS = [
  ...[
    'app_begin',
    'app_begin_for',
    'app_set',
    'apply_move',
    'begin_reset',
    'check_quote_total',
    'close_notice',
    'default_hours',
  ],
  ...[
    'end_sign_in',
    'end_sign_ins_of_member',
    'sign_in_of',
    'feed_event',
    'find_colleague_for_sign_in',
    'find_for_sign_in',
    'follow_move',
    'forget_draft',
    'guard_cutting',
    'guard_leg',
    'guard_line_start',
    'guard_quote',
    'line_not_clear',
  ],
  ...[
    'guard_event',
    'guard_reading',
    'guard_repeat_back',
    'guard_rev',
    'invite_shop',
    'keep_an_owner',
    'next_number',
    'note_access',
  ],
  ...[
    'owner_of_shop',
    'place_new_part',
    'project_sides',
    'put',
    'read_invitation',
    'reader_of',
    'shift_pieces',
    'shops_of_asker',
    'shops_to_check',
    'sign_up_shop',
  ],
  ...[
    'stamp_count',
    'start_sign_in',
    'switch_shop',
    'take_invitation',
    'take_notice',
    'take_reset',
    'take_try',
    'tell_address',
    'tell_reset',
    'tell_shop',
  ],
];

describe('the database holds the walls by itself', () => {
  it('forces row-level security on every table, with a policy', async () => {
    const open = await read<{ name: string }>(
      `select c.relname as name from pg_class c join pg_namespace n on n.oid = c.relnamespace
       where n.nspname = 'public' and c.relkind in ('r', 'p') and c.relname <> all ($1)
         and (not c.relrowsecurity or not c.relforcerowsecurity or not exists (select 1 from pg_policy p where p.polrelid = c.oid))`,
      [TOOL_TABLES],
    );
    expect(open).toEqual([]);
  });

  it('checks what is written as well as what is read, in every policy that allows writing', async () => {
    const loose = await read(
      `select polname from pg_policy where polcmd in ('*', 'w') and polqual is not null and polwithcheck is null`,
    );
    expect(loose).toEqual([]);
  });

  it('gives no role more than it needs', async () => {
    const roles = await read<Record<string, boolean | string>>(
      `select rolname, rolsuper, rolbypassrls, rolcreaterole, rolcreatedb from pg_roles where rolname like 'wiretag\\_%' and rolname <> 'wiretag_cluster'`,
    );
    expect(roles).toHaveLength(3);
    for (const role of roles)
      expect(role).toMatchObject({
        rolsuper: false,
        rolbypassrls: false,
        rolcreaterole: false,
        rolcreatedb: false,
      });
    const owned = await read(
      `select 1 from pg_class c join pg_roles r on r.oid = c.relowner where r.rolname = 'wiretag_app'`,
    );
    expect(owned).toEqual([]);
  });

  it('pins the search path of every function that runs with its owner’s rights, and lists them all', async () => {
    const definers = await read<{ name: string; config: string[] | null }>(
      `select p.proname as name, p.proconfig as config from pg_proc p join pg_namespace n on n.oid = p.pronamespace
       where p.prosecdef and n.nspname in ('public', 'outbox') order by 1`,
    );
    expect(definers.map(({ name }) => name)).toEqual(DEFINERS.toSorted());
    expect(
      definers.filter(({ config }) => !config?.some((setting) => setting.startsWith('search_path='))),
    ).toEqual([]);
  });

  it('has an index for every foreign key', async () => {
    const bare = await read(
      `select c.conrelid::regclass::text as "table", c.conname from pg_constraint c join pg_namespace n on n.oid = c.connamespace
       where c.contype = 'f' and n.nspname = 'public' and not exists (
         select 1 from pg_index i where i.indrelid = c.conrelid and (i.indkey::int2[])[0:cardinality(c.conkey) - 1] @> c.conkey
           and c.conkey @> (i.indkey::int2[])[0:cardinality(c.conkey) - 1])`,
    );
    expect(bare).toEqual([]);
  });
});

describe('what the application can see', () => {
  let order: TestOrder;
  beforeAll(async () => {
    order = await buildDraft();
    await makeClear(order);
  });

  it('is nothing at all while nobody is asking', async () => {
    const { rows } = await database().raw<{ rows: { tables: string[] }[] }>(
      `select array_agg(c.relname::text) as tables from pg_class c join pg_namespace n on n.oid = c.relnamespace
       where n.nspname = 'public' and c.relkind = 'r' and has_table_privilege('wiretag_app', c.oid, 'select')`,
    );
    const tables = rows[0]?.tables ?? [];
    expect(tables.length).toBeGreaterThan(25);
    for (const table of tables) {
      const seen: unknown[] = await database()(table).select(database().raw('1')).limit(1);
      expect(seen, table).toEqual([]);
    }
  });

  it('does not stay on a connection after its transaction', async () => {
    await begin(order.sender.owner, async (tx) => {
      expect(await tx('orders').where({ id: order.id }).select('id')).toHaveLength(1);
    });
    for (let tries = 0; tries < 25; tries += 1) {
      expect(await database()('orders').select('id').limit(1)).toEqual([]);
    }
  });

  it('is one’s own side and no other partner’s: another partner of the same sender sees no row of the order', async () => {
    const other = await buildPartner(order.sender, 'Another Grinding');
    const tables = [
      'orders',
      'order_lines',
      'order_parts',
      'revs',
      'rev_sizes',
      'quotes',
      'custody_moves',
      'events',
      'clock_legs',
      'repeat_backs',
    ];
    for (const table of tables) {
      const column = table === 'orders' ? 'id' : 'order_id';
      const seen: unknown[] = await begin(other.owner, (tx) =>
        tx(table)
          .where({ [column]: order.id })
          .select(tx.raw('1')),
      );
      expect(seen, table).toEqual([]);
    }
  });

  it('never shows a partner the sender’s builds, parts, worksheets or customers', async () => {
    for (const table of ['builds', 'parts', 'worksheets']) {
      const seen: unknown[] = await begin(order.partner.owner, (tx) => tx(table).select(tx.raw('1')));
      expect(seen, table).toEqual([]);
    }
  });

  it('lets nobody write into an order that is not theirs', async () => {
    const stranger = await buildShop('Strangers');
    const row = {
      order_id: order.id,
      shop_id: stranger.shopId,
      seq: 99,
      type: 'x',
      payload: '{}',
      author_name: 'x',
      side: 'sender',
      occurred_at: new Date(),
    };
    await expect(begin(stranger.owner, (tx) => tx('events').insert(row))).rejects.toThrow();
  });

  it.each([
    'events',
    'revs',
    'rev_sizes',
    'quotes',
    'custody_moves',
    'repeat_backs',
    'readings',
    'restamps',
    'line_decisions',
    'access_log',
  ])('keeps %s append-only, even for the owner of the tables', async (table) => {
    await expect(readAsSuperuser(own.ownerUrl(), `delete from ${table}`)).rejects.toThrow('append-only');
    await expect(readAsSuperuser(own.ownerUrl(), `truncate ${table} cascade`)).rejects.toThrow(
      /append-only|permission/,
    );
  });
});
