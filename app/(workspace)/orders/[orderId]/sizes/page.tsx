import { randomUUID } from 'node:crypto';
import { openOrder, type OrderPageProps } from '@/app/(workspace)/orders/_components/load';
import { OrderFrame } from '@/app/(workspace)/orders/_components/order-frame';
import { releaseAction } from '@/app/(workspace)/orders/[orderId]/actions';
import {
  answerStopAction,
  lendSheetAction,
  repeatBackAction,
} from '@/app/(workspace)/orders/[orderId]/sizes/actions';
import { SizeField, TextArea } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { RepeatBackForm } from '@/components/order/repeat-back-form';
import { RevSheet } from '@/components/order/rev-sheet';
import { groupSizes } from '@/components/order/sizes-table';
import { Notice } from '@/components/ui/notice';
import type { OrderView } from '@/db/read-models/order-page';
import { loadSizes, type SizesView } from '@/db/read-models/order-sizes';
import { can } from '@/lib/domain/actor';
import { sizesToRepeat } from '@/lib/domain/orders/stand';

export const metadata = { title: 'Sizes' };

export default async function SizesPage(props: OrderPageProps) {
  const {
    view,
    actor,
    more: sizes,
  } = await openOrder(props, (tx, _actor, orderId) => loadSizes(tx, orderId));
  const { facts, side, allowed } = view;
  const due = sizesToRepeat(facts);
  const mayRepeat = allowed.includes('repeat_back') && due.length > 0;
  const otherUnit =
    facts.partner && facts.partner.unit !== facts.sender.unit ? facts.partner.unit : undefined;
  const isOpenForKeying = mayRepeat && !facts.lines.some((line) => line.stopDue);
  const refused = sizes.said.filter((said) => !said.matches);
  return (
    <OrderFrame view={view} actor={actor} tab="sizes" hidesSizes={isOpenForKeying}>
      {allowed.includes('answer_stop') && facts.lines.some((line) => line.stopDue) && (
        <StopForm view={view} unit={actor.unit} />
      )}
      {isOpenForKeying && (
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
            unit={actor.unit}
            asked={due.map(({ lineId, what }) => ({
              lineId,
              what,
              features:
                groupSizes(facts.sizes.filter((size) => size.lineId === lineId && size.what === what))[0]
                  ?.features ?? '',
            }))}
          />
        </section>
      )}
      {refused.length > 0 && due.length > 0 && <Refused said={refused} />}
      {side === 'sender' && can(actor, 'sizes') && <Sheets view={view} sizes={sizes} />}
      {side === 'partner' && <LentSheets view={view} sizes={sizes} />}
      {!isOpenForKeying &&
        sizes.revs.map((rev) => (
          <RevSheet
            key={rev.number}
            rev={rev}
            isCurrent={rev.number === facts.latestRev}
            otherUnit={otherUnit}
            timeZone={actor.timeZone}
          />
        ))}
      {sizes.revs.length === 0 && side === 'partner' && (
        <p className="note">No sizes have been released yet.</p>
      )}
    </OrderFrame>
  );
}

function Refused({ said }: { said: SizesView['said'] }) {
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

function Sheets({ view, sizes }: { view: OrderView; sizes: SizesView }) {
  const { facts, allowed } = view;
  const begun = sizes.sheets.some((sheet) => Object.values(sheet.raw).some((text) => text !== ''));
  const cut = facts.lines
    .filter((line) => line.started)
    .flatMap((line) => facts.sizes.filter((size) => size.lineId === line.id));
  return (
    <section className="mb-6 border-b border-rule pb-6">
      <h2 className="mb-2">Work out the sizes</h2>
      {sizes.sheets.length === 0 && <p className="note">Nothing on this order is cut to a size.</p>}
      <ul>
        {sizes.sheets.map((sheet) => (
          <li key={sheet.id} className="flex flex-wrap items-center gap-3 border-b border-rule-2 py-2">
            <span className="grow">{facts.lines.find((line) => line.id === sheet.lineId)?.title}</span>
            {sheet.shared && <span className="note">the machine shop may fill it in</span>}
            <a href={`/orders/${facts.id}/sheets/${sheet.id}`} className="btn">
              Work out
            </a>
            {facts.status !== 'draft' && (
              <Form
                action={lendSheetAction}
                hidden={{ orderId: facts.id, sheetId: sheet.id, shared: sheet.shared ? 'no' : 'yes' }}
                label="Lend the sheet"
              >
                <Submit kind="ghost">{sheet.shared ? 'Take it back' : 'Ask them to fill it in'}</Submit>
              </Form>
            )}
          </li>
        ))}
      </ul>
      {allowed.includes('release') && begun && (
        <Form
          action={releaseAction}
          requestKey={randomUUID()}
          version={facts.version}
          hidden={{ orderId: facts.id }}
          className="mt-4 grid max-w-xl gap-3"
          label="Release the sizes"
        >
          {cut.length > 0 && (
            <Notice tone="warn">
              This order is being cut. A new rev stops it until the machine shop has said what is cut and
              repeated the new sizes back.
            </Notice>
          )}
          {facts.latestRev !== null && (
            <TextArea name="reason" label={`Why it replaces rev ${facts.latestRev}`} />
          )}
          {facts.latestRev === null && <input type="hidden" name="reason" value="" />}
          <div>
            <Submit>Release these sizes</Submit>
          </div>
        </Form>
      )}
    </section>
  );
}

function LentSheets({ view, sizes }: { view: OrderView; sizes: SizesView }) {
  return (
    <>
      {sizes.sheets.map((sheet) => (
        <p key={sheet.id} className="mb-4">
          {view.facts.sender.name} asks you to fill this sheet in:{' '}
          <a href={`/orders/${view.facts.id}/sheets/${sheet.id}`}>
            {view.facts.lines.find((line) => line.id === sheet.lineId)?.title}
          </a>
        </p>
      ))}
    </>
  );
}

/** The question behind a STOP: what is already cut, feature by feature. */
function StopForm({ view, unit }: { view: OrderView; unit: 'in' | 'mm' }) {
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
