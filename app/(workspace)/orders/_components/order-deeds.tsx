import { randomUUID } from 'node:crypto';
import type { ReactNode } from 'react';
import {
  answerHoldAction,
  changeAction,
  discardAction,
  endAction,
  holdAction,
  movePromiseAction,
  raiseSnagAction,
  sendAction,
  setReferenceAction,
} from '@/app/(workspace)/orders/[orderId]/actions';
import { Snag } from '@/app/(workspace)/orders/_components/snag';
import { SelectField, TextArea, TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { PhotoPicker } from '@/components/thread/photo-picker';
import { Sheet } from '@/components/ui/sheet';
import type { OrderView } from '@/db/read-models/order-page';
import { operationByKey } from '@/lib/domain/operations/catalogue';
import { missingBefore } from '@/lib/domain/operations/order-of-work';
import type { CommandKind } from '@/lib/domain/orders/commands';

/** What can be done to an order besides its next step: open holds and snags first, the rest folded. */
export function OrderDeeds({ view }: { view: OrderView }) {
  const { facts, side, allowed } = view;
  const may = (kind: CommandKind) => allowed.includes(kind);
  const carried = () => ({ requestKey: randomUUID(), version: facts.version, hidden: { orderId: facts.id } });
  const lines = [
    { value: '', label: 'The whole order' },
    ...facts.lines.map(({ id, title }) => ({ value: id, label: title })),
  ];
  return (
    <>
      {may('send') && (
        <Sheet title="Send it" note="The partner sees the order from then on, and gets one e-mail.">
          {missingBefore(facts.lines.map((line) => line.operation)).map(({ key, earlier }) => (
            <p key={key} className="note mb-2">
              ▲ {earlier.map((one) => operationByKey(one).title).join(' or ')} usually comes before{' '}
              {operationByKey(key).title.toLowerCase()}. Put it on the order, or leave it out if it is done.
            </p>
          ))}
          <a href={`/orders/${facts.id}/edit`} className="btn btn-ghost mb-3">
            Change the draft
          </a>
          <Form action={sendAction} {...carried()} className="mb-3" label="Send the order">
            <Submit>Send the order</Submit>
          </Form>
          <Form action={discardAction} {...carried()} label="Throw the draft away">
            <Submit kind="stop">Throw the draft away</Submit>
          </Form>
        </Sheet>
      )}
      {facts.snags.map((snag) => (
        <Snag key={snag.id} snag={snag} view={view} />
      ))}
      {facts.holds.map((hold) => (
        <Sheet key={hold.id} title="Hold" note={hold.words}>
          <p className="note mb-2">
            Waits for the {hold.waitsFor === 'sender' ? 'rebuilder' : 'machine shop'}.
          </p>
          {hold.placedBy === side && (
            <Form
              action={answerHoldAction}
              {...withHidden(carried(), { holdId: hold.id, deed: 'lift_hold', words: '' })}
              label="Lift the hold"
            >
              <Submit>Lift the hold</Submit>
            </Form>
          )}
          {hold.placedBy !== side && hold.waitsFor === side && (
            <Form
              action={answerHoldAction}
              {...withHidden(carried(), { holdId: hold.id, deed: 'answer_hold' })}
              className="grid gap-2"
              label="Answer the hold"
            >
              <TextArea name="words" label="What was done" />
              <Submit>Done</Submit>
            </Form>
          )}
        </Sheet>
      ))}
      {may('raise_snag') && (
        <Folded title="Raise a snag">
          <Form action={raiseSnagAction} {...carried()} className="grid gap-3" label="Raise a snag">
            <SelectField name="lineId" label="On" options={lines} />
            <SelectField
              name="kind"
              label="What it is"
              options={['crack', 'will not clean up', 'wrong part', 'mixed pieces', 'damage', 'other'].map(
                (value) => ({ value, label: value }),
              )}
            />
            <TextArea name="words" label="What you met" />
            <TextArea name="proposal" label="What you propose" />
            <TextField name="price" label="Price it adds" mono />
            <TextField name="days" label="Working days it adds" mono />
            <PhotoPicker orderId={facts.id} label="Add photos" />
            <Submit>Raise the snag</Submit>
          </Form>
        </Folded>
      )}
      {may('hold') && (
        <Folded title="Put a hold on">
          <Form action={holdAction} {...carried()} className="grid gap-3" label="Put a hold on">
            <SelectField
              name="reason"
              label="Because of"
              options={['parts', 'sizes', 'decision', 'machine', 'other'].map((value) => ({
                value,
                label: value,
              }))}
            />
            <SelectField
              name="waitsFor"
              label="It waits for"
              options={[
                { value: 'sender', label: facts.sender.name },
                { value: 'partner', label: facts.partner?.name ?? 'the machine shop' },
              ]}
            />
            <TextArea name="words" label="What it waits for" />
            <Submit>Hold</Submit>
          </Form>
        </Folded>
      )}
      {may('change') && (
        <Folded title="Change the order">
          <Form action={changeAction} {...carried()} className="grid gap-3" label="Change the order">
            {facts.status === 'quoted' && (
              <p className="note">A price has been named. Changing the order makes it void.</p>
            )}
            <TextField
              name="neededBackOn"
              label="Needed back"
              type="date"
              defaultValue={facts.neededBackOn ?? ''}
            />
            <TextArea name="notes" label="Notes for the machine shop" defaultValue={view.notes} />
            <TextArea
              name="standingInstruction"
              label="Standing instruction"
              defaultValue={view.standingInstruction}
            />
            <Submit kind="ghost">Change it</Submit>
          </Form>
        </Folded>
      )}
      {facts.status !== 'draft' && (
        <Folded title="Our reference">
          <Form
            action={setReferenceAction}
            hidden={{ orderId: facts.id }}
            className="grid gap-3"
            label="Our reference"
          >
            <TextField
              name="reference"
              label="Our reference"
              hint="Your own number or words for it; the other shop does not see it."
              defaultValue={view.reference}
            />
            <Submit kind="ghost">Keep it</Submit>
          </Form>
        </Folded>
      )}
      {may('move_promise') && (
        <Folded title="Move the promise">
          <Form action={movePromiseAction} {...carried()} className="grid gap-3" label="Move the promise">
            <TextField name="promisedOn" label="Ready on" type="date" />
            <TextArea name="reason" label="Why" />
            <Submit>Move the promise</Submit>
          </Form>
        </Folded>
      )}
      {side === 'sender' && facts.status !== 'draft' && (
        <a href={`/orders/new?like=${facts.id}`} className="btn btn-ghost">
          Another order like this
        </a>
      )}
      {(['withdraw', 'decline', 'cancel'] as const).filter(may).map((deed) => (
        <Folded key={deed} title={ENDINGS[deed]}>
          <Form
            action={endAction}
            {...withHidden(carried(), { deed })}
            className="grid gap-3"
            label={ENDINGS[deed]}
          >
            <TextArea name="reason" label="Why" />
            <Submit kind="stop">{ENDINGS[deed]}</Submit>
          </Form>
        </Folded>
      ))}
    </>
  );
}

const ENDINGS = {
  withdraw: 'Withdraw the order',
  decline: 'Decline the job',
  cancel: 'Cancel the order',
} as const;

function Folded({ title, children }: { title: string; children: ReactNode }) {
  return (
    <details className="sheet px-5 py-3">
      <summary className="cursor-pointer font-semibold">{title}</summary>
      <div className="mt-3">{children}</div>
    </details>
  );
}

function withHidden<T extends { hidden: Record<string, string> }>(
  carried: T,
  more: Record<string, string>,
): T {
  return { ...carried, hidden: { ...carried.hidden, ...more } };
}
