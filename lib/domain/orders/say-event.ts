import { printMoney } from '@/lib/domain/quantity/money';
import { type Length, type LengthUnit, nanometres } from '@/lib/domain/quantity/length';
import { printNear } from '@/lib/domain/quantity/print-length';
import { ORDER_RULES } from '@/lib/domain/orders/rules';

type Payload = Readonly<Record<string, unknown>>;
type Say = (payload: Payload, size: (nm: unknown) => string) => string;

const MOVES = {
  sent: 'sent',
  checked_in: 'checked in',
  sent_back: 'sent back',
  received: 'received',
} as const;

const SAYINGS: Readonly<Record<string, Say>> = {
  'order.quote': ({ kind, totalMinor, promisedOn, promiseDays }) =>
    `named ${kind === 'inspection' ? 'an inspection fee' : 'a price'}: ${money(totalMinor)}${promised(promisedOn, promiseDays)}`,
  'order.agree': ({ totalMinor }) => `agreed the price: ${money(totalMinor)}`,
  'order.release': ({ rev, reason, sizes, stop }, size) =>
    `released sizes rev ${text(rev)}${because(
      list(sizes)
        .map((one) => `${text(one['what'])} ${size(one['lower'])} to ${size(one['upper'])}`)
        .join(', '),
    )}${because(reason)}${stop === true ? '. STOP: the line being cut waits for an answer' : ''}`,
  'order.repeat_back': ({ rev, matches, said }) =>
    matches === true
      ? `repeated the sizes back: the same as rev ${text(rev)}`
      : `repeated the sizes back, and they differ from rev ${text(rev)}: keyed ${list(said)
          .flatMap((one) =>
            Array.isArray(one['keyed']) && one['matches'] === false ? [one['keyed'].join(' to ')] : [],
          )
          .join(', ')}`,
  'order.move_parts': ({ kind, parts }) =>
    `${MOVES[kind as keyof typeof MOVES]} ${list(parts)
      .map((one) => `${text(one['pieces'])} ${text(one['kind'])}${stamped(one['stamps'])}`)
      .join(', ')}`,
  'order.restamp': ({ kind, from, to, words }) =>
    `restamped one of the ${text(kind)}: ${text(from)} is ${text(to)} now${because(words)}`,
  'order.hold': ({ words, waitsFor }) =>
    `put a hold on, waiting for the ${waitsFor === 'sender' ? 'rebuilder' : 'machine shop'}: ${text(words)}`,
  'order.raise_snag': (payload) => `raised a snag: ${sayProposal(payload)}`,
  'order.start': ({ line }) => `put it on the machine: ${text(line)}`,
  'order.answer_stop': ({ rev, cut }) => {
    const already = list(cut).map((one) => `${text(one['feature'])} at ${text(one['text'])}`);
    return `said what is cut before rev ${text(rev)}: ${already.length > 0 ? already.join(', ') : 'nothing'}`;
  },
  'order.readings': ({ count, purpose }) =>
    `posted ${text(count)} ${purpose === 'check' ? 'check readings' : 'readings'}`,
  'order.decide': ({ decisions }) =>
    `decided: ${list(decisions)
      .map(
        (one) =>
          `${text(one['line'])}${some(one['features'])} ${DECISIONS[one['decision'] as keyof typeof DECISIONS]}${because(one['reason'])}`,
      )
      .join('; ')}`,
  'order.move_promise': ({ promisedOn, reason }) =>
    `moved the promise to ${text(promisedOn)}${because(reason)}`,
  'order.settle': ({ totalMinor, note }) => `said what is owed: ${money(totalMinor)}${because(note)}`,
  'order.answer_settlement': ({ agree }) =>
    agree === true ? 'agreed what is owed' : 'turned down what is owed',
};

const DECISIONS = {
  accept: 'accepted',
  as_is: 'accepted as is',
  send_back: 'sent back',
  reject: 'rejected',
} as const;

/** What was met, what is proposed, and what it would add. */
export function sayProposal({ words, proposal, priceMinor, days }: Payload): string {
  const price = Number(priceMinor) > 0 ? `, ${money(priceMinor)} more` : '';
  const time = Number(days) > 0 ? `, ${text(days)} working ${Number(days) === 1 ? 'day' : 'days'} more` : '';
  return `${text(words).replace(/[.\s]+$/, '')}. Proposes: ${text(proposal)}${price}${time}`;
}

/** What happened, in words that follow the name of who did it. */
export function sayEvent(type: string, payload: Payload, unit: LengthUnit): string {
  const size = (nm: unknown) =>
    typeof nm === 'number' ? printNear(nanometres(nm) satisfies Length, unit) : '';
  const saying = SAYINGS[type];
  if (saying) return saying(payload, size);
  const rule = ORDER_RULES[type.replace('order.', '') as keyof typeof ORDER_RULES] as
    { past: string } | undefined;
  return `${rule?.past ?? type}${because(payload['reason'] ?? payload['note'] ?? payload['words'])}`;
}

function because(reason: unknown): string {
  return typeof reason === 'string' && reason !== '' ? `: ${reason.replace(/[.\s]+$/, '')}` : '';
}

function promised(day: unknown, days: unknown): string {
  if (typeof day === 'string') return `, promised ${day}`;
  return typeof days === 'number' ? `, ${days} working days from clear to cut` : '';
}

function stamped(stamps: unknown): string {
  return Array.isArray(stamps) && stamps.length > 0 ? `, stamp ${stamps.join(' ')}` : '';
}

/** ` 4, 5` where a decision is about some features only. */
function some(features: unknown): string {
  return Array.isArray(features) && features.length > 0 ? ` ${features.join(', ')}` : '';
}

function money(minor: unknown): string {
  return typeof minor === 'number' ? printMoney(minor) : '';
}

function text(value: unknown): string {
  return typeof value === 'string' || typeof value === 'number' ? String(value) : '';
}

function list(value: unknown): readonly Payload[] {
  return Array.isArray(value) ? (value as Payload[]) : [];
}
