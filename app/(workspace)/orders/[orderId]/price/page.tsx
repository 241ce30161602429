import { randomUUID } from 'node:crypto';
import { openOrder, type OrderPageProps } from '@/app/(workspace)/orders/_components/load';
import { OrderFrame } from '@/app/(workspace)/orders/_components/order-frame';
import {
  answerPriceAction,
  answerSettlementAction,
  quoteAction,
  settleAction,
} from '@/app/(workspace)/orders/[orderId]/actions';
import { SelectField, SizeField, TextArea, TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { QuoteSheet } from '@/components/order/quote-sheet';
import { loadQuotes } from '@/db/read-models/order-price';
import { isAgreed, latestQuote } from '@/lib/domain/orders/stand';

export const metadata = { title: 'Price' };

const KINDS = [
  { value: 'work', label: 'The work' },
  { value: 'inspection', label: 'An inspection fee first' },
];

export default async function PricePage(props: OrderPageProps) {
  const {
    view,
    actor,
    more: quotes,
  } = await openOrder(props, (tx, _actor, orderId) => loadQuotes(tx, orderId));
  const { facts, allowed } = view;
  const carried = () => ({ requestKey: randomUUID(), version: facts.version });
  const latest = latestQuote(facts, ['inspection', 'work']);
  const waits = latest !== undefined && (latest.state === 'open' || latest.state === 'ask');
  return (
    <OrderFrame view={view} actor={actor} tab="price">
      <h2 className="mb-3">Price</h2>
      {quotes.length === 0 && <p className="note mb-4">No price has been named yet.</p>}
      {quotes.map((quote) => (
        <QuoteSheet key={quote.revision} quote={quote} currency={facts.currency} />
      ))}
      {allowed.includes('agree') && waits && (
        <Form
          action={answerPriceAction}
          {...carried()}
          hidden={{ orderId: facts.id, revision: String(latest.revision) }}
          className="mt-4 grid max-w-xl gap-3"
          label="Answer the price"
        >
          <TextArea name="note" label="What you want to say" hint="Needed only when you ask." />
          <div className="flex flex-wrap gap-2">
            <Submit name="answer" value="agree">
              Agree the price
            </Submit>
            <Submit kind="ghost" name="answer" value="ask">
              Ask about it
            </Submit>
            <Submit kind="stop" name="answer" value="turn_down">
              Turn it down
            </Submit>
          </div>
        </Form>
      )}
      {allowed.includes('quote') && !isAgreed(facts, 'work') && (
        <Form
          action={quoteAction}
          {...carried()}
          hidden={{ orderId: facts.id }}
          className="mt-6 grid max-w-2xl gap-4 border-t border-rule pt-5 sm:grid-cols-2"
          label="Name a price"
        >
          <h3 className="sm:col-span-2">{quotes.length === 0 ? 'Name a price' : 'Name a new price'}</h3>
          <SelectField name="kind" label="For" options={KINDS} className="sm:col-span-2" />
          {facts.lines.map((line) => (
            <SizeField key={line.id} name={`amount:${line.id}`} label={line.title} />
          ))}
          <TextField name="extrasWords" label="Extras: what for" />
          <SizeField name="extras" label="Extras" />
          <SizeField name="tax" label="Tax" />
          <TextField name="validUntil" label="Valid until" type="date" />
          <TextField name="promisedOn" label="Ready on" type="date" />
          <TextField
            name="promiseDays"
            label="or working days from clear to cut"
            mono
            hint="Late sizes or parts then move it by themselves."
          />
          <TextArea name="note" label="Note" className="sm:col-span-2" />
          <div>
            <Submit>Name the price</Submit>
          </div>
        </Form>
      )}
      {allowed.includes('settle') && !isAgreed(facts, 'settlement') && (
        <Form
          action={settleAction}
          {...carried()}
          hidden={{ orderId: facts.id }}
          className="mt-6 grid max-w-xl gap-3"
          label="Say what is owed"
        >
          <h3>What is owed for what was done</h3>
          <SizeField name="total" label="Amount" />
          <TextArea name="note" label="Note" />
          <Submit>Say what is owed</Submit>
        </Form>
      )}
      {allowed.includes('answer_settlement') && latestQuote(facts, ['settlement'])?.state === 'open' && (
        <Form
          action={answerSettlementAction}
          {...carried()}
          hidden={{ orderId: facts.id }}
          className="mt-6 grid max-w-xl gap-3"
          label="Answer what is owed"
        >
          <TextArea name="note" label="What you want to say" />
          <div className="flex gap-2">
            <Submit name="answer" value="agree">
              Agree
            </Submit>
            <Submit kind="stop" name="answer" value="turn_down">
              Turn it down
            </Submit>
          </div>
        </Form>
      )}
    </OrderFrame>
  );
}
