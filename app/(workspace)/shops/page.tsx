import { randomUUID } from 'node:crypto';
import {
  changePartnershipAction,
  invitePartnerAction,
  notePartnerAction,
  remindPartnerAction,
} from '@/app/(workspace)/shops/actions';
import { Form, Submit } from '@/components/forms/form';
import { TextArea } from '@/components/forms/fields';
import { NameShop } from '@/components/shops/name-shop';
import { Sheet } from '@/components/ui/sheet';
import { begin } from '@/db/client';
import { loadPartners, type PartnerRow } from '@/db/read-models/partners';
import { requirePageTicket } from '@/lib/auth/ticket';
import { type Actor, can } from '@/lib/domain/actor';
import { workOrderFilterSchema, workOrdersAddress } from '@/lib/schemas/work-orders';

export const metadata = { title: 'Shops' };

const STATES = {
  invited: 'invited, has not come in yet',
  active: 'works with you',
  paused: 'paused',
  ended: 'ended',
} as const;

export default async function ShopsPage() {
  const { partners, actor } = await begin(await requirePageTicket(), async (tx, asker) => ({
    partners: await loadPartners(tx, asker),
    actor: asker,
  }));
  return (
    <main className="page">
      <h1 className="mb-4">Shops</h1>
      <div className="grid items-start gap-5 lg:grid-cols-[minmax(0,1fr)_372px]">
        <Sheet title="Shops you work with">
          {partners.length === 0 && (
            <p className="note">
              None yet. Invite the first one; you can send it an order before it has come in.
            </p>
          )}
          <ul>
            {partners.map((partner) => (
              <li
                key={partner.shopId}
                className="flex flex-wrap items-baseline gap-x-4 border-b border-rule-2 py-2.5"
              >
                <b className="font-semibold">{partner.name}</b>
                <span className="note">{STATES[partner.state]}</span>
                <span className="note">measures in {partner.unit === 'in' ? 'inches' : 'millimetres'}</span>
                <span className="note ml-auto">
                  <a
                    href={workOrdersAddress({ ...OPEN, with: partner.shopId })}
                    className="inline-block min-h-6 py-1"
                  >
                    <span className="num">{partner.openOrders}</span> open{' '}
                    {partner.openOrders === 1 ? 'order' : 'orders'}
                  </a>
                </span>
                <PartnerDeeds partner={partner} actor={actor} />
              </li>
            ))}
          </ul>
        </Sheet>
        {can(actor, 'partners') && (
          <Sheet
            title="Invite a machine shop"
            note="It gets an e-mail with a link that opens its own shop here."
          >
            <NameShop
              action={invitePartnerAction}
              requestKey={randomUUID()}
              label="Invite a machine shop"
              press="Invite"
            />
          </Sheet>
        )}
      </div>
    </main>
  );
}

const OPEN = workOrderFilterSchema.parse({});

/** What can be done about one partner, folded: the shop's own note, and whether it is worked with. */
function PartnerDeeds({ partner, actor }: { partner: PartnerRow; actor: Actor }) {
  const hidden = { partnerShopId: partner.shopId };
  return (
    <details className="w-full">
      <summary className="cursor-pointer py-2 text-[15px]">
        {partner.note === '' ? 'Note for ourselves, and more' : partner.note}
      </summary>
      <div className="grid gap-4 py-2 sm:grid-cols-[minmax(0,1fr)_auto]">
        {can(actor, 'message') && (
          <Form
            action={notePartnerAction}
            hidden={hidden}
            className="grid gap-2"
            label={`Note on ${partner.name}`}
          >
            <TextArea
              name="text"
              label="Note for ourselves"
              hint="Only your own people see it."
              defaultValue={partner.note}
            />
            <div>
              <Submit kind="ghost">Keep the note</Submit>
            </div>
          </Form>
        )}
        {can(actor, 'partners') &&
          (partner.isHere ? (
            <Form
              action={changePartnershipAction}
              version={partner.version}
              hidden={hidden}
              className="grid content-start gap-2"
              label={`Working with ${partner.name}`}
            >
              {partner.state === 'active' ? (
                <Submit kind="ghost" name="state" value="paused">
                  Pause
                </Submit>
              ) : (
                <Submit name="state" value="active">
                  Work together again
                </Submit>
              )}
              {partner.state !== 'ended' && (
                <Submit kind="stop" name="state" value="ended">
                  End it
                </Submit>
              )}
            </Form>
          ) : (
            <Form action={remindPartnerAction} hidden={hidden} label={`Write to ${partner.name}`}>
              <Submit kind="ghost">Send the way in by e-mail</Submit>
            </Form>
          ))}
      </div>
    </details>
  );
}
