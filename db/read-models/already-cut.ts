import 'server-only';
import type { Tx } from '@/db/client';
import type { Length } from '@/lib/domain/quantity/length';
import type { CutFeature } from '@/lib/domain/sizes/already-cut';

/** What was said at the last STOP of an order. */
export interface SaidAtStop {
  readonly rev: number;
  readonly author: string;
  readonly at: string;
  readonly cut: readonly {
    readonly lineId: string;
    readonly feature: string;
    readonly size: Length;
    readonly text: string;
  }[];
}

/** What is known to be cut in this round, by readings and by what was said at the last STOP: one statement. */
export async function loadAlreadyCut(
  tx: Tx,
  orderId: string,
): Promise<{ cut: readonly CutFeature[]; said: SaidAtStop | null }> {
  const { rows } = await tx.raw<{ rows: { read: CutFeature[]; said: SaidAtStop | null }[] }>(
    `select coalesce((select json_agg(x) from (
         select r.line_id as "lineId", r.feature, json_agg(r.size_nm order by r.recorded_at) as sizes
         from readings r join order_lines l on l.id = r.line_id and l.started_at is not null
         where r.order_id = o.id and r.purpose = 'cut' and r.stage <> 'found' and r.round = o.round
           and not exists (select 1 from readings c where c.replaces_id = r.id)
         group by r.line_id, r.feature) x), '[]') as read,
       (select json_build_object('rev', e.payload -> 'rev', 'cut', e.payload -> 'cut', 'author', e.author_name, 'at', e.occurred_at)
          from events e where e.order_id = o.id and e.type = 'order.answer_stop'
            -- A decision on the work begins a new round: what was said before it is not cut in this one.
            and e.seq > coalesce((select max(d.seq) from events d where d.order_id = o.id and d.type = 'order.decide'), 0)
          order by e.seq desc limit 1) as said
     from orders o where o.id = ?`,
    [orderId],
  );
  const { read = [], said = null } = rows[0] ?? {};
  const unread = (said?.cut ?? []).filter(
    (one) => !read.some(({ lineId, feature }) => lineId === one.lineId && feature === one.feature),
  );
  return {
    cut: [...read, ...unread.map(({ lineId, feature, size }) => ({ lineId, feature, sizes: [size] }))],
    said,
  };
}
