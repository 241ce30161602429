import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';

/** Changes the state of a partnership that both sides have entered, if it is still the version seen. */
export async function setPartnership(
  tx: Tx,
  actor: Actor,
  change: {
    readonly partnerShopId: string;
    readonly version: number;
    readonly state: 'active' | 'paused' | 'ended';
  },
): Promise<boolean> {
  const { rows } = await tx.raw<{ rows: unknown[] }>(
    `update partnerships set state = ?, version = version + 1
     where a_shop_id = least(?::uuid, ?::uuid) and b_shop_id = greatest(?::uuid, ?::uuid) and version = ? and state <> 'invited' returning 1`,
    [
      ...[change.state, actor.shopId, change.partnerShopId, actor.shopId, change.partnerShopId],
      change.version,
    ],
  );
  return rows.length === 1;
}

/** Keeps a shop's own note about a partner; false when it is none. */
export async function keepNote(tx: Tx, actor: Actor, partnerShopId: string, text: string): Promise<boolean> {
  const { rows } = await tx.raw<{ rows: unknown[] }>(
    `insert into partner_notes (shop_id, partner_shop_id, text)
     select ?, s.id, ? from shops s where s.id = ? and exists (select 1 from partnerships p
       where p.a_shop_id = least(?::uuid, s.id) and p.b_shop_id = greatest(?::uuid, s.id))
     on conflict (shop_id, partner_shop_id) do update set text = excluded.text, version = partner_notes.version + 1 returning 1`,
    [actor.shopId, text, partnerShopId, actor.shopId, actor.shopId],
  );
  return rows.length === 1;
}
