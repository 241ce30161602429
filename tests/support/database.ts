import { randomBytes } from 'node:crypto';
import pg from 'pg';
import { afterAll, beforeAll, inject } from 'vitest';
import { closeDatabase } from '@/db/client';
import { setClock } from '@/lib/adapters/clock';
import { databaseUrls, TEMPLATE } from './cluster';

/** The other settings that a test needs. */
const SETTINGS = {
  APP_URL: 'http://127.0.0.1:1',
  NEXTAUTH_SECRET: 'a-secret-for-tests-of-32-letters-or-more',
  INSTALL_ID: 'test',
  S3_ENDPOINT: 'http://127.0.0.1:1',
  S3_BUCKET: 'wiretag',
  S3_ACCESS_KEY_ID: 'key',
  S3_SECRET_ACCESS_KEY: 'secret',
  SMTP_URL: 'smtp://127.0.0.1:1',
  MAIL_FROM: 'Wiretag <tags@wiretag.example>',
};

/** Gives the test file a PostgreSQL database of its own, a copy of the migrated template. */
export function ownDatabase(): { readonly ownerUrl: () => string; readonly superuserUrl: () => string } {
  const name = `test_${randomBytes(6).toString('hex')}`;
  beforeAll(async () => {
    await onCluster((client) =>
      client.query(`create database ${name} template ${TEMPLATE} owner wiretag_owner`),
    );
    Object.assign(process.env, SETTINGS, databaseUrls(inject('clusterUrl'), name));
  });
  afterAll(async () => {
    setClock();
    await closeDatabase();
    await onCluster((client) => client.query(`drop database ${name} with (force)`));
  });
  const superuserUrl = () => {
    const url = new URL(inject('clusterUrl'));
    url.pathname = name;
    return url.href;
  };
  return { ownerUrl: () => databaseUrls(inject('clusterUrl'), name).OWNER_DATABASE_URL, superuserUrl };
}

async function onCluster<T>(work: (client: pg.Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: inject('clusterUrl') });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

/** Reads with a superuser's eyes, past every policy: for asserting on rows, never for making them. */
export async function readAsSuperuser<T>(
  url: string,
  sql: string,
  values: readonly unknown[] = [],
): Promise<T[]> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    const { rows } = await client.query(sql, [...values]);
    return rows as T[];
  } finally {
    await client.end();
  }
}
