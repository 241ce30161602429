import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';

export interface FeedRow {
  readonly seq: number;
  readonly orderId: string;
  readonly kind: string;
}

/** What happened in the shop after a number; ids only, never content. Null asks for the latest number alone. */
export async function loadFeed(
  tx: Tx,
  actor: Actor,
  after: number | null,
): Promise<{ rows: FeedRow[]; last: number }> {
  const { rows: top } = await tx.raw<{ rows: { last: number }[] }>(
    'select coalesce(max(seq), 0)::bigint as last from feed where shop_id = ?',
    [actor.shopId],
  );
  const last = top[0]?.last ?? 0;
  if (after === null || after >= last) return { rows: [], last };
  const { rows } = await tx.raw<{ rows: FeedRow[] }>(
    'select seq, order_id as "orderId", kind from feed where shop_id = ? and seq > ? order by seq limit 500',
    [actor.shopId, after],
  );
  return { rows, last: rows.at(-1)?.seq ?? last };
}
