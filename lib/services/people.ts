import 'server-only';
import { beginUnknown } from '@/db/client';
import { listOwners, ownerOfShop } from '@/db/repositories/identity';

/** An owner of a shop, in whose name a background task acts; undefined for a shop that nobody has claimed. */
export async function findOwnerOf(shopId: string): Promise<string | undefined> {
  return beginUnknown((tx) => ownerOfShop(tx, shopId));
}

/** Each shop that somebody has claimed, with an owner in whose name it is looked through. */
export async function listShopsToCheck(): Promise<{ shopId: string; personId: string }[]> {
  return beginUnknown(listOwners);
}
