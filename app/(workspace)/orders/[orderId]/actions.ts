'use server';

import { revalidatePath } from 'next/cache';
import { redirect } from 'next/navigation';
import { z } from 'zod';
import { newId } from '@/lib/adapters/ids';
import type { BrowserTicket } from '@/lib/auth/ticket';
import type { Command } from '@/lib/domain/orders/commands';
import { PAST_DECISIONS, type PastDecision } from '@/lib/domain/sizes/already-cut';
import type { FormState } from '@/lib/forms/form-state';
import { action } from '@/lib/http/action';
import { daySchema } from '@/lib/schemas/build';
import {
  amountSchema,
  holdSchema,
  orderFormSchema,
  quoteSchema,
  reasonSchema,
  snagSchema,
  wordsSchema,
} from '@/lib/schemas/order-forms';
import { writeMessage } from '@/lib/services/messages';
import { runOrderCommand } from '@/lib/services/order-commands';
import { discardDraft, setReference } from '@/lib/services/order-drafts';
import { releaseSizes } from '@/lib/services/worksheets';

type OrderForm = z.infer<typeof orderFormSchema>;

async function press(
  ask: BrowserTicket,
  form: OrderForm,
  command: Command,
  done: string,
): Promise<FormState> {
  const { orderId, version, requestKey } = form;
  await runOrderCommand(ask, { orderId, expectedVersion: version, requestKey, command });
  revalidatePath(`/orders/${orderId}`, 'layout');
  return { done };
}

/** Sends a draft. */
export const sendAction = action(orderFormSchema, ({ data, ask }) =>
  press(ask, data, { do: 'send' }, 'Sent.'),
);

const referenceSchema = z.object({
  orderId: z.uuid(),
  reference: z.string().trim().max(60, 'Use at most 60 letters.'),
});

/** Keeps one's own reference for the order. */
export const setReferenceAction = action(referenceSchema, async ({ data, ask }) => {
  await setReference(ask, data.orderId, data.reference);
  revalidatePath(`/orders/${data.orderId}`, 'layout');
  return { done: 'Kept. Only your own shop sees it.' };
});

/** Throws a draft away. */
export const discardAction = action(orderFormSchema, async ({ data, ask }) => {
  await discardDraft(ask, data.orderId);
  redirect('/orders');
});

const changeSchema = orderFormSchema.extend({
  neededBackOn: daySchema,
  notes: wordsSchema,
  standingInstruction: wordsSchema,
});

/** Changes an order that has been sent; a price that was named is void from then on. */
export const changeAction = action(changeSchema, ({ data, ask }) => {
  const { neededBackOn, notes, standingInstruction } = data;
  return press(ask, data, { do: 'change', neededBackOn, notes, standingInstruction }, 'Changed.');
});

/** Names a price. */
export const quoteAction = action(quoteSchema, ({ data, ask }) => {
  const { kind, lines, extras, tax, promisedOn, promiseDays, validUntil, note } = data;
  return press(
    ask,
    data,
    { do: 'quote', kind, lines, extras, taxMinor: tax, promisedOn, promiseDays, validUntil, note },
    'The price is named.',
  );
});

const answerSchema = orderFormSchema.extend({
  revision: z.coerce.number().int(),
  answer: z.enum(['agree', 'ask', 'turn_down']),
  note: wordsSchema,
});

/** Agrees a price, asks about it, or turns it down. */
export const answerPriceAction = action(answerSchema, ({ data, ask }) => {
  const { answer, revision, note } = data;
  if (answer === 'agree') return press(ask, data, { do: 'agree', revision }, 'The price is agreed.');
  return press(ask, data, { do: answer, revision, note }, answer === 'ask' ? 'Asked.' : 'Turned down.');
});

const whySchema = orderFormSchema.extend({
  deed: z.enum(['withdraw', 'decline', 'cancel']),
  reason: reasonSchema,
});

/** Ends the order early, with the reason. */
export const endAction = action(whySchema, ({ data, ask }) =>
  press(ask, data, { do: data.deed, reason: data.reason }, 'Done.'),
);

/** Says what is owed on a cancelled order. */
export const settleAction = action(
  orderFormSchema.extend({ total: amountSchema, note: wordsSchema }),
  ({ data, ask }) => press(ask, data, { do: 'settle', totalMinor: data.total, note: data.note }, 'Said.'),
);

/** Answers what is owed. */
export const answerSettlementAction = action(
  orderFormSchema.extend({ answer: z.enum(['agree', 'turn_down']), note: wordsSchema }),
  ({ data, ask }) =>
    press(
      ask,
      data,
      { do: 'answer_settlement', agree: data.answer === 'agree', note: data.note },
      'Answered.',
    ),
);

