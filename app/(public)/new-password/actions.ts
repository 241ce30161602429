'use server';

import { redirect } from 'next/navigation';
import { z } from 'zod';
import { openAction } from '@/lib/http/action';
import { emailSchema, newPasswordSchema } from '@/lib/schemas/identity';
import { askForReset, setNewPassword } from '@/lib/services/password-reset';

/** Asks for a link; says the same whether the address has an account or not. */
export const askForResetAction = openAction(z.object({ email: emailSchema }), async ({ email }) => {
  await askForReset(email);
  return {
    done: 'If this address has an account, a mail with a link is on its way. The link opens once, within one hour.',
  };
});

/** Sets the new password; every sign-in of the person ends. */
export const setPasswordAction = openAction(
  z.object({ secret: z.string().min(20).max(100), password: newPasswordSchema }),
  async ({ secret, password }) => {
    await setNewPassword(secret, password);
    redirect('/sign-in');
  },
);
