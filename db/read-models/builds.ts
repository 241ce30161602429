import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';
import type { Made } from '@/lib/domain/builds/made';

export interface BuildListRow {
  readonly id: string;
  readonly number: number;
  readonly engine: string;
  readonly customerName: string | null;
  readonly neededOn: string | null;
  readonly parts: number;
  readonly openOrders: number;
}

export interface PartView {
  readonly id: string;
  readonly kind: string;
  readonly makerNo: string;
  readonly stamps: readonly string[];
  readonly pieces: number;
  readonly condition: string;
  readonly buildId: string | null;
  readonly where: readonly {
    readonly place: string;
    readonly pieces: number;
    readonly shop: string | null;
    readonly orderNumber: number | null;
  }[];
}

export interface BuildView {
  readonly id: string;
  readonly number: number;
  readonly engine: string;
  readonly made: Made;
  readonly customerName: string | null;
  readonly notes: string;
  readonly neededOn: string | null;
  readonly version: number;
  readonly parts: readonly PartView[];
  readonly orders: readonly {
    readonly orderId: string;
    readonly number: number;
    readonly title: string;
    readonly status: string;
    readonly step: string | null;
    readonly theirStep: string | null;
  }[];
}

/** The shop's builds, newest first. */
export async function loadBuilds(tx: Tx, actor: Actor): Promise<BuildListRow[]> {
  const { rows } = await tx.raw<{ rows: BuildListRow[] }>(
    `select b.id, b.number, b.engine, b.customer_name as "customerName", b.needed_on::text as "neededOn",
       (select count(*)::int from parts p where p.build_id = b.id) as parts,
       (select count(*)::int from orders o where o.build_id = b.id and o.ended_at is null) as "openOrders"
     from builds b where b.shop_id = ? and b.archived_at is null order by b.number desc limit 200`,
    [actor.shopId],
  );
  return rows;
}

const PART = `p.id, p.kind, p.maker_no as "makerNo", p.stamps, p.pieces, p.condition, p.build_id as "buildId",
  coalesce((select json_agg(json_build_object('place', w.place, 'pieces', w.pieces, 'shop', o.name, 'orderNumber', s.number) order by w.place)
    from part_places w left join order_sides s on s.order_id = w.order_id and s.shop_id = p.shop_id left join shops o on o.id = s.other_shop_id
    where w.part_id = p.id and w.pieces > 0), '[]') as where`;

/** One build with its parts and orders: one statement. Undefined outside the shop. */
export async function loadBuild(tx: Tx, actor: Actor, buildId: string): Promise<BuildView | undefined> {
  const { rows } = await tx.raw<{ rows: BuildView[] }>(
    `select b.id, b.number, b.engine, b.made, b.customer_name as "customerName", b.notes, b.needed_on::text as "neededOn", b.version,
       coalesce((select json_agg(x) from (select ${PART.replace(' as where', ' as "where"')} from parts p where p.build_id = b.id order by p.kind, p.id) x), '[]') as parts,
       coalesce((select json_agg(x) from (select s.order_id as "orderId", s.number, s.title, s.status, s.step, s.their_step as "theirStep"
         from orders o join order_sides s on s.order_id = o.id and s.shop_id = b.shop_id where o.build_id = b.id order by s.number desc) x), '[]') as orders
     from builds b where b.id = ? and b.shop_id = ?`,
    [buildId, actor.shopId],
  );
  return rows[0];
}

/** Parts of the shop that an order can be made for, with their builds. */
export async function loadParts(
  tx: Tx,
  actor: Actor,
): Promise<(PartView & { engine: string | null; buildNumber: number | null })[]> {
  const { rows } = await tx.raw<{
    rows: (PartView & { engine: string | null; buildNumber: number | null })[];
  }>(
    `select ${PART.replace(' as where', ' as "where"')}, b.engine, b.number as "buildNumber" from parts p left join builds b on b.id = p.build_id
     where p.shop_id = ? order by b.number desc nulls last, p.kind, p.id limit 500`,
    [actor.shopId],
  );
  return rows;
}
