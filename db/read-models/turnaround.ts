import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';
import type { BookedTo } from '@/lib/domain/turnaround/turnaround';

export interface TurnaroundOrder {
  readonly orderId: string;
  readonly partner: string;
  readonly operations: readonly string[];
  readonly firstPromisedOn: string | null;
  /** The day on which the parts were ready to leave, in the partner's zone; null where that was never said. */
  readonly readyOn: string | null;
  readonly legs: readonly {
    readonly bookedTo: BookedTo;
    readonly calendarShopId: string;
    readonly startedAt: string;
    readonly endedAt: string;
  }[];
}

/** So many finished orders are looked at; of a busier shop the latest ones. */
export const MOST_FINISHED = 5000;

/** Finished orders that this shop sent, with their clock legs, since a moment: two statements. */
export async function loadFinished(
  tx: Tx,
  actor: Actor,
  since: Date,
): Promise<{ orders: readonly TurnaroundOrder[]; open: number }> {
  const { rows } = await tx.raw<{ rows: TurnaroundOrder[] }>(
    `with done as materialized (select id from orders where sender_shop_id = ? and status = 'closed' and ended_at >= ?
       order by ended_at desc limit ${MOST_FINISHED})
     select o.id as "orderId", p.name as partner, o.first_promised_on::text as "firstPromisedOn",
       (select json_agg(distinct l.title) from order_lines l where l.order_id = o.id and l.removed_at is null) as operations,
       (select (min(e.occurred_at) at time zone p.time_zone)::date::text from events e where e.order_id = o.id and e.type = 'order.report') as "readyOn",
       (select json_agg(json_build_object('bookedTo', g.booked_to, 'calendarShopId', g.calendar_shop_id, 'startedAt', g.started_at, 'endedAt', g.ended_at) order by g.n)
         from clock_legs g where g.order_id = o.id and g.ended_at is not null) as legs
     from done join orders o using (id) join shops p on p.id = o.partner_shop_id order by o.ended_at desc`,
    [actor.shopId, since],
  );
  const { rows: open } = await tx.raw<{ rows: { open: number }[] }>(
    `select count(*)::int as open from order_sides where shop_id = ? and side = 'sender' and open and status <> 'draft'`,
    [actor.shopId],
  );
  return {
    orders: rows.map((row) => ({ ...row, legs: (row.legs as TurnaroundOrder['legs'] | null) ?? [] })),
    open: open[0]?.open ?? 0,
  };
}
