import 'server-only';
import { redirect } from 'next/navigation';
import { readSession } from '@/lib/auth/session-cookie';
import { AppError } from '@/lib/errors';
import { isSignedIn, tokenHash } from '@/lib/services/identity';

/** A signed-in browser's ticket. Whether it still opens anything is checked by the database in every transaction. */
export interface BrowserTicket {
  readonly tokenHash: string;
}

/** The ticket of a route or an action. @throws AppError unauthenticated without a session cookie. */
export async function requireTicket(): Promise<BrowserTicket> {
  const secret = await readSession();
  if (secret === undefined) throw new AppError('unauthenticated', 'Please sign in.');
  return { tokenHash: tokenHash(secret) };
}

/** The ticket of a page; goes to the sign-in page when nobody is signed in any more. */
export async function requirePageTicket(): Promise<BrowserTicket> {
  const secret = await readSession();
  if (secret === undefined) redirect('/sign-in');
  return { tokenHash: tokenHash(secret) };
}

/** For pages that show something else to those who are signed in. */
export async function findTicket(): Promise<BrowserTicket | undefined> {
  const secret = await readSession();
  if (secret === undefined) return undefined;
  const ticket = { tokenHash: tokenHash(secret) };
  return (await isSignedIn(ticket)) ? ticket : undefined;
}
