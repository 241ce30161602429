'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { ROLES } from '@/lib/domain/actor';
import { action } from '@/lib/http/action';
import { emailSchema, shopNameSchema, timeZoneSchema } from '@/lib/schemas/identity';
import { invitePerson } from '@/lib/services/invitations';
import { changeShop, removePerson } from '@/lib/services/shop-settings';

const timeSchema = z
  .string()
  .trim()
  .regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Write the time as 08:00.');
const shopSchema = z
  .object({
    version: z.coerce.number().int(),
    name: shopNameSchema,
    unit: z.enum(['in', 'mm']),
    timeZone: timeZoneSchema,
    opens: timeSchema,
    closes: timeSchema,
  })
  .refine(({ opens, closes }) => opens < closes, { path: ['closes'], error: 'It closes before it opens.' });

/** Keeps the shop's settings. */
export const changeShopAction = action(shopSchema, async ({ data: { version, ...shop }, ask }) => {
  await changeShop(ask, version, shop);
  revalidatePath('/', 'layout');
  return { done: 'Kept.' };
});

const inviteSchema = z.object({
  requestKey: z.uuid(),
  email: emailSchema,
  roles: z.array(z.enum(ROLES)).min(1, 'Choose at least one.'),
});

/** Invites a person into the shop. */
export const invitePersonAction = action(
  inviteSchema,
  async ({ data: { requestKey, ...input }, ask }) => {
    await invitePerson(ask, requestKey, input);
    return { done: `${input.email} is invited.` };
  },
  ['roles'],
);

/** Takes a person out of the shop. */
export const removePersonAction = action(z.object({ personId: z.uuid() }), async ({ data, ask }) => {
  await removePerson(ask, data.personId);
  revalidatePath('/settings');
  return { done: 'Removed. Their sign-ins open nothing here any more.' };
});
