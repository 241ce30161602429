import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';

interface MessageRow {
  readonly id: string;
  readonly orderId: string;
  readonly kind: 'message' | 'we_spoke';
  readonly body: string;
  readonly eventId: number;
  readonly at: string;
}

/** Whether a message of this id stands already. */
export async function isWritten(tx: Tx, id: string): Promise<boolean> {
  const row: unknown = await tx('messages').where({ id }).first('id');
  return row !== undefined;
}

/** Adds a message to the thread. */
export async function insertMessage(tx: Tx, actor: Actor, row: MessageRow): Promise<void> {
  await tx('messages').insert({
    ...{
      id: row.id,
      order_id: row.orderId,
      shop_id: actor.shopId,
      person_id: actor.personId,
      author_name: actor.personName,
    },
    ...{ kind: row.kind, body: row.body, event_id: row.eventId, at: row.at },
  });
}

/** Notes how far the asker has read, never back and never past the end; undefined outside the asker's orders. */
export async function markSeen(
  tx: Tx,
  actor: Actor,
  orderId: string,
  seq: number,
): Promise<number | undefined> {
  const { rows } = await tx.raw<{ rows: { seen: number }[] }>(
    `insert into thread_reads (person_id, order_id, shop_id, seen_seq)
     select ?, o.id, ?, least(?, o.log_seq) from orders o where o.id = ?
     on conflict (person_id, order_id) do update set seen_seq = greatest(thread_reads.seen_seq, excluded.seen_seq)
     returning seen_seq as seen`,
    [actor.personId, actor.shopId, seq, orderId],
  );
  return rows[0]?.seen;
}
