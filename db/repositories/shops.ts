import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor, ShopUnit } from '@/lib/domain/actor';

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

/** Sets the same hours for Monday to Friday. */
export async function replaceHours(tx: Tx, actor: Actor, opens: string, closes: string): Promise<void> {
  await tx('shop_hours').where({ shop_id: actor.shopId }).delete();
  await tx('shop_hours').insert(
    [1, 2, 3, 4, 5].map((weekday) => ({ shop_id: actor.shopId, weekday, opens, closes })),
  );
}

/** Ends a membership; false when there is none. */
export async function endMembership(tx: Tx, actor: Actor, personId: string): Promise<boolean> {
  const ended = await tx('memberships')
    .where({ shop_id: actor.shopId, person_id: personId })
    .whereNull('ended_at')
    .update({ ended_at: tx.fn.now() });
  return ended === 1;
}
