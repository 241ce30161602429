import { z } from 'zod';
import { acceptAction } from '@/app/(public)/invitation/[secret]/actions';
import { Form, Submit } from '@/components/forms/form';
import { TextField } from '@/components/forms/fields';
import { Sheet } from '@/components/ui/sheet';
import { readInvitation } from '@/lib/services/invitations';

export const metadata = { title: 'Invitation' };

export default async function InvitationPage({
  params,
  searchParams,
}: {
  params: Promise<{ secret: string }>;
  searchParams: Promise<{ order?: string }>;
}) {
  const { secret } = await params;
  const orderId = z.uuid().safeParse((await searchParams).order).data;
  const invitation = await readInvitation(secret);
  if (!invitation) {
    return (
      <>
        <h1 className="mb-4">This invitation does not open any more</h1>
        <p>
          It has been used, withdrawn, or is older than two weeks. Ask the shop that sent it for a new one.
        </p>
      </>
    );
  }
  return (
    <>
      <h1 className="mb-2">{invitation.shopName}</h1>
      <p className="note mb-4">
        {invitation.invitingShopName === invitation.shopName
          ? `You are invited to join ${invitation.shopName}.`
          : `${invitation.invitingShopName} sends you work orders here. Give your name and a password, and they are yours.`}
      </p>
      <Sheet note={`Your sign-in is ${invitation.email}`}>
        <Form
          action={acceptAction}
          hidden={{ secret, ...(orderId === undefined ? {} : { orderId }) }}
          className="grid gap-4"
        >
          <TextField
            name="name"
            label="Your name"
            autoComplete="name"
            hint="It stands on what you do here."
          />
          <TextField
            name="password"
            label="New password"
            type="password"
            autoComplete="new-password"
            hint="At least 8 letters; 15 are better."
          />
          <Submit>Come in</Submit>
        </Form>
      </Sheet>
    </>
  );
}
