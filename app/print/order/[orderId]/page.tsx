import { openOrder } from '@/app/(workspace)/orders/_components/load';
import { RevSheet } from '@/components/order/rev-sheet';
import { loadSizes } from '@/db/read-models/order-sizes';
import { printMoney } from '@/lib/domain/quantity/money';
import { sayDay } from '@/lib/forms/say';

export const metadata = { title: 'Work order' };

/** The order with its sizes and working, for paper. */
export default async function PrintedOrderPage({ params }: { params: Promise<{ orderId: string }> }) {
  const {
    view,
    actor,
    more: sizes,
  } = await openOrder({ params }, (tx, _actor, orderId) => loadSizes(tx, orderId));
  const { facts } = view;
  const current = sizes.revs.find((rev) => rev.number === facts.latestRev);
  const year = new Date().getUTCFullYear();
  const rows: [string, string][] = [
    ['From', facts.sender.name],
    ['To', facts.partner?.name ?? ''],
    ['Engine', view.engine],
    ['Needed back', facts.neededBackOn === null ? '' : sayDay(facts.neededBackOn, year)],
    ['Price', view.agreedMinor === null ? 'not agreed' : `${facts.currency} ${printMoney(view.agreedMinor)}`],
    ['Notes', view.notes],
    ['Standing instruction', view.standingInstruction],
  ];
  return (
    <main className="page bg-white">
      <h1>
        <span className="font-stencil text-[40px] font-extrabold">WO {facts.number}</span> {view.title}
      </h1>
      <dl className="my-4 grid grid-cols-[10rem_minmax(0,1fr)] gap-y-1">
        {rows
          .filter(([, value]) => value !== '')
          .map(([label, value]) => (
            <div key={label} className="col-span-2 grid grid-cols-subgrid">
              <dt className="note">{label}</dt>
              <dd>{value}</dd>
            </div>
          ))}
      </dl>
      <h2>Parts</h2>
      <ul className="mb-4">
        {facts.parts.map((part) => (
          <li key={part.id}>
            {part.pieces} {part.kind}{' '}
            {part.stamps.length > 0 && <span className="num">stamp {part.stamps.join(' ')}</span>}
          </li>
        ))}
      </ul>
      {current ? (
        <RevSheet rev={current} isCurrent otherUnit={undefined} timeZone={actor.timeZone} />
      ) : (
        <p className="text-xl font-bold">NO SIZES YET</p>
      )}
      <p className="note mt-6">
        Check on screen before cutting: a paper with an older rev is void. The engine, bearing and piston
        makers’ data, local codes and the machinist’s judgement come before any figure here.
      </p>
    </main>
  );
}
