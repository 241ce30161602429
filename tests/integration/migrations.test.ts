import { randomBytes } from 'node:crypto';
import { readdirSync } from 'node:fs';
import knex, { type Knex } from 'knex';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { makeRolesAndDatabase } from '@/db/roles';
import { databaseUrls, TEST_PASSWORDS } from '../support/cluster';

const name = `test_${randomBytes(6).toString('hex')}`;
let owner: Knex;

const names = readdirSync('db/migrations').toSorted();
/** The migrations read through the test runner, which knows TypeScript. */
const migrationSource: Knex.MigrationSource<string> = {
  getMigrations: () => Promise.resolve(names),
  getMigrationName: (migration) => migration,
  getMigration: (migration) =>
    import(/* @vite-ignore */ `../../db/migrations/${migration}`) as Promise<Knex.Migration>,
};

beforeAll(async () => {
  const clusterUrl = inject('clusterUrl');
  await makeRolesAndDatabase(clusterUrl, name, TEST_PASSWORDS);
  owner = knex({
    client: 'pg',
    connection: databaseUrls(clusterUrl, name).OWNER_DATABASE_URL,
    migrations: { migrationSource },
  });
});
afterAll(async () => {
  await owner.destroy();
  const admin = new pg.Client({ connectionString: inject('clusterUrl') });
  await admin.connect();
  await admin.query(`drop database ${name} with (force)`);
  await admin.end();
});

/** Every table column, index, constraint, policy, trigger, function and grant, in words. */
async function wholeSchema(): Promise<string[]> {
  const { rows } = await owner.raw<{ rows: { line: string }[] }>(`
    select line from (
      select format('column %s.%s %s %s', table_name, column_name, data_type, is_nullable) from information_schema.columns where table_schema = 'public'
      union all select 'index ' || indexdef from pg_indexes where schemaname = 'public'
      union all select format('constraint %s %s', conname, pg_get_constraintdef(oid)) from pg_constraint where connamespace = 'public'::regnamespace
      union all select format('policy %s %s %s %s %s %s', tablename, policyname, permissive, cmd, qual, with_check) from pg_policies where schemaname = 'public'
      union all select pg_get_triggerdef(oid) from pg_trigger where not tgisinternal
      union all select pg_get_functiondef(oid) from pg_proc where pronamespace = 'public'::regnamespace
      union all select format('grant %s %s %s', table_name, grantee, privilege_type) from information_schema.role_table_grants where table_schema = 'public'
    ) as every (line) where line not like '%knex_migrations%' order by line`);
  return rows.map(({ line }) => line);
}

describe('migrations', () => {
  it('go up, down to nothing, and up again to the very same tables and walls', async () => {
    await owner.migrate.latest();
    const first = await wholeSchema();
    expect(first.length).toBeGreaterThan(500);
    await owner.migrate.rollback(undefined, true);
    expect(await wholeSchema()).toEqual([]);
    await owner.migrate.latest();
    expect(await wholeSchema()).toEqual(first);
  });

  it('go down one by one', async () => {
    await owner.migrate.latest();
    expect(await wholeSchema()).not.toEqual([]);
    for (const _name of names) await owner.migrate.down();
    expect(await wholeSchema()).toEqual([]);
  });
});