/** Moves the promise. */
export const movePromiseAction = action(
  orderFormSchema.extend({ promisedOn: daySchema, reason: reasonSchema }),
  async ({ data, ask }) => {
    if (data.promisedOn === null)
      return { message: 'Check the marked fields.', fields: { promisedOn: ['Give the new day.'] } };
    return press(
      ask,
      data,
      { do: 'move_promise', promisedOn: data.promisedOn, reason: data.reason },
      'The promise is moved.',
    );
  },
);

/** Puts a hold on. */
export const holdAction = action(holdSchema, ({ data, ask }) => {
  const { reason, words, waitsFor } = data;
  return press(
    ask,
    data,
    { do: 'hold', id: newId(), lineId: null, reason, words, waitsFor },
    'The hold is on.',
  );
});

const holdAnswerSchema = orderFormSchema.extend({
  holdId: z.uuid(),
  deed: z.enum(['lift_hold', 'answer_hold']),
  words: wordsSchema,
});

/** Lifts or answers a hold. */
export const answerHoldAction = action(holdAnswerSchema, ({ data, ask }) => {
  const { holdId, words } = data;
  return press(
    ask,
    data,
    data.deed === 'lift_hold' ? { do: 'lift_hold', holdId } : { do: 'answer_hold', holdId, words },
    'Done.',
  );
});

/** Raises a snag. */
export const raiseSnagAction = action(
  snagSchema,
  async ({ data, ask }) => {
    const { orderId, version, requestKey, lineId, kind, words, proposal, price, days, files } = data;
    // The snag takes the form's own key for its id: the same form sent twice raises one snag.
    const said = { lineId, kind, words, proposal, priceMinor: price, days: days ?? 0 };
    const command = { do: 'raise_snag' as const, id: requestKey, ...said };
    await runOrderCommand(ask, { orderId, expectedVersion: version, requestKey, command, files });
    revalidatePath(`/orders/${orderId}`, 'layout');
    return { done: 'The snag is raised.' };
  },
  ['files'],
);

const snagAnswerSchema = orderFormSchema.extend({
  snagId: z.uuid(),
  answer: z.enum(['approve', 'approve_sizes', 'ask', 'reply', 'carry_on', 'stop']),
  words: wordsSchema,
});

/** Answers a snag, on either side. */
export const answerSnagAction = action(snagAnswerSchema, ({ data, ask }) => {
  const { snagId, words } = data;
  const commands: Record<typeof data.answer, Command> = {
    approve: { do: 'approve_snag', snagId, words, newSizes: false },
    approve_sizes: { do: 'approve_snag', snagId, words, newSizes: true },
    ask: { do: 'ask_snag', snagId, words },
    reply: { do: 'reply_snag', snagId, words },
    carry_on: { do: 'decline_snag', snagId, words, carryOn: true },
    stop: { do: 'decline_snag', snagId, words, carryOn: false },
  };
  return press(ask, data, commands[data.answer], 'Answered.');
});

/** Releases the finished sheets as the next rev. */
export const releaseAction = action(
  orderFormSchema.extend({
    reason: wordsSchema,
    past: z
      .enum(Object.keys(PAST_DECISIONS) as [PastDecision, ...PastDecision[]])
      .optional()
      .catch(undefined),
  }),
  async ({ data, ask }) => {
    const { orderId, version, requestKey, reason, past } = data;
    await releaseSizes(ask, { orderId, expectedVersion: version, requestKey, reason, past });
    revalidatePath(`/orders/${orderId}`, 'layout');
    return { done: 'Released.' };
  },
);

/** Puts a line on the machine. */
export const startLineAction = action(orderFormSchema.extend({ lineId: z.uuid() }), ({ data, ask }) =>
  press(ask, data, { do: 'start', lineId: data.lineId }, 'On the machine.'),
);

const messageSchema = z.object({
  orderId: z.uuid(),
  requestKey: z.uuid(),
  body: wordsSchema.min(1, 'Write something first.'),
  files: z.array(z.uuid()).max(20),
  weSpoke: z.string().optional(),
});

/** Writes to the other shop. */
export const writeMessageAction = action(
  messageSchema,
  async ({ data, ask }) => {
    const kind = data.weSpoke === 'yes' ? 'we_spoke' : 'message';
    await writeMessage(ask, data.orderId, { id: data.requestKey, kind, body: data.body, files: data.files });
    revalidatePath(`/orders/${data.orderId}`, 'layout');
    return { done: 'Sent.' };
  },
  ['files'],
);
