'use server';

import { redirect } from 'next/navigation';
import { keepSession } from '@/lib/auth/session-cookie';
import { openAction } from '@/lib/http/action';
import { askerOf } from '@/lib/http/asker';
import { acceptSchema } from '@/lib/schemas/identity';
import { signIn } from '@/lib/services/identity';
import { acceptInvitation, readInvitation } from '@/lib/services/invitations';

/** Accepts an invitation and signs its person in. */
export const acceptAction = openAction(acceptSchema, async ({ secret, orderId, name, password }) => {
  const invitation = await readInvitation(secret);
  await acceptInvitation(secret, { name, password, signedInId: null });
  const signedIn = invitation && (await signIn({ email: invitation.email, password, ...(await askerOf()) }));
  if (signedIn) await keepSession(signedIn);
  redirect(orderId === undefined ? '/bench' : `/orders/${orderId}`);
});
