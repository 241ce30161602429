import { randomUUID } from 'node:crypto';
import { openOrder, type OrderPageProps } from '@/app/(workspace)/orders/_components/load';
import { OrderFrame } from '@/app/(workspace)/orders/_components/order-frame';
import { LentSheets, Sheets } from '@/app/(workspace)/orders/[orderId]/sizes/_components/sheets';
import { SaidAtStop, StopForm } from '@/app/(workspace)/orders/[orderId]/sizes/_components/stop';
import { repeatBackAction } from '@/app/(workspace)/orders/[orderId]/sizes/actions';
import { RepeatBackForm } from '@/components/order/repeat-back-form';
import { RevSheet } from '@/components/order/rev-sheet';
import { groupSizes } from '@/components/order/sizes-table';
import { Notice } from '@/components/ui/notice';
import { loadAlreadyCut } from '@/db/read-models/already-cut';
import type { OrderView } from '@/db/read-models/order-page';
import { loadSizes, type SizesView } from '@/db/read-models/order-sizes';
import { can } from '@/lib/domain/actor';
import type { SizeFact } from '@/lib/domain/orders/facts';
import { sizesToRepeat } from '@/lib/domain/orders/stand';
import type { LengthUnit } from '@/lib/domain/quantity/length';

export const metadata = { title: 'Sizes' };

export default async function SizesPage(props: OrderPageProps) {
  const {
    view,
    actor,
    more: sizes,
  } = await openOrder(props, async (tx, _actor, orderId) => ({
    ...(await loadSizes(tx, orderId)),
    ...(await loadAlreadyCut(tx, orderId)),
  }));
  const { facts, side, allowed } = view;
  const due = sizesToRepeat(facts);
  const mayRepeat = allowed.includes('repeat_back') && due.length > 0;
  const isOpenForKeying = mayRepeat && !facts.lines.some((line) => line.stopDue);
  const refused = sizes.repeated.filter((said) => !said.matches);
  return (
    <OrderFrame view={view} actor={actor} tab="sizes" hidesSizes={isOpenForKeying}>
      {allowed.includes('answer_stop') && facts.lines.some((line) => line.stopDue) && (
        <StopForm view={view} unit={actor.unit} />
      )}
      {isOpenForKeying && <Keying view={view} unit={actor.unit} due={due} />}
      {refused.length > 0 && due.length > 0 && <Refused said={refused} />}
      {!isOpenForKeying && sizes.said !== null && sizes.said.rev === facts.latestRev && (
        <SaidAtStop said={sizes.said} view={view} unit={actor.unit} timeZone={actor.timeZone} />
      )}
      {side === 'sender' && can(actor, 'sizes') && (
        <Sheets view={view} sizes={sizes} cut={sizes.cut} unit={actor.unit} />
      )}
      {side === 'partner' && <LentSheets view={view} sizes={sizes} />}
      {!isOpenForKeying &&
        sizes.revs.map((rev) => (
          <RevSheet
            key={rev.number}
            rev={rev}
            isCurrent={rev.number === facts.latestRev}
            otherUnit={otherUnitOf(view)}
            timeZone={actor.timeZone}
          />
        ))}
      {sizes.revs.length === 0 && side === 'partner' && (
        <p className="note">No sizes have been released yet.</p>
      )}
    </OrderFrame>
  );
}

function Refused({ said }: { said: SizesView['repeated'] }) {
  const last = said[0];
  if (!last) return null;
  return (
    <div className="mb-5">
      <Notice tone="refuse">
        {last.author} keyed {last.what.toLowerCase()}{' '}
        <span className="num">
          {last.keyedLower} to {last.keyedUpper}
        </span>
        . That is not what was released. Not clear to cut.
      </Notice>
    </div>
  );
}

/** The sizes are keyed from what stands at the machine, while this page hides them. */
function Keying({
  view: { facts },
  unit,
  due,
}: {
  view: OrderView;
  unit: LengthUnit;
  due: readonly SizeFact[];
}) {
  return (
    <section className="mb-6 border-b border-rule pb-6">
      <h2 className="mb-1">Repeat the sizes back</h2>
      <p className="note mb-4">
        Key in what stands at your machine. The sizes of rev {facts.latestRev} stay hidden until you have.
      </p>
      <RepeatBackForm
        action={repeatBackAction}
        orderId={facts.id}
        version={facts.version}
        requestKey={randomUUID()}
        rev={facts.latestRev ?? 0}
        unit={unit}
        asked={due.map(({ lineId, what }) => ({
          lineId,
          what,
          features:
            groupSizes(facts.sizes.filter((size) => size.lineId === lineId && size.what === what))[0]
              ?.features ?? '',
        }))}
      />
    </section>
  );
}

function otherUnitOf({ facts: { partner, sender } }: OrderView): LengthUnit | undefined {
  return partner && partner.unit !== sender.unit ? partner.unit : undefined;
}
