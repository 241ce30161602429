import { z } from 'zod';
import { answerJson, route } from '@/lib/http/route';
import { seenSchema } from '@/lib/schemas/order-forms';
import { seeThread } from '@/lib/services/messages';

/** Notes how far the person has read the messages; the furthest stands, so it may be sent as often as one likes. */
export const PUT = route({
  params: z.object({ orderId: z.uuid() }),
  body: seenSchema,
  handle: async ({ ticket, params: { orderId }, body }) =>
    answerJson(await seeThread(ticket, orderId, body.seq)),
});
