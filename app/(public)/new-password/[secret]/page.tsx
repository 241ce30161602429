import { setPasswordAction } from '@/app/(public)/new-password/actions';
import { TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { Sheet } from '@/components/ui/sheet';

export const metadata = { title: 'New password' };

export default async function SetPage({ params }: { params: Promise<{ secret: string }> }) {
  const { secret } = await params;
  return (
    <>
      <h1 className="mb-4">Set a new password</h1>
      <Sheet>
        <Form action={setPasswordAction} hidden={{ secret }} className="grid gap-4">
          <TextField
            name="password"
            label="New password"
            type="password"
            autoComplete="new-password"
            hint="At least 8 letters; 15 are better."
          />
          <Submit>Set it</Submit>
        </Form>
      </Sheet>
    </>
  );
}
