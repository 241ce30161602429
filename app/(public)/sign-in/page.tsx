import { redirect } from 'next/navigation';
import { signInAction } from '@/app/(public)/sign-in/actions';
import { Form, Submit } from '@/components/forms/form';
import { TextField } from '@/components/forms/fields';
import { Sheet } from '@/components/ui/sheet';
import { findTicket } from '@/lib/auth/ticket';

export const metadata = { title: 'Sign in' };

export default async function SignInPage() {
  if (await findTicket()) redirect('/bench');
  return (
    <>
      <h1 className="mb-4">Sign in</h1>
      <Sheet>
        <Form action={signInAction} className="grid gap-4">
          <TextField name="email" label="E-mail" type="email" autoComplete="username" />
          <TextField name="password" label="Password" type="password" autoComplete="current-password" />
          <div className="flex flex-wrap items-center justify-between gap-3">
            <Submit>Sign in</Submit>
            <a href="/new-password">Set a new password</a>
          </div>
        </Form>
      </Sheet>
      <p className="note mt-4">
        No shop here yet? <a href="/new-shop">Open your shop</a>
      </p>
    </>
  );
}
