import type { Knex } from 'knex';

/** Migrations run as the owner role; the application never does. */
const config: Knex.Config = {
  client: 'pg',
  ...(process.env['OWNER_DATABASE_URL'] === undefined
    ? {}
    : { connection: process.env['OWNER_DATABASE_URL'] }),
  migrations: { directory: './db/migrations', loadExtensions: ['.ts'], extension: 'ts' },
};
export default config;
