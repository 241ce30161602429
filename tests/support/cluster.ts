import { execFileSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import path from 'node:path';
import type { TestProject } from 'vitest/node';
import { makeRolesAndDatabase } from '@/db/roles';
import { reachableDataDir, removeCluster, startCluster } from '@/lib/cli/start/postgres';

declare module 'vitest' {
  interface ProvidedContext {
    clusterUrl: string;
  }
}

/** Passwords of the roles in test databases. */
export const TEST_PASSWORDS = { owner: 'owner', app: 'app', jobs: 'jobs' };

/** The database that each test file copies. */
export const TEMPLATE = 'test_template';

/** Starts a throwaway cluster unless the test runner has one, and migrates the template in it. */
export async function setup(project: TestProject): Promise<() => Promise<void>> {
  const given = process.env['TEST_CLUSTER_URL'];
  const dataDir = reachableDataDir(path.join(process.cwd(), '.wiretag', `tests-${process.pid}`));
  const own =
    given === undefined
      ? await startCluster({ dataDir, password: randomBytes(8).toString('hex'), throwaway: true })
      : undefined;
  const clusterUrl = given ?? own?.superuserUrl('postgres') ?? '';
  await makeRolesAndDatabase(clusterUrl, TEMPLATE, TEST_PASSWORDS);
  execFileSync(process.execPath, ['--conditions=react-server', '--import', 'tsx', 'lib/cli/migrate.ts'], {
    env: { ...process.env, ...databaseUrls(clusterUrl, TEMPLATE) },
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  project.provide('clusterUrl', clusterUrl);
  return async () => {
    await own?.stop();
    if (own) removeCluster(dataDir);
  };
}

/** Addresses of one database for the three roles. */
export function databaseUrls(
  clusterUrl: string,
  database: string,
): Record<'DATABASE_URL' | 'JOBS_DATABASE_URL' | 'OWNER_DATABASE_URL', string> {
  const address = (role: string, password: string) => {
    const url = new URL(clusterUrl);
    url.username = role;
    url.password = password;
    url.pathname = database;
    return url.href;
  };
  return {
    DATABASE_URL: address('wiretag_app', TEST_PASSWORDS.app),
    JOBS_DATABASE_URL: address('wiretag_jobs', TEST_PASSWORDS.jobs),
    OWNER_DATABASE_URL: address('wiretag_owner', TEST_PASSWORDS.owner),
  };
}
