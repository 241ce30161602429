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

/** The shop's builds, newest first, a page at a time; `next` is the number to go on below. */
export async function loadBuilds(
  tx: Tx,
  actor: Actor,
  page: { readonly limit: number; readonly below: number | null },
): Promise<{ rows: BuildListRow[]; next: number | null }> {
  const { rows } = await tx.raw<{ rows: BuildListRow[] }>(
    `select b.id, b.number, b.engine, b.customer_name as "customerName", b.needed_on::text as "neededOn",
       (select count(*)::int from parts p where p.build_id = b.id) as parts,
       (select count(*)::int from orders o where o.build_id = b.id and o.ended_at is null) as "openOrders"
     from builds b where b.shop_id = ? and b.archived_at is null and b.number < ? order by b.number desc limit ?`,
    [actor.shopId, page.below ?? 2_147_483_647, page.limit + 1],
  );
  const shown = rows.slice(0, page.limit);
  return { rows: shown, next: rows.length > page.limit ? (shown.at(-1)?.number ?? null) : null };
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
         from orders o join order_sides s on s.order_id = o.id and s.shop_id = b.shop_id where o.build_id = b.id order by s.number desc limit 100) x), '[]') as orders
     from builds b where b.id = ? and b.shop_id = ?`,
    [buildId, actor.shopId],
  );
  return rows[0];
}

/** A part in the list of all, with its build. */
export interface PartRow extends PartView {
  readonly engine: string | null;
  readonly buildNumber: number | null;
}

/** Parts of the shop with their builds, the newest first, a page at a time; `next` is where to go on from. */
export async function loadParts(
  tx: Tx,
  actor: Actor,
  page: { readonly limit: number; readonly after: string | null },
): Promise<{ rows: PartRow[]; next: string | null }> {
  const { rows } = await tx.raw<{ rows: PartRow[] }>(
    `select ${PART.replace(' as where', ' as "where"')}, b.engine, b.number as "buildNumber" from parts p left join builds b on b.id = p.build_id
     where p.shop_id = ? and (p.created_at, p.id) < (coalesce((select a.created_at from parts a where a.id = ?), 'infinity'), coalesce(?::uuid, 'ffffffff-ffff-ffff-ffff-ffffffffffff'))
     order by p.created_at desc, p.id desc limit ?`,
    [actor.shopId, page.after, page.after, page.limit + 1],
  );
  const shown = rows.slice(0, page.limit);
  return { rows: shown, next: rows.length > page.limit ? (shown.at(-1)?.id ?? null) : null };
}

/** So many parts at home stand to choose from on an order, the newest. */
const CHOICE = 300;

/** Parts that can go on an order: those that are chosen already, wherever they are, and the newest ones at home. */
export async function loadPartsToSend(
  tx: Tx,
  actor: Actor,
  orderId: string | null,
): Promise<{ parts: PartRow[]; chosen: string[] }> {
  const { rows } = await tx.raw<{ rows: (PartRow & { isChosen: boolean })[] }>(
    `with chosen as (select part_id from order_parts where order_id = ?),
       at_home as (select p.id from parts p where p.shop_id = ?
         and exists (select 1 from part_places h where h.part_id = p.id and h.place = 'home' and h.pieces > 0)
         order by p.created_at desc, p.id desc limit ${CHOICE})
     select ${PART.replace(' as where', ' as "where"')}, b.engine, b.number as "buildNumber",
       p.id in (select part_id from chosen) as "isChosen"
     from parts p left join builds b on b.id = p.build_id
     where p.shop_id = ? and p.id in (select part_id from chosen union select id from at_home)
     order by "isChosen" desc, p.created_at desc, p.id desc`,
    [orderId, actor.shopId, actor.shopId],
  );
  return { parts: rows, chosen: rows.filter(({ isChosen }) => isChosen).map(({ id }) => id) };
}
