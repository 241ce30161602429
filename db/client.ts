import 'server-only';
import knex, { type Knex } from 'knex';
import pg from 'pg';
import type { Actor, Role, ShopUnit, Ticket } from '@/lib/domain/actor';
import { settings } from '@/lib/config/env';
import { AppError } from '@/lib/errors';

/** One open transaction in which somebody is known to be asking. */
export type Tx = Knex.Transaction;

// bigint arrives as text: a safe integer, or a bug. Dates stay text: a day has no time zone.
pg.types.setTypeParser(pg.types.builtins.INT8, (text) => {
  const value = Number(text);
  if (!Number.isSafeInteger(value)) throw new RangeError(`Not a safe integer: ${text}`);
  return value;
});
pg.types.setTypeParser(pg.types.builtins.DATE, (text) => text);

const POOL_SIZE = 20;
let pool: Knex | undefined;

/** The pool of the application's role. */
export function database(): Knex {
  pool ??= knex({
    client: 'pg',
    connection: settings().DATABASE_URL,
    pool: { min: 0, max: POOL_SIZE },
    acquireConnectionTimeout: 5000,
  });
  return pool;
}

/** Closes the pool; programs call it before they leave. */
export async function closeDatabase(): Promise<void> {
  await pool?.destroy();
  pool = undefined;
}

/**
 * Opens one transaction whose first statement checks who is asking and sets the shop.
 * @throws AppError unauthenticated when the sign-in has ended; unavailable when the database does not answer.
 */
export async function begin<T>(ticket: Ticket, work: (tx: Tx, actor: Actor) => Promise<T>): Promise<T> {
  return open(async (tx) => {
    const actor = await findActor(tx, ticket);
    if (!actor) throw new AppError('unauthenticated', 'Please sign in.');
    return work(tx, actor);
  });
}

/** Opens one transaction in which nobody is known: only the doors of identity answer there. */
export async function beginUnknown<T>(work: (tx: Tx) => Promise<T>): Promise<T> {
  return open(work);
}

async function open<T>(work: (tx: Tx) => Promise<T>): Promise<T> {
  try {
    return await openOnce(work);
  } catch (error) {
    if (!isOutage(error)) throw error;
    throw new AppError(
      'unavailable',
      'The records cannot be reached at the moment. Nothing was changed. Try again.',
    );
  }
}

/**
 * A line that died while it lay in the pool is found out at BEGIN, when nothing has been done yet: then another is
 * taken, until every line that the pool may hold has been tried.
 */
async function openOnce<T>(work: (tx: Tx) => Promise<T>, lines = POOL_SIZE): Promise<T> {
  try {
    return await database().transaction(work);
  } catch (error) {
    if (lines === 0 || !isDeadAtBegin(error)) throw error;
    return openOnce(work, lines - 1);
  }
}

/** A row of who is asking, as the database answers it. */
export interface AskerRow {
  person_id: string | null;
  person_name: string;
  shop_id: string;
  shop_name: string;
  roles: Role[];
  unit: ShopUnit;
  currency: string;
  time_zone: string;
}

async function findActor(tx: Tx, ticket: Ticket): Promise<Actor | undefined> {
  const { rows } =
    'tokenHash' in ticket
      ? await tx.raw<{ rows: AskerRow[] }>('select * from app_begin(?)', [ticket.tokenHash])
      : await tx.raw<{ rows: AskerRow[] }>('select * from app_begin_for(?, ?)', [
          ticket.shopId,
          ticket.personId,
        ]);
  return toActor(rows[0]);
}

/** Who is asking, or nobody. */
export function toActor(row: AskerRow | undefined): Actor | undefined {
  if (!row?.person_id) return undefined;
  return {
    personId: row.person_id,
    personName: row.person_name,
    shopId: row.shop_id,
    shopName: row.shop_name,
    roles: row.roles,
    unit: row.unit,
    currency: row.currency,
    timeZone: row.time_zone,
  };
}

const OUTAGE_CODES = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'ETIMEDOUT',
  'EPIPE',
  '57P01',
  '57P02',
  '57P03',
  '08006',
  '08001',
  '53300',
]);

function isOutage(error: unknown): boolean {
  if (!(error instanceof Error)) return false;
  if ('code' in error && typeof error.code === 'string' && OUTAGE_CODES.has(error.code)) return true;
  return (
    error instanceof knex.KnexTimeoutError ||
    /Connection terminated|timeout exceeded when trying to connect|not currently accepting connections/.test(
      error.message,
    )
  );
}

/** A connection that was there and is there no more, found out by the first word on it; knex puts that word before the error. */
function isDeadAtBegin(error: unknown): boolean {
  if (!(error instanceof Error) || !error.message.startsWith('BEGIN')) return false;
  const code = 'code' in error ? String(error.code) : '';
  return ['ECONNRESET', 'EPIPE', '57P01'].includes(code) || error.message.includes('Connection terminated');
}
