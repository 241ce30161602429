import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor, ShopUnit } from '@/lib/domain/actor';

export interface ShopView {
  readonly name: string;
  readonly unit: ShopUnit;
  readonly timeZone: string;
  readonly version: number;
  readonly opens: string;
  readonly closes: string;
}

/** The asker's own shop, with its hours. */
export async function loadShop(tx: Tx, actor: Actor): Promise<ShopView> {
  const { rows } = await tx.raw<{ rows: ShopView[] }>(
    `select s.name, s.unit, s.time_zone as "timeZone", s.version,
       coalesce((select to_char(min(opens), 'HH24:MI') from shop_hours where shop_id = s.id), '08:00') as opens,
       coalesce((select to_char(max(closes), 'HH24:MI') from shop_hours where shop_id = s.id), '16:00') as closes
     from shops s where s.id = ?`,
    [actor.shopId],
  );
  const shop = rows[0];
  if (!shop) throw new RangeError('The asker has no shop');
  return shop;
}
