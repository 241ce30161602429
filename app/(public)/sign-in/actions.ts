'use server';

import { redirect } from 'next/navigation';
import { dropSession, keepSession, readSession } from '@/lib/auth/session-cookie';
import { openAction } from '@/lib/http/action';
import { askerOf } from '@/lib/http/asker';
import { signInSchema } from '@/lib/schemas/identity';
import { signIn, signOut, tokenHash } from '@/lib/services/identity';

/** Signs in, or says the same whatever was wrong. */
export const signInAction = openAction(signInSchema, async ({ email, password }) => {
  const secret = await signIn({ email, password, ...(await askerOf()) });
  if (secret === null) {
    return { message: 'This e-mail and password do not belong together.', values: { email } };
  }
  await keepSession(secret);
  redirect('/bench');
});

/** Ends the sign-in at once. */
export async function signOutAction(): Promise<void> {
  const secret = await readSession();
  if (secret !== undefined) await signOut({ tokenHash: tokenHash(secret) });
  await dropSession();
  redirect('/sign-in');
}
