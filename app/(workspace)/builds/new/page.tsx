import { randomUUID } from 'node:crypto';
import { createBuildAction } from '@/app/(workspace)/builds/actions';
import { BuildFields } from '@/components/builds/build-fields';
import { Form, Submit } from '@/components/forms/form';
import { Sheet } from '@/components/ui/sheet';
import { requirePageTicket } from '@/lib/auth/ticket';

export const metadata = { title: 'New build' };

export default async function NewBuildPage() {
  await requirePageTicket();
  return (
    <main className="page">
      <h1 className="mb-4">New build</h1>
      <div className="max-w-xl">
        <Sheet>
          <Form action={createBuildAction} requestKey={randomUUID()} className="grid gap-4">
            <BuildFields />
            <Submit>Open the build</Submit>
          </Form>
        </Sheet>
      </div>
    </main>
  );
}
