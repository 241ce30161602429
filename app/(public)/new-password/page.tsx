import { askForResetAction } from '@/app/(public)/new-password/actions';
import { TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { Sheet } from '@/components/ui/sheet';

export const metadata = { title: 'New password' };

export default function AskPage() {
  return (
    <>
      <h1 className="mb-4">Set a new password</h1>
      <Sheet note="You get a link by e-mail.">
        <Form action={askForResetAction} className="grid gap-4">
          <TextField name="email" label="E-mail" type="email" autoComplete="username" />
          <Submit>Send the link</Submit>
        </Form>
      </Sheet>
    </>
  );
}
