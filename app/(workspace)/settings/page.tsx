import { PeopleSheet, SignInsSheet } from '@/app/(workspace)/settings/_components/people-sheets';
import { ClosedDaysSheet, HouseSheet, ShopSheet } from '@/app/(workspace)/settings/_components/shop-sheets';
import { Sheet } from '@/components/ui/sheet';
import { begin } from '@/db/client';
import { loadPeople } from '@/db/read-models/partners';
import { loadShop } from '@/db/read-models/shop';
import { now } from '@/lib/adapters/clock';
import { requirePageTicket } from '@/lib/auth/ticket';
import { can } from '@/lib/domain/actor';

export const metadata = { title: 'Settings' };

export default async function SettingsPage() {
  const ticket = await requirePageTicket();
  const { actor, shop, people } = await begin(ticket, async (tx, asker) => ({
    actor: asker,
    shop: await loadShop(tx, asker, ticket.tokenHash),
    people: await loadPeople(tx, asker),
  }));
  return (
    <main className="page">
      <h1 className="mb-4">Settings</h1>
      <div className="grid items-start gap-5 lg:grid-cols-2">
        <div className="grid gap-5">
          {can(actor, 'settings') ? (
            <>
              <ShopSheet shop={shop} />
              <ClosedDaysSheet shop={shop} year={now().getUTCFullYear()} />
              <HouseSheet shop={shop} />
            </>
          ) : (
            <Sheet title="The shop">
              <p className="note">Only an owner changes the shop’s settings.</p>
            </Sheet>
          )}
        </div>
        <div className="grid gap-5">
          <PeopleSheet people={people} actor={actor} />
          <SignInsSheet signIns={shop.signIns} timeZone={actor.timeZone} />
        </div>
      </div>
    </main>
  );
}
