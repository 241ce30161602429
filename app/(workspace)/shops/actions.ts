'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { action } from '@/lib/http/action';
import { emailSchema, shopNameSchema } from '@/lib/schemas/identity';
import { invitePartner } from '@/lib/services/invitations';
import { changePartnership, notePartner, remindPartner } from '@/lib/services/partners';

const schema = z.object({ requestKey: z.uuid(), shopName: shopNameSchema, email: emailSchema });

/** Invites a machine shop. */
export const invitePartnerAction = action(schema, async ({ data: { requestKey, ...input }, ask }) => {
  await invitePartner(ask, requestKey, input);
  revalidatePath('/shops');
  return { done: `${input.shopName} is invited. You can send it an order at once.` };
});

const stateSchema = z.object({
  partnerShopId: z.uuid(),
  version: z.coerce.number().int(),
  state: z.enum(['active', 'paused', 'ended']),
});
const STATES = {
  active: 'You work together again.',
  paused: 'Paused. Orders under way go on; no new ones can be sent.',
  ended: 'Ended. Orders under way go on; no new ones can be sent.',
} as const;

/** Pauses a partnership, takes it up again, or ends it. */
export const changePartnershipAction = action(stateSchema, async ({ data, ask }) => {
  await changePartnership(ask, data.partnerShopId, data.version, data.state);
  revalidatePath('/shops');
  return { done: STATES[data.state] };
});

const noteSchema = z.object({
  partnerShopId: z.uuid(),
  text: z.string().trim().max(2000, 'Use at most 2000 letters.'),
});

/** Keeps the shop's own note about a partner. */
export const notePartnerAction = action(noteSchema, async ({ data, ask }) => {
  await notePartner(ask, data.partnerShopId, data.text);
  revalidatePath('/shops');
  return { done: 'Kept. Only your own people see it.' };
});

/** Sends the way in once more. */
export const remindPartnerAction = action(z.object({ partnerShopId: z.uuid() }), async ({ data, ask }) => {
  await remindPartner(ask, data.partnerShopId);
  return { done: 'An e-mail with the way in is on its way.' };
});
