import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';

/** A file as it is written down. */
export interface FileRow {
  readonly id: string;
  readonly orderId: string;
  readonly key: string;
  readonly name: string;
  readonly type: string;
  readonly bytes: number;
  readonly sha256: string;
  readonly width: number | null;
  readonly height: number | null;
  readonly thumbKey: string | null;
}

/** Writes a stored file down. */
export async function insertFile(tx: Tx, actor: Actor, row: FileRow): Promise<void> {
  await tx('attachments').insert({
    ...{
      id: row.id,
      shop_id: actor.shopId,
      person_id: actor.personId,
      order_id: row.orderId,
      key: row.key,
      name: row.name,
      type: row.type,
    },
    ...{
      bytes: row.bytes,
      sha256: row.sha256,
      width: row.width,
      height: row.height,
      thumb_key: row.thumbKey,
      state: 'ready',
    },
  });
}

/** What a file goes with. */
export interface FileOwner {
  readonly orderId: string;
  readonly messageId?: string;
  readonly moveId?: string;
  readonly snagId?: string;
  readonly restampId?: string;
}

/** Hangs one's own loose files of an order on a message, a hand-over, a snag or a restamped piece. */
export async function hangFiles(tx: Tx, actor: Actor, ids: readonly string[], on: FileOwner): Promise<void> {
  if (ids.length === 0) return;
  await tx('attachments')
    .where({
      shop_id: actor.shopId,
      order_id: on.orderId,
      message_id: null,
      move_id: null,
      snag_id: null,
      restamp_id: null,
    })
    .whereIn('id', [...ids])
    .update({
      message_id: on.messageId ?? null,
      move_id: on.moveId ?? null,
      snag_id: on.snagId ?? null,
      restamp_id: on.restampId ?? null,
    });
}

/** Where a file lies, if the asker may see it. */
export async function findFile(
  tx: Tx,
  id: string,
): Promise<{ key: string; thumbKey: string | null; name: string; type: string } | undefined> {
  const { rows } = await tx.raw<{
    rows: { key: string; thumbKey: string | null; name: string; type: string }[];
  }>(`select key, thumb_key as "thumbKey", name, type from attachments where id = ? and state = 'ready'`, [
    id,
  ]);
  return rows[0];
}
