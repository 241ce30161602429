import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor, ShopUnit } from '@/lib/domain/actor';
import type { Length } from '@/lib/domain/quantity/length';
import type { ComparatorSide } from '@/lib/domain/readings/judge';

/** One measured value as it is kept. */
export interface ReadingRow {
  readonly id: string;
  readonly lineId: string;
  readonly purpose: 'found' | 'cut' | 'check';
  readonly round: number;
  readonly stage: 'found' | 'cut' | 'finished';
  readonly rev: number | null;
  readonly feature: string;
  readonly position: string;
  readonly typedText: string;
  readonly unit: ShopUnit;
  readonly comparator: {
    readonly setTo: Length;
    readonly away: Length;
    readonly side: ComparatorSide;
  } | null;
  readonly size: Length;
  readonly instrument: string;
  readonly partMc: number | null;
  readonly temperatureText: string;
  readonly marks: readonly string[];
  readonly takenAt: string;
  readonly replacesId: string | null;
}

/** Adds readings; one that is there already, by its id, is left as it is. Answers the ids that were new. */
export async function insertReadings(
  tx: Tx,
  actor: Actor,
  orderId: string,
  rows: readonly ReadingRow[],
): Promise<string[]> {
  const added = await tx('readings')
    .insert(
      rows.map((row) => ({
        ...{
          id: row.id,
          order_id: orderId,
          line_id: row.lineId,
          shop_id: actor.shopId,
          person_id: actor.personId,
        },
        ...{
          author_name: actor.personName,
          purpose: row.purpose,
          round: row.round,
          stage: row.stage,
          rev: row.rev,
        },
        ...{
          feature: row.feature,
          position: row.position,
          typed_text: row.typedText,
          unit: row.unit,
          size_nm: row.size,
        },
        ...{
          set_to_nm: row.comparator?.setTo ?? null,
          away_nm: row.comparator?.away ?? null,
          side: row.comparator?.side ?? null,
        },
        ...{
          instrument_words: row.instrument,
          part_mc: row.partMc,
          part_temperature_text: row.temperatureText,
          marks: row.marks,
          taken_at: row.takenAt,
          replaces_id: row.replacesId,
        },
      })),
      ['id'],
    )
    .onConflict('id')
    .ignore();
  return (added as { id: string }[]).map(({ id }) => id);
}

/** Moves the order's log on without making anybody's form stale. */
export async function drawLogPlace(tx: Tx, orderId: string, count = 1): Promise<void> {
  await tx.raw('update orders set log_seq = log_seq + ? where id = ?', [count, orderId]);
}
