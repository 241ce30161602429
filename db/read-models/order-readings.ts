import 'server-only';
import type { Tx } from '@/db/client';
import type { DecisionKind, Side } from '@/lib/domain/orders/facts';
import type { Length } from '@/lib/domain/quantity/length';

export interface ReadingView {
  readonly id: string;
  readonly lineId: string;
  readonly side: Side;
  readonly purpose: 'found' | 'cut' | 'check';
  readonly stage: 'found' | 'cut' | 'finished';
  readonly round: number;
  readonly rev: number | null;
  readonly feature: string;
  readonly position: string;
  readonly typedText: string;
  readonly size: Length;
  readonly author: string;
  readonly marks: readonly string[];
  readonly takenAt: string;
  /** Temperature of the part, thousandths of a degree Celsius. */
  readonly partMc: number | null;
  readonly instrument: string;
}

export interface DecisionView {
  readonly lineId: string;
  readonly round: number;
  readonly decision: DecisionKind;
  readonly reason: string;
  /** None means the whole line. */
  readonly features: readonly string[];
  readonly author: string;
}

export interface OrderReadings {
  readonly readings: readonly ReadingView[];
  readonly decisions: readonly DecisionView[];
}

/** Readings that stand (a corrected one is left out) and decisions on the work: one statement. Undefined outside one's orders. */
export async function loadReadings(tx: Tx, orderId: string): Promise<OrderReadings | undefined> {
  const { rows } = await tx.raw<{ rows: { readings: ReadingView[]; decisions: DecisionView[] }[] }>(
    `select coalesce((select json_agg(x) from (
         select r.id, r.line_id as "lineId", s.side, r.purpose, r.stage, r.round, r.rev, r.feature, r.position, r.typed_text as "typedText",
           r.size_nm as size, r.author_name as author, r.marks, r.taken_at as "takenAt", r.part_mc as "partMc", r.instrument_words as instrument
         from readings r join order_sides o on o.order_id = r.order_id and o.shop_id = app_shop()
         join lateral (select case when r.shop_id = o.shop_id then o.side when o.side = 'sender' then 'partner' else 'sender' end as side) s on true
         where r.order_id = ? and not exists (select 1 from readings c where c.replaces_id = r.id)
         order by r.recorded_at, r.id) x), '[]') as readings,
       coalesce((select json_agg(json_build_object('lineId', line_id, 'round', round, 'decision', decision, 'reason', reason, 'features', features, 'author', author_name) order by round, at)
         from line_decisions where order_id = ?), '[]') as decisions
     from order_sides mine where mine.order_id = ? and mine.shop_id = app_shop()`,
    [orderId, orderId, orderId],
  );
  return rows[0];
}
