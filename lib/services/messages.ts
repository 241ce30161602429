import 'server-only';
import { begin } from '@/db/client';
import { hangFiles } from '@/db/repositories/files';
import { insertMessage, isWritten, markSeen } from '@/db/repositories/messages';
import { tellShop } from '@/db/repositories/notices';
import { findFacts, lockOrder } from '@/db/repositories/order-facts';
import { writeEvents } from '@/db/repositories/order-log';
import { drawLogPlace } from '@/db/repositories/readings';
import { now } from '@/lib/adapters/clock';
import type { Ticket } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';
import { requirePermission } from '@/lib/services/permission';

/** Writes to the other shop on the order's thread. The id is made by the writer: sent twice, it stands once. */
export async function writeMessage(
  ticket: Ticket,
  orderId: string,
  message: {
    readonly id: string;
    readonly kind: 'message' | 'we_spoke';
    readonly body: string;
    readonly files?: readonly string[];
  },
): Promise<{ id: string }> {
  return begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'message');
    const facts = (await lockOrder(tx, orderId)) ? await findFacts(tx, orderId) : undefined;
    if (!facts || facts.status === 'draft') throw new AppError('not_found', 'There is no such order.');
    if (await isWritten(tx, message.id)) return { id: message.id };
    const isSender = facts.sender.shopId === actor.shopId;
    const at = now().toISOString();
    await drawLogPlace(tx, orderId);
    const logged = { tx, actor, side: isSender ? ('sender' as const) : ('partner' as const), now: at };
    const eventId = await writeEvents(logged, { id: orderId, logSeq: facts.logSeq }, [
      { type: `order.${message.kind}`, payload: { messageId: message.id } },
    ]);
    await insertMessage(tx, actor, { ...message, orderId, eventId, at });
    await hangFiles(tx, actor, message.files ?? [], { orderId, messageId: message.id });
    const other = isSender ? facts.partner : facts.sender;
    if (other)
      await tellShop(
        tx,
        { shopId: other.shopId, orderId, seq: facts.logSeq + 1, kind: 'order.message', step: null },
        'message',
      );
    return { id: message.id };
  });
}

/** Notes how far a person has read the thread. @throws AppError not_found outside one's orders. */
export async function seeThread(ticket: Ticket, orderId: string, seq: number): Promise<{ seen: number }> {
  return begin(ticket, async (tx, actor) => {
    const seen = await markSeen(tx, actor, orderId, seq);
    if (seen === undefined) throw new AppError('not_found', 'There is no such order.');
    return { seen };
  });
}
