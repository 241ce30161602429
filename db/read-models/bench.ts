import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';
import type { Clock, PunchState, Status } from '@/lib/domain/orders/facts';

/** An order as a stub: all that a list shows of it. */
export interface OrderStub {
  readonly orderId: string;
  readonly number: number;
  readonly side: 'sender' | 'partner';
  readonly otherShop: string | null;
  readonly title: string;
  readonly status: Status;
  readonly step: string | null;
  readonly theirStep: string | null;
  readonly clock: Clock;
  readonly clockSince: Date;
  readonly neededBackOn: string | null;
  readonly promisedOn: string | null;
  readonly punches: { readonly price: PunchState; readonly parts: PunchState; readonly sizes: PunchState };
  readonly stopped: boolean;
  readonly clear: boolean;
  /** Messages of others that the asker has not seen yet. */
  readonly unread: number;
}

export interface Bench {
  readonly yours: readonly OrderStub[];
  readonly theirs: readonly OrderStub[];
  readonly yoursCount: number;
  readonly theirsCount: number;
  readonly places: readonly { readonly name: string; readonly pieces: number }[];
  readonly comingBack: readonly {
    readonly orderId: string;
    readonly number: number;
    readonly title: string;
    readonly promisedOn: string;
  }[];
  readonly isNew: boolean;
}

/** Columns of a stub, from one's own side row and nothing else. */
export const STUB_COLUMNS = `s.order_id as "orderId", s.number, s.side, s.title, s.status, s.step, s.their_step as "theirStep", s.clock,
  s.clock_since as "clockSince", s.needed_back_on::text as "neededBackOn", s.promised_on::text as "promisedOn", s.stopped, s.clear,
  json_build_object('price', s.price_punch, 'parts', s.parts_punch, 'sizes', s.sizes_punch) as punches,
  (select o.name from shops o where o.id = s.other_shop_id) as "otherShop",
  (select count(*)::int from events e where e.order_id = s.order_id and e.type in ('order.message', 'order.we_spoke') and e.person_id <> app_person()
    and e.seq > coalesce((select r.seen_seq from thread_reads r where r.order_id = s.order_id and r.person_id = app_person()), 0)) as unread`;

const ROWS = 30;

/** Counting ends here; the screen then says how many there are at least. */
export const MOST_COUNTED = 1000;

/** Your move, their move, where the parts are, what comes back: three statements whatever the shop's size. */
export async function loadBench(tx: Tx, actor: Actor): Promise<Bench> {
  const stubs = await tx.raw<{ rows: (OrderStub & { mine: boolean; all: number })[] }>(
    `select * from (
       (select ${STUB_COLUMNS}, true as mine from order_sides s where s.shop_id = ? and s.open and s.step is not null
         order by s.clock_since, s.order_id limit ${ROWS})
       union all
       (select ${STUB_COLUMNS}, false as mine from order_sides s where s.shop_id = ? and s.open and s.step is null
         order by s.clock_since, s.order_id limit ${ROWS})) as both_lists`,
    [actor.shopId, actor.shopId],
  );
  const counts = await tx.raw<{ rows: { yours: number; theirs: number; builds: number }[] }>(
    `select (select count(*)::int from (select 1 from order_sides where shop_id = ? and open and step is not null limit ${MOST_COUNTED}) x) as yours,
       (select count(*)::int from (select 1 from order_sides where shop_id = ? and open and step is null limit ${MOST_COUNTED}) x) as theirs,
       (select count(*)::int from (select 1 from order_sides where shop_id = ? order by number desc limit 1) any_order) as builds`,
    [actor.shopId, actor.shopId, actor.shopId],
  );
  const side = await loadSide(tx, actor);
  const count = counts.rows[0] ?? { yours: 0, theirs: 0, builds: 0 };
  return {
    yours: stubs.rows.filter((row) => row.mine),
    theirs: stubs.rows.filter((row) => !row.mine),
    ...{ yoursCount: count.yours, theirsCount: count.theirs, isNew: count.builds === 0 },
    ...side,
  };
}

async function loadSide(tx: Tx, actor: Actor): Promise<Pick<Bench, 'places' | 'comingBack'>> {
  const { rows } = await tx.raw<{ rows: Pick<Bench, 'places' | 'comingBack'>[] }>(
    `with mine as materialized (select order_id, side, other_shop_id from order_sides where shop_id = ? and open limit 5000),
     placed as (
       select case when p.place = 'partner' then coalesce(o.name, 'Elsewhere') else 'On the road' end as name,
         case when p.place = 'partner' then 1 else 2 end as rank, p.pieces
       from part_places p left join shops o on o.id = p.with_shop_id
       where p.shop_id = ? and p.place <> 'home' and p.pieces > 0
       union all
       select 'Here, for an open order', 0, p.pieces from part_places p where p.place = 'home' and p.pieces > 0
         and p.part_id in (select op.part_id from mine s join order_parts op on op.order_id = s.order_id where s.side = 'sender')
       union all
       select 'Here, from ' || o.name, 1, p.pieces from part_places p join shops o on o.id = p.shop_id
         where p.with_shop_id = ? and p.place = 'partner' and p.pieces > 0)
     select coalesce((select json_agg(json_build_object('name', name, 'pieces', pieces) order by rank, name)
         from (select name, rank, sum(pieces)::int as pieces from placed group by 1, 2) x), '[]') as places,
       coalesce((select json_agg(x) from (select s.order_id as "orderId", s.number, s.title, s.promised_on::text as "promisedOn" from order_sides s
         where s.shop_id = ? and s.side = 'sender' and s.open and s.promised_on is not null order by s.promised_on, s.number limit 6) x), '[]') as "comingBack"`,
    [actor.shopId, actor.shopId, actor.shopId, actor.shopId],
  );
  return rows[0] ?? { places: [], comingBack: [] };
}
