import { openOrder, type OrderPageProps } from '@/app/(workspace)/orders/_components/load';
import { OrderFrame } from '@/app/(workspace)/orders/_components/order-frame';
import { sayEvent } from '@/lib/domain/orders/say-event';
import { sayMoment } from '@/lib/forms/say';

export const metadata = { title: 'History' };

export default async function HistoryPage(props: OrderPageProps) {
  const { view, actor } = await openOrder(props, () => Promise.resolve(undefined));
  return (
    <OrderFrame view={view} actor={actor} tab="history">
      <h2 className="mb-3">History</h2>
      {view.thread.length === 0 && (
        <p className="note">
          Nothing has happened yet. What happens is written here, and nothing is ever taken out.
        </p>
      )}
      <ol>
        {view.thread.map((entry) => (
          <li
            key={entry.seq}
            className="grid gap-x-4 border-b border-rule-2 py-2 sm:grid-cols-[3rem_9rem_minmax(0,1fr)]"
          >
            <span className="num text-ink-3">{entry.seq}</span>
            <span className="note">{sayMoment(entry.at, actor.timeZone)}</span>
            <span>
              <b className="font-semibold">{entry.shopName}</b>{' '}
              {sayEvent(entry.type, entry.payload, actor.unit)}
              <span className="note block">{entry.author}</span>
            </span>
          </li>
        ))}
      </ol>
    </OrderFrame>
  );
}
