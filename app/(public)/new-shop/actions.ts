'use server';

import { redirect } from 'next/navigation';
import { keepSession } from '@/lib/auth/session-cookie';
import { openAction } from '@/lib/http/action';
import { askerOf } from '@/lib/http/asker';
import { newShopSchema } from '@/lib/schemas/identity';
import { openShop, signIn } from '@/lib/services/identity';

/** Opens a shop and signs its first person in. */
export const newShopAction = openAction(newShopSchema, async ({ name, ...shop }) => {
  const opened = await openShop({ ...shop, personName: name });
  const secret =
    opened && (await signIn({ email: shop.email, password: shop.password, ...(await askerOf()) }));
  if (!secret)
    return { message: 'This shop could not be opened with that address. Sign in, or use another address.' };
  await keepSession(secret);
  redirect('/bench');
});
