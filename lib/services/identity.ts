import 'server-only';
import { hash as hashPassword, verify as verifyPassword } from '@node-rs/argon2';
import { createHash } from 'node:crypto';
import { begin, beginUnknown, type Tx } from '@/db/client';
import {
  endSignIn,
  findColleagueForSignIn,
  findForSignIn,
  noteAccess,
  signUpShop,
  startSignIn,
  switchSignIn,
  takeTry,
} from '@/db/repositories/identity';
import { newId, newSecret } from '@/lib/adapters/ids';
import type { ShopUnit, Ticket } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';

/** OWASP's argon2id minimum: 19 MiB, two passes, one lane. */
const ARGON2 = { memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;
/** A hash of nobody's password: an unknown address costs as much time as a known one. */
const NOBODY = hashPassword(newSecret(), ARGON2);

/** What a sign-in asks. */
export interface SignInInput {
  readonly email: string;
  readonly password: string;
  readonly address: string;
  readonly agent: string;
}

/** The hash under which a sign-in's secret is kept. */
export function tokenHash(secret: string): string {
  return createHash('sha256').update(secret).digest('hex');
}

/** An address as it is compared: trimmed, lower case. */
export function normalEmail(email: string): string {
  return email.trim().toLowerCase();
}

/** Hashes a password for storage. */
export function hashNewPassword(password: string): Promise<string> {
  return hashPassword(password, ARGON2);
}

/**
 * Signs a person in and answers the secret for the cookie; null for anything wrong, without saying what.
 * @throws AppError rate_limited after ten tries for one address in a quarter of an hour.
 */
export async function signIn({ email, password, address, agent }: SignInInput): Promise<string | null> {
  const norm = normalEmail(email);
  const allowed = await beginUnknown(
    async (tx) => (await takeTry(tx, `sign-in:${norm}`, 10, 900)) && takeTry(tx, `from:${address}`, 100, 900),
  );
  if (!allowed)
    throw new AppError(
      'rate_limited',
      'Too many tries. Wait a quarter of an hour, or set a new password by e-mail.',
    );
  const found = await beginUnknown((tx) => findForSignIn(tx, norm));
  const right = await verifyPassword(found?.passwordHash ?? (await NOBODY), password);
  if (!found?.passwordHash || !found.shopId || !right) {
    await beginUnknown((tx) =>
      noteAccess(tx, { kind: 'sign_in', personId: found?.personId ?? null, address, ok: false }),
    );
    return null;
  }
  const known = { personId: found.personId, shopId: found.shopId };
  return beginUnknown((tx) => openSignIn(tx, { ...known, address, agent }));
}

/** Another person of the same shop takes over a shared screen: their own password, their own name on what follows. */
export async function changePerson(
  ticket: { readonly tokenHash: string },
  input: {
    readonly personId: string;
    readonly password: string;
    readonly address: string;
    readonly agent: string;
  },
): Promise<string | null> {
  const allowed = await beginUnknown((tx) =>
    takeTry(tx, `change:${ticket.tokenHash}:${input.personId}`, 10, 900),
  );
  if (!allowed) throw new AppError('rate_limited', 'Too many tries. Wait a quarter of an hour.');
  const found = await beginUnknown((tx) => findColleagueForSignIn(tx, ticket.tokenHash, input.personId));
  const right = await verifyPassword(found?.passwordHash ?? (await NOBODY), input.password);
  if (!found?.passwordHash || !found.shopId || !right) return null;
  const known = { personId: found.personId, shopId: found.shopId };
  return beginUnknown(async (tx) => {
    await endSignIn(tx, ticket.tokenHash);
    return openSignIn(tx, { ...known, address: input.address, agent: input.agent });
  });
}

/** Ends a sign-in at once: the next request with it finds nobody. */
export async function signOut(ticket: { readonly tokenHash: string }): Promise<void> {
  await beginUnknown((tx) => endSignIn(tx, ticket.tokenHash));
}

/** Goes over to another of the person's shops. */
export async function switchShop(ticket: { readonly tokenHash: string }, shopId: string): Promise<void> {
  const switched = await beginUnknown((tx) => switchSignIn(tx, ticket.tokenHash, shopId));
  if (!switched) throw new AppError('not_found', 'You are not in that shop.');
}

/** A new shop with its first person, who is its owner. */
export async function openShop(input: {
  readonly shopId?: string;
  readonly personId?: string;
  readonly shopName: string;
  readonly unit: ShopUnit;
  readonly currency: string;
  readonly timeZone: string;
  readonly email: string;
  readonly personName: string;
  readonly password: string;
}): Promise<{ shopId: string; personId: string } | null> {
  const ids = { shopId: input.shopId ?? newId(), personId: input.personId ?? newId() };
  const passwordHash = await hashNewPassword(input.password);
  const opened = await beginUnknown((tx) =>
    signUpShop(tx, { ...input, ...ids, email: normalEmail(input.email), passwordHash }),
  );
  return opened ? ids : null;
}

/** Says whether a ticket still opens anything. */
export async function isSignedIn(ticket: Ticket): Promise<boolean> {
  try {
    return await begin(ticket, () => Promise.resolve(true));
  } catch (error) {
    if (error instanceof AppError && error.code === 'unauthenticated') return false;
    throw error;
  }
}

async function openSignIn(
  tx: Tx,
  by: { personId: string; shopId: string; address: string; agent: string },
): Promise<string | null> {
  const secret = newSecret();
  const started = await startSignIn(tx, { id: newId(), tokenHash: tokenHash(secret), ...by });
  await noteAccess(tx, { kind: 'sign_in', personId: by.personId, address: by.address, ok: started });
  return started ? secret : null;
}
