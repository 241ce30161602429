import { randomUUID } from 'node:crypto';
import { addPartAction } from '@/app/(workspace)/builds/actions';
import { namePartnerAction } from '@/app/(workspace)/orders/new/actions';
import { PartFields } from '@/components/builds/part-fields';
import { TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { Sheet } from '@/components/ui/sheet';
import { type Actor, can } from '@/lib/domain/actor';

/** What may still be missing for an order, made on the spot: a part, a machine shop that is not here yet. */
export function BesideDraft({
  actor,
  opensParts,
  opensShops,
}: {
  actor: Actor;
  opensParts: boolean;
  opensShops: boolean;
}) {
  return (
    <div className="grid content-start gap-5">
      {can(actor, 'builds') && (
        <Sheet title="A part that is not written down yet">
          <details open={opensParts}>
            <summary className="cursor-pointer">Write it down here, or on its build.</summary>
            <Form
              action={addPartAction}
              requestKey={randomUUID()}
              hidden={{ buildId: '' }}
              className="mt-3 grid gap-3"
              label="Add a part"
            >
              <PartFields />
              <Submit kind="ghost">Add the part</Submit>
            </Form>
          </details>
        </Sheet>
      )}
      {can(actor, 'partners') && (
        <Sheet title="A machine shop that is not here yet">
          <details open={opensShops}>
            <summary className="cursor-pointer">Name it: it gets one e-mail, with this order in it.</summary>
            <Form
              action={namePartnerAction}
              requestKey={randomUUID()}
              className="mt-3 grid gap-3"
              label="Name a machine shop"
            >
              <TextField name="shopName" label="Name of the shop" />
              <TextField name="email" label="E-mail of its owner" type="email" autoComplete="off" />
              <Submit kind="ghost">Name it</Submit>
            </Form>
          </details>
        </Sheet>
      )}
    </div>
  );
}
