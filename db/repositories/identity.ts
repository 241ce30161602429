import 'server-only';
import type { Tx } from '@/db/client';
import type { ShopUnit } from '@/lib/domain/actor';

/** A person as the sign-in sees them. */
export interface SignInCandidate {
  readonly personId: string;
  readonly passwordHash: string | null;
  readonly shopId: string | null;
}

/** Finds the person of an address with the shop they land in. */
export async function findForSignIn(tx: Tx, email: string): Promise<SignInCandidate | undefined> {
  return firstOf(
    tx,
    'select person_id as "personId", password_hash as "passwordHash", shop_id as "shopId" from find_for_sign_in(?)',
    [email],
  );
}

/** Finds a colleague in the shop of a running sign-in. */
export async function findColleagueForSignIn(
  tx: Tx,
  tokenHash: string,
  personId: string,
): Promise<SignInCandidate | undefined> {
  const sql =
    'select person_id as "personId", password_hash as "passwordHash", shop_id as "shopId" from find_colleague_for_sign_in(?, ?)';
  return firstOf(tx, sql, [tokenHash, personId]);
}

/** Begins a sign-in; false when the person is no longer in the shop. */
export async function startSignIn(
  tx: Tx,
  row: {
    readonly id: string;
    readonly tokenHash: string;
    readonly personId: string;
    readonly shopId: string;
    readonly agent: string;
  },
): Promise<boolean> {
  return truth(tx, 'start_sign_in(?, ?, ?, ?, ?)', [
    row.id,
    row.tokenHash,
    row.personId,
    row.shopId,
    row.agent,
  ]);
}

/** Ends a sign-in. */
export async function endSignIn(tx: Tx, tokenHash: string): Promise<void> {
  await tx.raw('select end_sign_in(?)', [tokenHash]);
}

/** Moves a sign-in to another of the person's shops. */
export async function switchSignIn(tx: Tx, tokenHash: string, shopId: string): Promise<boolean> {
  return truth(tx, 'switch_shop(?, ?)', [tokenHash, shopId]);
}

/** Counts one try against a limit; false when it is used up. */
export async function takeTry(tx: Tx, key: string, most: number, windowSeconds: number): Promise<boolean> {
  return truth(tx, 'take_try(?, ?, ?)', [key, most, windowSeconds]);
}

/** Writes the access log. */
export async function noteAccess(
  tx: Tx,
  row: {
    readonly kind: string;
    readonly personId: string | null;
    readonly address: string;
    readonly ok: boolean;
  },
): Promise<void> {
  await tx.raw('select note_access(?, ?, null, ?, ?)', [row.kind, row.personId, row.address, row.ok]);
}

/** Opens a shop with its first person; false when the address is taken. */
export async function signUpShop(
  tx: Tx,
  row: {
    readonly shopId: string;
    readonly shopName: string;
    readonly unit: ShopUnit;
    readonly currency: string;
    readonly timeZone: string;
    readonly personId: string;
    readonly email: string;
    readonly personName: string;
    readonly passwordHash: string;
  },
): Promise<boolean> {
  return truth(tx, 'sign_up_shop(?, ?, ?, ?, ?, ?, ?, ?, ?)', [
    ...[row.shopId, row.shopName, row.unit, row.currency, row.timeZone],
    ...[row.personId, row.email, row.personName, row.passwordHash],
  ]);
}

async function firstOf<T>(tx: Tx, sql: string, values: readonly string[]): Promise<T | undefined> {
  const { rows } = await tx.raw<{ rows: T[] }>(sql, [...values]);
  return rows[0];
}

async function truth(tx: Tx, call: string, values: readonly (string | number)[]): Promise<boolean> {
  const { rows } = await tx.raw<{ rows: { yes: boolean }[] }>(`select ${call} as yes`, [...values]);
  return rows[0]?.yes ?? false;
}

/** An owner of the shop, the longest there; for background tasks. */
export async function ownerOfShop(tx: Tx, shopId: string): Promise<string | undefined> {
  const { rows } = await tx.raw<{ rows: { id: string | null }[] }>('select owner_of_shop(?) as id', [shopId]);
  return rows[0]?.id ?? undefined;
}

/** Writes a reset down if the address has an account; only the hash of its secret is kept. */
export async function beginReset(
  tx: Tx,
  row: { readonly id: string; readonly email: string; readonly tokenHash: string },
): Promise<boolean> {
  return truth(tx, '(begin_reset(?, ?, ?) is not null)', [row.id, row.email, row.tokenHash]);
}

/** Takes a reset once, sets the password and ends the person's sign-ins; false for a used or old link. */
export async function takeReset(tx: Tx, tokenHash: string, passwordHash: string): Promise<boolean> {
  return truth(tx, '(take_reset(?, ?) is not null)', [tokenHash, passwordHash]);
}

/** Each claimed shop with an owner of it. */
export async function listOwners(tx: Tx): Promise<{ shopId: string; personId: string }[]> {
  const { rows } = await tx.raw<{ rows: { shopId: string; personId: string }[] }>(
    'select shop_id as "shopId", person_id as "personId" from shops_to_check()',
  );
  return rows;
}
