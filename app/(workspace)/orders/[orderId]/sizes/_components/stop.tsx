import { randomUUID } from 'node:crypto';
import { answerStopAction } from '@/app/(workspace)/orders/[orderId]/sizes/actions';
import { SizeField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { AlreadyCut } from '@/components/order/already-cut';
import type { SaidAtStop as Said } from '@/db/read-models/already-cut';
import type { OrderView } from '@/db/read-models/order-page';
import type { LengthUnit } from '@/lib/domain/quantity/length';
import { madeOfCut } from '@/lib/domain/sizes/already-cut';
import { sayMoment } from '@/lib/forms/say';

/** What the machine shop said at the STOP, held against the limits that stand now. */
export function SaidAtStop({
  said,
  view,
  unit,
  timeZone,
}: {
  said: Said;
  view: OrderView;
  unit: LengthUnit;
  timeZone: string;
}) {
  const { facts } = view;
  const cut = said.cut.map(({ lineId, feature, size }) => ({ lineId, feature, sizes: [size] }));
  const made = facts.lines.flatMap(({ id }) =>
    madeOfCut(cut, { lineId: id, sizes: facts.sizes.filter((size) => size.lineId === id) }),
  );
  const by = `${said.author}, ${sayMoment(said.at, timeZone)}`;
  return (
    <section className="mb-5">
      {made.length === 0 ? (
        <p className="note">
          At the STOP before rev {said.rev} nothing was cut. {by}
        </p>
      ) : (
        <AlreadyCut made={made} unit={unit} title={`Said at the STOP before rev ${said.rev}, by ${by}`} />
      )}
    </section>
  );
}

/** The question behind a STOP: what is already cut, feature by feature. */
export function StopForm({ view, unit }: { view: OrderView; unit: 'in' | 'mm' }) {
  const { facts } = view;
  const stopped = facts.sizes.filter((size) =>
    facts.lines.some((line) => line.id === size.lineId && line.stopDue),
  );
  const hidden = Object.fromEntries(
    stopped.flatMap((size, index) => [
      [`line:${index}`, size.lineId],
      [`feature:${index}`, size.feature],
    ]),
  );
  return (
    <section className="mb-6 border-2 border-past p-4">
      <h2 className="mb-1 text-past">STOP. Rev {facts.latestRev} has come</h2>
      <p className="note mb-3">
        Say what is already cut, and what is on the machine now. Leave the others empty: they are not cut.
      </p>
      <Form
        action={answerStopAction}
        requestKey={randomUUID()}
        version={facts.version}
        hidden={{ orderId: facts.id, unit, count: String(stopped.length), ...hidden }}
        className="grid gap-3 sm:grid-cols-3"
        label="Say what is already cut"
      >
        {stopped.map((size, index) => (
          <SizeField
            key={`${size.lineId}${size.feature}`}
            name={`size:${index}`}
            label={`${size.what} ${size.feature}`}
          />
        ))}
        <div className="sm:col-span-3">
          <Submit>Say what is cut</Submit>
        </div>
      </Form>
    </section>
  );
}
