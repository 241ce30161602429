'use server';

import { cookies } from 'next/headers';
import { redirect } from 'next/navigation';
import { z } from 'zod';
import { keepSession } from '@/lib/auth/session-cookie';
import { action } from '@/lib/http/action';
import { askerOf } from '@/lib/http/asker';
import { changePerson, switchShop } from '@/lib/services/identity';

const personSchema = z.object({
  personId: z.uuid('Choose who you are.'),
  password: z.string().min(1, 'Give your password.').max(200),
});

/** Another person takes over this screen with their own password. */
export const changePersonAction = action(personSchema, async ({ data, ask }) => {
  const secret = await changePerson(ask, { ...data, ...(await askerOf()) });
  if (secret === null)
    return { message: 'This password is not the right one.', values: { personId: data.personId } };
  await keepSession(secret);
  redirect('/bench');
});

/** Goes over to another shop of the same person. */
export const switchShopAction = action(z.object({ shopId: z.uuid() }), async ({ data, ask }) => {
  await switchShop(ask, data.shopId);
  redirect('/bench');
});

/** Day or night shift: kept in a cookie of this browser. */
export async function switchShiftAction(form: FormData): Promise<void> {
  const shift = form.get('shift') === 'night' ? 'night' : 'day';
  (await cookies()).set('shift', shift, { path: '/', sameSite: 'lax', maxAge: 365 * 24 * 3600 });
}
