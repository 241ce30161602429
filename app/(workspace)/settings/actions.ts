'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { ROLES } from '@/lib/domain/actor';
import { action } from '@/lib/http/action';
import { emailSchema } from '@/lib/schemas/identity';
import { closedDaySchema, houseSchema, rolesSchema, shopSettingsSchema } from '@/lib/schemas/shop-settings';
import { invitePerson } from '@/lib/services/invitations';
import {
  changeHouse,
  changeRoles,
  changeShop,
  endSignIn,
  removePerson,
  setClosedDay,
} from '@/lib/services/shop-settings';

/** Keeps the shop's settings. */
export const changeShopAction = action(shopSettingsSchema, async ({ data: { version, settings }, ask }) => {
  await changeShop(ask, version, settings);
  revalidatePath('/', 'layout');
  return { done: 'Kept.' };
});

/** Closes the shop on a day. */
export const closeDayAction = action(closedDaySchema, async ({ data: { day, note }, ask }) => {
  await setClosedDay(ask, day, { note });
  revalidatePath('/settings');
  return { done: 'Closed on that day.' };
});

/** Opens it again. */
export const openDayAction = action(closedDaySchema.pick({ day: true }), async ({ data: { day }, ask }) => {
  await setClosedDay(ask, day, null);
  revalidatePath('/settings');
  return { done: 'Open on that day.' };
});

/** Keeps the shop's own defaults for worksheets. */
export const changeHouseAction = action(houseSchema, async ({ data: { version, house }, ask }) => {
  await changeHouse(ask, version, house);
  revalidatePath('/', 'layout');
  return { done: 'Kept. Sheets say “your shop’s default” where one speaks.' };
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

/** Gives a person other roles. */
export const changeRolesAction = action(
  rolesSchema,
  async ({ data: { personId, roles }, ask }) => {
    await changeRoles(ask, personId, roles);
    revalidatePath('/settings');
    return { done: 'Kept. They sign in anew.' };
  },
  ['roles'],
);

/** Takes a person out of the shop. */
export const removePersonAction = action(z.object({ personId: z.uuid() }), async ({ data, ask }) => {
  await removePerson(ask, data.personId);
  revalidatePath('/settings');
  return { done: 'Removed. Their sign-ins open nothing here any more.' };
});

/** Ends one of one's own sign-ins. */
export const endSignInAction = action(z.object({ signInId: z.uuid() }), async ({ data, ask }) => {
  await endSignIn(ask, data.signInId);
  revalidatePath('/settings');
  return { done: 'Ended.' };
});
