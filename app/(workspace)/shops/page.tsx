import { randomUUID } from 'node:crypto';
import { invitePartnerAction } from '@/app/(workspace)/shops/actions';
import { Form, Submit } from '@/components/forms/form';
import { TextField } from '@/components/forms/fields';
import { Sheet } from '@/components/ui/sheet';
import { begin } from '@/db/client';
import { loadPartners } from '@/db/read-models/partners';
import { requirePageTicket } from '@/lib/auth/ticket';
import { can } from '@/lib/domain/actor';

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
                  <span className="num">{partner.openOrders}</span> open orders
                </span>
              </li>
            ))}
          </ul>
        </Sheet>
        {can(actor, 'partners') && (
          <Sheet
            title="Invite a machine shop"
            note="It gets an e-mail with a link that opens its own shop here."
          >
            <Form
              action={invitePartnerAction}
              requestKey={randomUUID()}
              className="grid gap-4"
              label="Invite a machine shop"
            >
              <TextField name="shopName" label="Name of the shop" />
              <TextField name="email" label="E-mail of its owner" type="email" autoComplete="off" />
              <Submit>Invite</Submit>
            </Form>
          </Sheet>
        )}
      </div>
    </main>
  );
}
