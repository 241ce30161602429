import { TagStub } from '@/components/tag/tag-stub';
import { Empty } from '@/components/ui/empty';
import { Sheet } from '@/components/ui/sheet';
import { begin } from '@/db/client';
import { loadBench, MOST_COUNTED, type OrderStub } from '@/db/read-models/bench';
import { loadCalendars } from '@/db/read-models/calendars';
import { requirePageTicket } from '@/lib/auth/ticket';
import { now } from '@/lib/adapters/clock';
import { can } from '@/lib/domain/actor';
import { type Calendar, minutesOfDay, sayWorkingTime, workingMinutes } from '@/lib/domain/calendar/calendar';
import { sayDay } from '@/lib/forms/say';

export const metadata = { title: 'Bench' };

export default async function BenchPage() {
  const ticket = await requirePageTicket();
  const { bench, actor, calendar } = await begin(ticket, async (tx, asker) => ({
    bench: await loadBench(tx, asker),
    actor: asker,
    calendar: (await loadCalendars(tx, [asker.shopId])).get(asker.shopId),
  }));
  const moment = now();
  const waited = (stub: OrderStub) => (calendar ? sayWaiting(calendar, stub.clockSince, moment) : '');
  const oldest = bench.yours.find(({ clock }) => clock !== 'none');
  return (
    <main className="page">
      <div className="mb-4 flex flex-wrap items-baseline gap-x-4 gap-y-2">
        <h1>Your move</h1>
        <span className="note">
          {bench.yoursCount === 0
            ? 'Nothing waits on you.'
            : `${sayCount(bench.yoursCount)} on you.${oldest ? ` The oldest has waited ${waited(oldest)}.` : ''}`}
        </span>
        {can(actor, 'order') && (
          <a href="/orders/new" className="btn ml-auto">
            New work order
          </a>
        )}
      </div>
      <div className="grid items-start gap-6 xl:grid-cols-[minmax(0,1fr)_330px]">
        <div>
          {bench.isNew && (
            <Empty title="Nothing here yet">
              Write your engine down under <a href="/builds">Builds</a>, with its crankshaft or block. Name
              the machine shop under <a href="/shops">Shops</a>, or right on the first order: it gets one
              e-mail with both. Then press New work order.
            </Empty>
          )}
          <ul>
            {bench.yours.map((stub) => (
              <TagStub
                key={stub.orderId}
                {...stubProps(stub, moment)}
                waiting={stub.clock === 'none' ? '' : `waiting ${waited(stub)}`}
                hot
              />
            ))}
          </ul>
          {bench.theirs.length > 0 && (
            <>
              <h2 className="mt-6 mb-3 text-[19px]">
                Their move <span className="note font-normal">{sayCount(bench.theirsCount)} on others</span>
              </h2>
              <ul>
                {bench.theirs.map((stub) => (
                  <TagStub key={stub.orderId} {...stubProps(stub, moment)} waiting="" hot={false} />
                ))}
              </ul>
            </>
          )}
        </div>
        <div className="grid gap-4">
          <Sheet title="Where the parts are">
            {bench.places.length === 0 ? (
              <p className="note">No parts are written down yet.</p>
            ) : (
              <table className="w-full text-[15px]">
                <tbody>
                  {bench.places.map(({ name, pieces }) => (
                    <tr key={name} className="border-b border-rule-2">
                      <th scope="row" className="py-2 text-left font-normal">
                        {name}
                      </th>
                      <td className="num text-right">{pieces}</td>
                    </tr>
                  ))}
                </tbody>
              </table>
            )}
          </Sheet>
          {bench.comingBack.length > 0 && (
            <Sheet title="Coming back">
              <table className="w-full text-[15px]">
                <tbody>
                  {bench.comingBack.map(({ orderId, number, title, promisedOn }) => (
                    <tr key={orderId} className="border-b border-rule-2">
                      <th scope="row" className="py-2 text-left font-normal">
                        <a href={`/orders/${orderId}`}>WO {number}</a> {title.split(':')[0]?.toLowerCase()}
                      </th>
                      <td className="num text-right whitespace-nowrap">
                        {sayDay(promisedOn, moment.getUTCFullYear())}
                      </td>
                    </tr>
                  ))}
                </tbody>
              </table>
            </Sheet>
          )}
        </div>
      </div>
    </main>
  );
}

function sayCount(count: number): string {
  if (count === 1) return '1 order waits';
  return count < MOST_COUNTED ? `${count} orders wait` : `${MOST_COUNTED} orders or more wait`;
}

function sayWaiting(calendar: Calendar, since: Date, moment: Date): string {
  return sayWorkingTime(workingMinutes(calendar, since, moment), minutesOfDay(calendar));
}

function stubProps(stub: OrderStub, moment: Date) {
  const year = moment.getUTCFullYear();
  const due = stub.neededBackOn ?? stub.promisedOn;
  return {
    href: `/orders/${stub.orderId}`,
    number: stub.number,
    verb: stub.step ?? stub.theirStep ?? 'Nothing to do',
    sub: [stub.otherShop, stub.title].filter(Boolean).join(', '),
    when: due === null ? '' : `${stub.neededBackOn ? 'Needed' : 'Promised'} ${sayDay(due, year)}`,
    press: stub.step === null ? 'Open' : 'Take it up',
    punches: stub.punches,
    stopped: stub.stopped,
    unread: stub.unread,
  };
}
