import { TagStub } from '@/components/tag/tag-stub';
import { Empty } from '@/components/ui/empty';
import { begin } from '@/db/client';
import { loadWorkOrders } from '@/db/read-models/work-orders';
import { now } from '@/lib/adapters/clock';
import { requirePageTicket } from '@/lib/auth/ticket';
import { sayDay } from '@/lib/forms/say';
import { workOrderFilterSchema } from '@/lib/schemas/work-orders';

export const metadata = { title: 'Work orders' };

const SHOWS = [
  { value: 'open', label: 'Open' },
  { value: 'drafts', label: 'Drafts' },
  { value: 'ended', label: 'Ended' },
  { value: 'all', label: 'All' },
] as const;

export default async function WorkOrdersPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}) {
  const filter = workOrderFilterSchema.parse(await searchParams);
  const page = await begin(await requirePageTicket(), (tx, actor) => loadWorkOrders(tx, actor, filter));
  const year = now().getUTCFullYear();
  const link = (more: Record<string, string>) =>
    `/orders?${new URLSearchParams({ show: filter.show, ...(filter.find === '' ? {} : { find: filter.find }), ...more }).toString()}`;
  return (
    <main className="page">
      <div className="mb-4 flex flex-wrap items-baseline gap-4">
        <h1>Work orders</h1>
        <a href="/orders/new" className="btn ml-auto">
          New work order
        </a>
      </div>
      <div className="mb-4 flex flex-wrap items-end gap-3">
        <nav aria-label="Which orders" className="flex flex-wrap gap-2">
          {SHOWS.map(({ value, label }) => (
            <a
              key={value}
              href={link({ show: value })}
              aria-current={filter.show === value ? 'page' : undefined}
              className="btn btn-ghost aria-[current]:bg-blue aria-[current]:text-on-blue"
            >
              {label}
            </a>
          ))}
        </nav>
        {filter.find !== '' && (
          <p className="note">
            Found by “{filter.find}”. <a href="/orders">Show all open orders</a>
          </p>
        )}
      </div>
      {page.rows.length === 0 ? (
        <Empty title={filter.find === '' ? 'No orders here' : 'Nothing found'}>
          {filter.find === ''
            ? 'A work order sends parts out to a machine shop, or brings them to you.'
            : 'Look by number, stamp, engine or shop; the beginnings of words are enough.'}
        </Empty>
      ) : (
        <ul>
          {page.rows.map((stub) => (
            <TagStub
              key={stub.orderId}
              href={`/orders/${stub.orderId}`}
              number={stub.number}
              verb={stub.title}
              sub={[stub.otherShop, stub.step ?? stub.theirStep ?? stub.status].filter(Boolean).join(' · ')}
              when={stub.neededBackOn === null ? '' : `Needed ${sayDay(stub.neededBackOn, year)}`}
              waiting=""
              press="Open"
              punches={stub.punches}
              stopped={stub.stopped}
              hot={stub.step !== null}
            />
          ))}
        </ul>
      )}
      {page.next !== null && (
        <a href={link({ before: `${page.next.number}.${page.next.orderId}` })} className="btn btn-ghost">
          Older orders
        </a>
      )}
    </main>
  );
}
