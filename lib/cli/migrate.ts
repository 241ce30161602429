import knex from 'knex';
import { runMigrations } from 'graphile-worker';
import pg from 'pg';
import config from '@/knexfile';

/** Brings tables and job tables up to date: the tables as their owner, the job tables as theirs. */
async function migrate(): Promise<void> {
  const owner = knex(config);
  try {
    await owner.migrate.latest();
  } finally {
    await owner.destroy();
  }
  const jobsUrl = process.env['JOBS_DATABASE_URL'];
  if (jobsUrl === undefined) throw new Error('JOBS_DATABASE_URL is not set.');
  await runMigrations({ connectionString: jobsUrl });
  const jobs = new pg.Client({ connectionString: jobsUrl });
  await jobs.connect();
  try {
    await jobs.query(OUTBOX);
  } finally {
    await jobs.end();
  }
}

/** The only door from the application to the job tables; jobs commit or vanish with the data. */
const OUTBOX = `
  create schema if not exists outbox;
  create or replace function outbox.put(task text, ref json, job_key text, run_at timestamptz) returns void
    language sql security definer set search_path = graphile_worker, pg_temp as $$
    select graphile_worker.add_job(task, ref, run_at => run_at, max_attempts => 12, job_key => job_key) $$;
  revoke all on function outbox.put(text, json, text, timestamptz) from public;
  grant usage on schema outbox to wiretag_app;
  grant execute on function outbox.put(text, json, text, timestamptz) to wiretag_app;
`;

await migrate();
