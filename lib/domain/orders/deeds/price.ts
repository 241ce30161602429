import type { Change } from '@/lib/domain/orders/changes';
import type { CommandOf } from '@/lib/domain/orders/commands';
import { no, type Asking, type Deeds, type Refusal } from '@/lib/domain/orders/deed';
import type { Facts, QuoteFact } from '@/lib/domain/orders/facts';
import { isAgreed, latestQuote } from '@/lib/domain/orders/stand';
import { ok, type Result } from '@/lib/domain/result';

type PriceCommands =
  | 'send'
  | 'change'
  | 'withdraw'
  | 'quote'
  | 'decline'
  | 'ask'
  | 'turn_down'
  | 'agree'
  | 'expire'
  | 'cancel'
  | 'settle'
  | 'answer_settlement'
  | 'move_promise';

/** Sending, pricing, agreeing, and the ways an order ends early. */
export const PRICE_DEEDS: Deeds<PriceCommands> = {
  send: (facts, _command, { now }) => {
    if (!facts.partner) return no('Say which shop it goes to.');
    if (facts.partnership !== 'active' && facts.partnership !== 'invited')
      return no('That shop does not work with yours at the moment.');
    if (facts.lines.length === 0) return no('Say what is to be done: add at least one operation.');
    if (facts.parts.length === 0) return no('Say which part goes: add at least one.');
    return ok({ changes: [{ row: 'order', set: { status: 'sent', sentAt: now } }] });
  },

  change: (facts, { neededBackOn, notes, standingInstruction }) => {
    const back: Change[] =
      facts.status === 'quoted' ? [...voidOpen(facts), { row: 'order', set: { status: 'sent' } }] : [];
    return ok({
      changes: [{ row: 'order', set: { neededBackOn, notes, standingInstruction } }, ...back],
      note: { neededBackOn, quoteVoid: back.length > 0 },
    });
  },

  withdraw: (facts, { reason }) =>
    ok({ changes: [...voidOpen(facts), { row: 'order', set: { status: 'withdrawn' } }], note: { reason } }),

  decline: (facts, { reason }) =>
    reason.trim() === ''
      ? no('Say why the job is declined.')
      : ok({
          changes: [...voidOpen(facts), { row: 'order', set: { status: 'declined' } }],
          note: { reason },
        }),

  quote: (facts, command, asking) => {
    const wrong = quoteProblem(facts, command, asking);
    if (wrong !== null) return no(wrong);
    const { kind, lines, extras, taxMinor, promisedOn, promiseDays, validUntil, note } = command;
    const totalMinor = [...lines, ...extras].reduce((all, line) => all + line.amountMinor, taxMinor);
    const revision = nextRevision(facts);
    const quote: Change = {
      row: 'quote',
      revision,
      kind,
      lines,
      extras,
      taxMinor,
      totalMinor,
      promisedOn,
      promiseDays,
      validUntil,
      note,
    };
    const status: Change[] = facts.status === 'sent' ? [{ row: 'order', set: { status: 'quoted' } }] : [];
    return ok({
      changes: [...voidOpen(facts), quote, ...status],
      note: { revision, kind, totalMinor, promisedOn, promiseDays, validUntil, note },
    });
  },

  ask: (facts, { revision, note }, asking) => {
    const quote = openQuote(facts, revision, asking);
    if (!quote.ok) return quote;
    if (note.trim() === '') return no('Write what you want to know.');
    return ok({ changes: [answer(quote.value, 'ask', note)], note: { revision, note } });
  },

  turn_down: (facts, { revision, note }, asking) => {
    const quote = openQuote(facts, revision, asking);
    if (!quote.ok) return quote;
    const back: Change[] = facts.status === 'quoted' ? [{ row: 'order', set: { status: 'sent' } }] : [];
    return ok({ changes: [answer(quote.value, 'turn_down', note), ...back], note: { revision, note } });
  },

  agree: (facts, { revision }, asking) => {
    const quote = openQuote(facts, revision, asking);
    if (!quote.ok) return quote;
    const { kind, promisedOn, promiseDays, totalMinor } = quote.value;
    const promise = kind === 'work' ? { promisedOn, firstPromisedOn: promisedOn, promiseDays } : {};
    const status = facts.status === 'quoted' ? { status: 'agreed' as const } : {};
    return ok({
      changes: [
        answer(quote.value, 'agree', ''),
        { row: 'order', set: { ...promise, ...status, agreedAt: asking.now } },
      ],
      note: { revision, kind, totalMinor },
    });
  },

  expire: (facts, { revision }, { today }) => {
    const quote = facts.quotes.find((one) => one.revision === revision && one.state === 'open');
    if (!quote) return no('That price is answered already.');
    if (quote.validUntil === null || quote.validUntil >= today) return no('That price is still valid.');
    return ok({ changes: [answer(quote, 'expired', '')], note: { revision } });
  },

  cancel: (facts, { reason }) =>
    reason.trim() === ''
      ? no('Say why the order is cancelled.')
      : ok({
          changes: [...voidOpen(facts), { row: 'order', set: { status: 'cancelled' } }],
          note: { reason },
        }),

  settle: (facts, { totalMinor, note }) => {
    if (isAgreed(facts, 'settlement')) return no('What is owed is agreed already.');
    const revision = nextRevision(facts);
    const quote: Change = {
      ...{ row: 'quote', revision, kind: 'settlement', lines: [], taxMinor: 0, totalMinor, note },
      extras: [{ words: 'Work done until it was cancelled', amountMinor: totalMinor }],
      ...{ promisedOn: null, promiseDays: null, validUntil: null },
    };
    return ok({ changes: [...voidOpen(facts), quote], note: { revision, totalMinor, note } });
  },

  answer_settlement: (facts, { agree, note }) => {
    const quote = latestQuote(facts, ['settlement']);
    if (quote?.state !== 'open') return no('Nothing is owed that waits for an answer.');
    return ok({
      changes: [answer(quote, agree ? 'agree' : 'turn_down', note)],
      note: { agree, note, totalMinor: quote.totalMinor },
    });
  },

  move_promise: (facts, { promisedOn, reason }, { today }) => {
    if (reason.trim() === '') return no('Say why the promise moves.');
    if (promisedOn < today) return no('That day has passed.');
    return ok({
      changes: [{ row: 'order', set: { promisedOn, firstPromisedOn: facts.firstPromisedOn ?? promisedOn } }],
      note: { from: facts.promisedOn, promisedOn, reason },
    });
  },
};

