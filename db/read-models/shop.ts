import 'server-only';
import type { Tx } from '@/db/client';
import type { House } from '@/lib/domain/operations/house';
import type { Actor, ShopUnit } from '@/lib/domain/actor';

export interface ShopView {
  readonly name: string;
  readonly unit: ShopUnit;
  readonly timeZone: string;
  readonly version: number;
  /** Spans by ISO weekday, as `08:00`. */
  readonly hours: readonly { readonly weekday: number; readonly opens: string; readonly closes: string }[];
  /** From today on. */
  readonly closedDays: readonly { readonly day: string; readonly note: string }[];
  readonly house: House;
  readonly signIns: readonly {
    readonly id: string;
    readonly agent: string;
    readonly seenAt: string;
    readonly shop: string | null;
    readonly isThis: boolean;
  }[];
}

/** The asker's own shop with its hours and defaults, and where the asker is signed in: one statement. */
export async function loadShop(tx: Tx, actor: Actor, tokenHash: string): Promise<ShopView> {
  const { rows } = await tx.raw<{ rows: ShopView[] }>(
    `select s.name, s.unit, s.time_zone as "timeZone", s.version, json_build_object('unit', coalesce(s.house ->> 'unit', s.unit), 'typed', coalesce(s.house -> 'typed', '{}'::jsonb)) as house,
       coalesce((select json_agg(json_build_object('weekday', h.weekday, 'opens', to_char(h.opens, 'HH24:MI'), 'closes', to_char(h.closes, 'HH24:MI'))
         order by h.weekday, h.opens) from shop_hours h where h.shop_id = s.id), '[]') as hours,
       coalesce((select json_agg(json_build_object('day', c.day, 'note', c.note) order by c.day) from shop_closed_days c
         where c.shop_id = s.id and c.day >= (now() at time zone s.time_zone)::date), '[]') as "closedDays",
       coalesce((select json_agg(json_build_object('id', i.id, 'agent', i.agent, 'seenAt', i.seen_at,
           'shop', (select o.name from shops o where o.id = i.shop_id), 'isThis', i.id = sign_in_of(?)) order by i.seen_at desc)
         from sign_ins i where i.person_id = ? and i.ended_at is null and i.idle_until > now() and i.until > now()), '[]') as "signIns"
     from shops s where s.id = ?`,
    [tokenHash, actor.personId, actor.shopId],
  );
  const shop = rows[0];
  if (!shop) throw new RangeError('The asker has no shop');
  return shop;
}
