import 'server-only';
import type { Tx } from '@/db/client';
import type { MoveKind } from '@/lib/domain/orders/facts';

export interface MoveView {
  readonly id: string;
  readonly partId: string;
  readonly partKind: string;
  readonly kind: MoveKind;
  readonly pieces: number;
  readonly stamps: readonly string[];
  readonly kit: readonly string[];
  readonly carrier: string;
  readonly condition: string;
  readonly author: string;
  readonly shopName: string;
  readonly occurredAt: Date;
  readonly replaced: boolean;
}

/** Every hand-over of an order, oldest first: one statement. */
export async function loadMoves(tx: Tx, orderId: string): Promise<MoveView[]> {
  const { rows } = await tx.raw<{ rows: MoveView[] }>(
    `select m.id, m.part_id as "partId", p.kind as "partKind", m.kind, m.pieces, m.stamps, m.kit, m.carrier, m.condition,
       m.author_name as author, s.name as "shopName", m.occurred_at as "occurredAt",
       exists (select 1 from custody_moves r where r.replaces_id = m.id) as replaced
     from custody_moves m join order_parts p on p.order_id = m.order_id and p.part_id = m.part_id join shops s on s.id = m.shop_id
     where m.order_id = ? order by m.recorded_at, m.id`,
    [orderId],
  );
  return rows;
}
