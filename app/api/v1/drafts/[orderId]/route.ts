import { z } from 'zod';
import { answerJson, route } from '@/lib/http/route';
import { draftSchema } from '@/lib/schemas/order-draft';
import { keepDraft } from '@/lib/services/order-drafts';

/** Keeps a draft as it stands on the screen; version 0 in If-Match makes it. Its id is made with the page. */
export const PUT = route({
  params: z.object({ orderId: z.uuid() }),
  body: draftSchema,
  ifMatch: true,
  handle: async ({ ticket, params, body, version }) => {
    const kept = await keepDraft(ticket, { id: params.orderId, version }, body);
    return answerJson(kept, kept);
  },
});
