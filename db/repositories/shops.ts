import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor, Role, ShopUnit } from '@/lib/domain/actor';
import type { House } from '@/lib/domain/operations/house';

/** Changes the shop's row if it is still the version seen. */
export async function updateShop(
  tx: Tx,
  actor: Actor,
  version: number,
  row: { readonly name: string; readonly unit: ShopUnit; readonly timeZone: string },
): Promise<boolean> {
  const changed = await tx('shops')
    .where({ id: actor.shopId, version })
    .update({ name: row.name, unit: row.unit, time_zone: row.timeZone, version: version + 1 });
  return changed === 1;
}

/** Sets the shop's hours anew: the spans of each day, Monday first. */
export async function replaceHours(
  tx: Tx,
  actor: Actor,
  hours: readonly (readonly { readonly opens: string; readonly closes: string }[])[],
): Promise<void> {
  await tx('shop_hours').where({ shop_id: actor.shopId }).delete();
  const rows = hours.flatMap((spans, index) =>
    spans.map((span) => ({ shop_id: actor.shopId, weekday: index + 1, ...span })),
  );
  if (rows.length > 0) await tx('shop_hours').insert(rows);
}

/** Writes a closed day down, or its note anew. */
export async function closeDay(tx: Tx, actor: Actor, day: string, note: string): Promise<void> {
  await tx('shop_closed_days').where({ shop_id: actor.shopId, day }).delete();
  await tx('shop_closed_days').insert({ shop_id: actor.shopId, day, note });
}

/** Takes a closed day off the list. */
export async function openDay(tx: Tx, actor: Actor, day: string): Promise<void> {
  await tx('shop_closed_days').where({ shop_id: actor.shopId, day }).delete();
}

/** A shop's own defaults, as typed. */
export async function findHouse(tx: Tx, shopId: string): Promise<House> {
  const row = await tx<{ id: string; unit: ShopUnit; house: Partial<House> }>('shops')
    .where({ id: shopId })
    .first('unit', 'house');
  return { unit: row?.house.unit ?? row?.unit ?? 'in', typed: row?.house.typed ?? {} };
}

/** Keeps the shop's own defaults if the shop is still the version seen. */
export async function updateHouse(tx: Tx, actor: Actor, version: number, house: House): Promise<boolean> {
  const changed = await tx('shops')
    .where({ id: actor.shopId, version })
    .update({ house: JSON.stringify(house), version: version + 1 });
  return changed === 1;
}

/** Gives a member other roles; false when there is no such member. */
export async function updateRoles(
  tx: Tx,
  actor: Actor,
  personId: string,
  roles: readonly Role[],
): Promise<boolean> {
  const changed = await tx('memberships')
    .where({ shop_id: actor.shopId, person_id: personId })
    .whereNull('ended_at')
    .update({ roles: [...roles] });
  return changed === 1;
}

/** Ends one of the asker's own sign-ins. */
export async function endOwnSignIn(tx: Tx, actor: Actor, id: string): Promise<boolean> {
  const ended = await tx('sign_ins')
    .where({ id, person_id: actor.personId })
    .whereNull('ended_at')
    .update({ ended_at: tx.fn.now() });
  return ended === 1;
}

/** Ends a membership; false when there is none. */
export async function endMembership(tx: Tx, actor: Actor, personId: string): Promise<boolean> {
  const ended = await tx('memberships')
    .where({ shop_id: actor.shopId, person_id: personId })
    .whereNull('ended_at')
    .update({ ended_at: tx.fn.now() });
  return ended === 1;
}
