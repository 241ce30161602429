import { TagStub } from '@/components/tag/tag-stub';
import { Empty } from '@/components/ui/empty';
import { begin } from '@/db/client';
import { loadPartners } from '@/db/read-models/partners';
import { loadWorkOrders } from '@/db/read-models/work-orders';
import { now } from '@/lib/adapters/clock';
import { requirePageTicket } from '@/lib/auth/ticket';
import { sayDay } from '@/lib/forms/say';
import { workOrderFilterSchema, workOrdersAddress } from '@/lib/schemas/work-orders';

export const metadata = { title: 'Work orders' };

const SHOWS = [
  { value: 'open', label: 'Open' },
  { value: 'drafts', label: 'Drafts' },
  { value: 'ended', label: 'Ended' },
  { value: 'all', label: 'All' },
] as const;

const MOVES = [
  { value: 'any', label: 'Anybody’s' },
  { value: 'mine', label: 'Ours' },
  { value: 'theirs', label: 'Theirs' },
] as const;

const SORTS = [
  { value: 'number', label: 'Newest number' },
  { value: 'waiting', label: 'Waited longest' },
  { value: 'needed', label: 'Needed soonest' },
] as const;

export default async function WorkOrdersPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}) {
  const filter = workOrderFilterSchema.parse(await searchParams);
  const { page, partners } = await begin(await requirePageTicket(), async (tx, actor) => ({
    page: await loadWorkOrders(tx, actor, filter),
    partners: await loadPartners(tx, actor),
  }));
  const year = now().getUTCFullYear();
  const isNarrow = filter.find !== '' || filter.with !== null || filter.move !== 'any';
  return (
    <main className="page">
      <div className="mb-4 flex flex-wrap items-baseline gap-4">
        <h1>Work orders</h1>
        <a href="/orders/new" className="btn ml-auto">
          New work order
        </a>
      </div>
      <div className="mb-4 flex flex-wrap items-end gap-x-6 gap-y-3">
        <nav aria-label="Which orders" className="flex flex-wrap gap-2">
          {SHOWS.map(({ value, label }) => (
            <a
              key={value}
              href={workOrdersAddress({ ...filter, show: value, after: null })}
              aria-current={filter.show === value ? 'page' : undefined}
              className="btn btn-ghost aria-[current]:bg-blue aria-[current]:text-on-blue"
            >
              {label}
            </a>
          ))}
        </nav>
        <form action="/orders" aria-label="Narrow the list" className="flex flex-wrap items-end gap-3">
          <input type="hidden" name="show" value={filter.show} />
          <input type="hidden" name="find" value={filter.find} />
          <Pick
            name="with"
            label="Other shop"
            value={filter.with ?? ''}
            options={[
              { value: '', label: 'Every shop' },
              ...partners.map(({ shopId, name }) => ({ value: shopId, label: name })),
            ]}
          />
          <Pick name="move" label="Whose move" value={filter.move} options={MOVES} />
          <Pick name="sort" label="In order of" value={filter.sort} options={SORTS} />
          <button className="btn btn-ghost">Show</button>
        </form>
        {filter.find !== '' && (
          <p className="note">
            Found by “{filter.find}”. <a href="/orders">Show all open orders</a>
          </p>
        )}
      </div>
      {page.rows.length === 0 ? (
        <Empty title={isNarrow ? 'Nothing found' : 'No orders here'}>
          {isNarrow
            ? 'Look by number, stamp, engine or shop; the beginnings of words are enough. Or show every shop and every move.'
            : 'A work order sends parts out to a machine shop, or brings them to you.'}
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
              unread={stub.unread}
            />
          ))}
        </ul>
      )}
      {page.next !== null && (
        <a href={workOrdersAddress({ ...filter, after: page.next })} className="btn btn-ghost">
          {filter.sort === 'number' ? 'Older orders' : 'Further orders'}
        </a>
      )}
    </main>
  );
}

function Pick({
  name,
  label,
  value,
  options,
}: {
  name: string;
  label: string;
  value: string;
  options: readonly { value: string; label: string }[];
}) {
  return (
    <label className="text-sm">
      <span className="mb-1 block font-semibold">{label}</span>
      <select name={name} defaultValue={value} className="box min-h-11 w-auto">
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
    </label>
  );
}
