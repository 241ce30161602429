import pg from 'pg';

/** Passwords of the three roles. */
export interface RolePasswords {
  readonly owner: string;
  readonly app: string;
  readonly jobs: string;
}

/**
 * Makes the three roles and the database where they are missing, and sets the roles' passwords.
 * wiretag_owner holds the tables and runs migrations; wiretag_app is the application; wiretag_jobs holds the
 * job tables and nothing else. None is a superuser and none may bypass row-level security.
 */
export async function makeRolesAndDatabase(
  superuserUrl: string,
  database: string,
  passwords: RolePasswords,
): Promise<void> {
  const client = new pg.Client({ connectionString: superuserUrl });
  await client.connect();
  try {
    for (const [role, password] of [
      ['wiretag_owner', passwords.owner],
      ['wiretag_app', passwords.app],
      ['wiretag_jobs', passwords.jobs],
    ] as const) {
      await makeRole(client, role, password);
    }
    // Short statements with many policies look dear to the planner; compiling each would cost a hundred times its run.
    await client.query('alter role wiretag_app set jit = off');
    await makeDatabase(client, database);
  } finally {
    await client.end();
  }
}

async function makeRole(client: pg.Client, role: string, password: string): Promise<void> {
  const { rowCount } = await client.query('select 1 from pg_roles where rolname = $1', [role]);
  const verb = rowCount === 0 ? 'create' : 'alter';
  const manners = 'login nosuperuser nocreatedb nocreaterole nobypassrls';
  await client.query(`${verb} role ${role} ${manners} password ${client.escapeLiteral(password)}`);
}

async function makeDatabase(client: pg.Client, database: string): Promise<void> {
  const { rowCount } = await client.query('select 1 from pg_database where datname = $1', [database]);
  const name = client.escapeIdentifier(database);
  if (rowCount === 0) await client.query(`create database ${name} owner wiretag_owner template template0`);
  await client.query(`revoke all on database ${name} from public`);
  await client.query(`grant connect on database ${name} to wiretag_app, wiretag_jobs`);
  await client.query(`grant create on database ${name} to wiretag_jobs`);
}
