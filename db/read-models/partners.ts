import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';

export interface PartnerRow {
  readonly shopId: string;
  readonly name: string;
  readonly state: 'invited' | 'active' | 'paused' | 'ended';
  readonly isHere: boolean;
  readonly openOrders: number;
  readonly unit: 'in' | 'mm';
  readonly version: number;
  /** What the asker's shop notes for itself. */
  readonly note: string;
}

/** Shops that this shop works with: one statement. */
export async function loadPartners(tx: Tx, actor: Actor): Promise<PartnerRow[]> {
  const { rows } = await tx.raw<{ rows: PartnerRow[] }>(
    `select s.id as "shopId", s.name, p.state, s.claimed_at is not null as "isHere", s.unit, p.version,
       coalesce((select n.text from partner_notes n where n.shop_id = ? and n.partner_shop_id = s.id), '') as note,
       (select count(*)::int from order_sides o where o.shop_id = ? and o.other_shop_id = s.id and o.open) as "openOrders"
     from partnerships p join shops s on s.id = case when p.a_shop_id = ? then p.b_shop_id else p.a_shop_id end
     where ? in (p.a_shop_id, p.b_shop_id) order by s.name, s.id`,
    [actor.shopId, actor.shopId, actor.shopId, actor.shopId],
  );
  return rows;
}

export interface PersonRow {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly string[];
}

/** People of the shop. */
export async function loadPeople(tx: Tx, actor: Actor): Promise<PersonRow[]> {
  const { rows } = await tx.raw<{ rows: PersonRow[] }>(
    `select p.id, p.name, p.email_norm as email, m.roles from memberships m join people p on p.id = m.person_id
     where m.shop_id = ? and m.ended_at is null order by p.name, p.id`,
    [actor.shopId],
  );
  return rows;
}
