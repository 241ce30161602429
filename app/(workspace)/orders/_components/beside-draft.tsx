import { randomUUID } from 'node:crypto';
import { addPartAction } from '@/app/(workspace)/builds/actions';
import { namePartnerAction } from '@/app/(workspace)/orders/new/actions';
import { AddPart } from '@/components/builds/add-part';
import { NameShop } from '@/components/shops/name-shop';
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
            <AddPart action={addPartAction} requestKey={randomUUID()} buildId="" className="mt-3" />
          </details>
        </Sheet>
      )}
      {can(actor, 'partners') && (
        <Sheet title="A machine shop that is not here yet">
          <details open={opensShops}>
            <summary className="cursor-pointer">Name it: it gets one e-mail, with this order in it.</summary>
            <NameShop
              action={namePartnerAction}
              requestKey={randomUUID()}
              label="Name a machine shop"
              press="Name it"
              kind="ghost"
              className="mt-3"
            />
          </details>
        </Sheet>
      )}
    </div>
  );
}