function quoteProblem(facts: Facts, command: CommandOf<'quote'>, { today }: Asking): string | null {
  const { kind, lines, promisedOn, promiseDays, validUntil } = command;
  const unknown = lines.some((line) => !facts.lines.some((one) => one.id === line.lineId));
  const unpromised = kind === 'work' && promisedOn === null && promiseDays === null;
  const rules: readonly (readonly [boolean, string])[] = [
    [isAgreed(facts, 'work'), 'The price is agreed already. What changes it now is a snag.'],
    [kind === 'inspection' && isAgreed(facts, 'inspection'), 'The inspection fee is agreed already.'],
    [unknown, 'A line of this price is not on the order.'],
    [unpromised, 'Promise a day, or a number of working days from clear to cut.'],
    [isPast(promisedOn, today), 'The promised day has passed.'],
    [isPast(validUntil, today), 'The last day of this price has passed.'],
  ];
  return rules.find(([broken]) => broken)?.[1] ?? null;
}

function isPast(day: string | null, today: string): boolean {
  return day !== null && day < today;
}

function openQuote(facts: Facts, revision: number, { today }: Asking): Result<QuoteFact, Refusal> {
  const latest = latestQuote(facts, ['inspection', 'work']);
  if (latest?.revision !== revision) return no('There is a newer price. Look at it before you answer.');
  if (latest.state !== 'open' && latest.state !== 'ask') return no('That price is answered already.');
  if (latest.validUntil !== null && latest.validUntil < today)
    return no('That price has run out. Ask for a new one.');
  return ok(latest);
}

function answer(
  quote: QuoteFact,
  how: 'ask' | 'turn_down' | 'agree' | 'void' | 'expired',
  note: string,
): Change {
  return { row: 'quote_answer', revision: quote.revision, kind: quote.kind, answer: how, note };
}

/** A price that was still open is void from here on. */
function voidOpen(facts: Facts): Change[] {
  return facts.quotes
    .filter((quote) => quote.state === 'open' || quote.state === 'ask')
    .map((quote) => answer(quote, 'void', ''));
}

function nextRevision(facts: Facts): number {
  return 1 + Math.max(0, ...facts.quotes.map((quote) => quote.revision));
}
