'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { action } from '@/lib/http/action';
import { emailSchema, shopNameSchema } from '@/lib/schemas/identity';
import { invitePartner } from '@/lib/services/invitations';

const schema = z.object({ requestKey: z.uuid(), shopName: shopNameSchema, email: emailSchema });

/** Invites a machine shop. */
export const invitePartnerAction = action(schema, async ({ data: { requestKey, ...input }, ask }) => {
  await invitePartner(ask, requestKey, input);
  revalidatePath('/shops');
  return { done: `${input.shopName} is invited. You can send it an order at once.` };
});
