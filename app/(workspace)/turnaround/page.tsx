import { notFound } from 'next/navigation';
import { MoveBars } from '@/components/charts/move-bars';
import { Scroll } from '@/components/ui/scroll';
import { Empty } from '@/components/ui/empty';
import { begin } from '@/db/client';
import { loadCalendars } from '@/db/read-models/calendars';
import { loadFinished, MOST_FINISHED, type TurnaroundOrder } from '@/db/read-models/turnaround';
import { now } from '@/lib/adapters/clock';
import { requirePageTicket } from '@/lib/auth/ticket';
import { can } from '@/lib/domain/actor';
import { type Calendar, minutesOfDay } from '@/lib/domain/calendar/calendar';
import {
  bookLegs,
  type FinishedOrder,
  inDays,
  summarise,
  totalOf,
  type TurnaroundRow,
} from '@/lib/domain/turnaround/turnaround';

export const metadata = { title: 'Turnaround' };

export default async function TurnaroundPage() {
  const since = new Date(now().getTime() - 365 * 24 * 3600 * 1000);
  const view = await begin(await requirePageTicket(), async (tx, actor) => {
    if (!can(actor, 'turnaround')) return undefined;
    const finished = await loadFinished(tx, actor, since);
    const shops = new Set(finished.orders.flatMap(({ legs }) => legs.map((leg) => leg.calendarShopId)));
    const calendars = await loadCalendars(tx, [actor.shopId, ...shops]);
    return { ...finished, calendars, own: calendars.get(actor.shopId) };
  });
  if (!view?.own) notFound();
  const { own, calendars, orders, open } = view;
  const finished = orders.map((order) => ({ order, value: toFinished(order, calendars, own) }));
  const dayLength = minutesOfDay(own);
  const byPartner = summarise(
    finished.map(({ order, value }) => ({ ...value, group: order.partner })),
    dayLength,
  );
  const byOperation = summarise(
    finished.flatMap(({ order, value }) => order.operations.map((group) => ({ ...value, group }))),
    dayLength,
  );
  const [all] = summarise(
    finished.map(({ value }) => ({ ...value, group: 'all' })),
    dayLength,
  );
  return (
    <main className="page">
      <div className="mb-4 flex flex-wrap items-baseline gap-x-4">
        <h1>Turnaround</h1>
        <span className="note">
          Work sent out, last 12 months: {orders.length < MOST_FINISHED ? '' : 'the latest '}
          {orders.length} finished orders. {open} are still open and not counted in the figures.
        </span>
      </div>
      {!all ? (
        <Empty title="Nothing finished yet">
          When the first order is closed, its working hours stand here, by whose move they went on.
        </Empty>
      ) : (
        <div className="sheet">
          <dl className="grid border-b border-rule sm:grid-cols-2 lg:grid-cols-4">
            <Figure value={all.median.toFixed(1)} words="working days: half of the orders are back by then" />
            <Figure value={all.nineInTen.toFixed(1)} words="working days: nine in ten are back" />
            <Figure value={percent(all.onTime)} words="ready by the first promised day" />
            <Figure value={percent(all.shares.sender)} words="of the working hours out were our own move" />
          </dl>
          <div className="px-5 py-5">
            <h2 className="text-[17px]">Whose move the days went on</h2>
            <p className="note mb-2">
              Working days an order on average, each on the calendar of the shop that owed it
            </p>
            <MoveBars rows={byPartner} />
            <Rows title="By partner" rows={byPartner} />
            <Rows title="By operation" rows={byOperation} />
          </div>
        </div>
      )}
    </main>
  );
}

function toFinished(
  order: TurnaroundOrder,
  calendars: ReadonlyMap<string, Calendar>,
  own: Calendar,
): Omit<FinishedOrder, 'group'> {
  const legs = order.legs.map((leg) => ({
    ...leg,
    orderId: order.orderId,
    startedAt: new Date(leg.startedAt),
    endedAt: new Date(leg.endedAt),
  }));
  const booked = bookLegs(legs, calendars);
  const onTime =
    order.firstPromisedOn === null || order.readyOn === null ? null : order.readyOn <= order.firstPromisedOn;
  return { booked, days: inDays(totalOf(booked), own), onTime };
}

function percent(share: number | null): string {
  return share === null ? '–' : `${Math.round(share * 100)}%`;
}

function Figure({ value, words }: { value: string; words: string }) {
  return (
    <div className="border-r border-rule px-5 py-4 last:border-0">
      <dd className="num text-[34px] leading-tight font-semibold">{value}</dd>
      <dt className="note">{words}</dt>
    </div>
  );
}

function Rows({ title, rows }: { title: string; rows: readonly TurnaroundRow[] }) {
  const heads = ['Orders', 'Half by', 'Nine in ten', 'On time', 'Our move', 'Road', 'Their move', 'Snag'];
  return (
    <section className="mt-6">
      <h2 className="text-[17px]">{title}</h2>
      <Scroll label={title}>
        <table className="w-full text-[15px]">
          <thead>
            <tr className="border-b border-rule text-[13px] text-ink-3">
              <th className="py-2 text-left font-medium">
                {title.replace('By ', '').replace(/^./, (letter) => letter.toUpperCase())}
              </th>
              {heads.map((head) => (
                <th key={head} className="px-2 py-2 text-right font-medium">
                  {head}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.group} className="border-b border-rule-2">
                <th scope="row" className="py-2 text-left font-normal">
                  {row.group}
                </th>
                {[
                  String(row.orders),
                  row.median.toFixed(1),
                  row.nineInTen.toFixed(1),
                  percent(row.onTime),
                  ...(['sender', 'road', 'partner', 'snag'] as const).map((key) => percent(row.shares[key])),
                ].map((value, index) => (
                  <td key={heads[index]} className="num px-2 text-right">
                    {value}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </Scroll>
    </section>
  );
}
