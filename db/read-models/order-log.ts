import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';
import type { Clock, Facts } from '@/lib/domain/orders/facts';
import type { LogEntry } from '@/lib/domain/orders/fold';

/** An order as its tables say, beside its whole log. */
export interface LoggedOrder {
  readonly orderId: string;
  readonly says: {
    readonly status: Facts['status'];
    readonly round: number;
    readonly latestRev: number | null;
    readonly promisedOn: string | null;
    readonly punches: Facts['punches'];
    readonly stopped: boolean;
    readonly clear: boolean;
    readonly senderStep: string | null;
    readonly partnerStep: string | null;
    readonly clock: Clock;
    readonly legs: readonly {
      readonly bookedTo: string;
      readonly calendarShopId: string;
      readonly round: number;
      readonly startedSeq: number;
      readonly startedAt: string;
      readonly endedAt: string | null;
    }[];
  };
  readonly log: readonly LogEntry[];
}

/** Orders that the asker's shop sent, after an id, every nth by number, for holding tables and log against each other. */
export async function loadLogged(
  tx: Tx,
  actor: Actor,
  page: { readonly after: string; readonly limit: number; readonly every: number },
): Promise<LoggedOrder[]> {
  const { rows } = await tx.raw<{ rows: LoggedOrder[] }>(
    `select o.id as "orderId", json_build_object('status', o.status, 'round', o.round, 'latestRev', o.latest_rev, 'promisedOn', o.promised_on,
       'punches', json_build_object('price', o.price_punch, 'parts', o.parts_punch, 'sizes', o.sizes_punch),
       'stopped', o.stopped, 'clear', o.clear, 'senderStep', o.sender_step, 'partnerStep', o.partner_step, 'clock', o.clock,
       'legs', coalesce((select json_agg(json_build_object('bookedTo', g.booked_to, 'calendarShopId', g.calendar_shop_id, 'round', g.round,
         'startedSeq', g.started_seq, 'startedAt', g.started_at, 'endedAt', g.ended_at) order by g.n) from clock_legs g where g.order_id = o.id), '[]'::json)) as says,
       (select json_agg(json_build_object('seq', e.seq, 'at', e.occurred_at, 'did', e.did) order by e.seq) from events e where e.order_id = o.id) as log
     from orders o where o.sender_shop_id = ? and o.status <> 'draft' and o.id > ? and o.number % ? = 0 order by o.id limit ?`,
    [actor.shopId, page.after, page.every, page.limit],
  );
  return rows;
}
