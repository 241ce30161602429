'use server';

import { revalidatePath } from 'next/cache';
import { redirect } from 'next/navigation';
import { z } from 'zod';
import { action } from '@/lib/http/action';
import { emailSchema, shopNameSchema } from '@/lib/schemas/identity';
import { finishedDraftSchema } from '@/lib/schemas/order-draft';
import { namePartner } from '@/lib/services/invitations';
import { keepDraft } from '@/lib/services/order-drafts';

const schema = finishedDraftSchema.extend({
  requestKey: z.uuid(),
  orderId: z.uuid(),
  version: z.coerce.number().int().min(0),
});

/** Keeps a draft and goes to it. */
export const keepDraftAction = action(
  schema,
  async ({ data: { requestKey, orderId, version, ...draft }, ask }) => {
    await keepDraft(ask, { id: orderId, version, requestKey }, draft);
    redirect(`/orders/${orderId}`);
  },
  ['partIds', 'operations'],
);

const partnerSchema = z.object({ requestKey: z.uuid(), shopName: shopNameSchema, email: emailSchema });

/** Names a machine shop that is not here yet; its one e-mail goes out with the first order. */
export const namePartnerAction = action(partnerSchema, async ({ data: { requestKey, ...input }, ask }) => {
  await namePartner(ask, requestKey, input);
  revalidatePath('/orders', 'layout');
  return {
    done: `${input.shopName} can be chosen now. When you send the order it gets one e-mail, with the order and the way in.`,
  };
});
