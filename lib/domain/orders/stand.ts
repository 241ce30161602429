import type {
  Clock,
  Facts,
  LineFact,
  PunchState,
  QuoteFact,
  SizeFact,
  Status,
} from '@/lib/domain/orders/facts';
import { piecesAway, piecesMissing, whereabouts } from '@/lib/domain/orders/pieces';

/** What an order is waiting for, derived and never typed. */
export interface Stand {
  readonly punches: Facts['punches'];
  /** An open hold or snag, or a STOP that is not answered. */
  readonly stopped: boolean;
  /** Every line may be cut. */
  readonly clear: boolean;
  readonly clearLines: readonly string[];
  readonly senderStep: string | null;
  readonly partnerStep: string | null;
  readonly clock: Clock;
}

interface Move {
  readonly clock: Clock;
  readonly sender?: string;
  readonly partner?: string;
}

/** Where the order stands. Pure, and blind to the time. */
export function stand(facts: Facts): Stand {
  const punches = punchesOf(facts);
  const clearLines = facts.lines.filter((line) => isClear(facts, line)).map((line) => line.id);
  const move = firstMove(facts, clearLines.length === facts.lines.length);
  return {
    punches,
    stopped: facts.holds.length > 0 || facts.snags.length > 0 || facts.lines.some((line) => line.stopDue),
    clear:
      facts.lines.length > 0 &&
      clearLines.length === facts.lines.length &&
      ['agreed', 'cutting'].includes(facts.status),
    clearLines,
    senderStep: move.sender ?? null,
    partnerStep: move.partner ?? null,
    clock: move.clock,
  };
}

/** The latest quote of a kind. */
export function latestQuote(facts: Facts, kinds: readonly QuoteFact['kind'][]): QuoteFact | undefined {
  return facts.quotes.filter((quote) => kinds.includes(quote.kind)).at(-1);
}

/** Sizes of the latest rev that have not been repeated back, one of each distinct size of a line. */
export function sizesToRepeat(facts: Facts): readonly SizeFact[] {
  const seen = new Set<string>();
  return facts.sizes.filter((size) => {
    const key = `${size.lineId}|${size.what}|${size.lower}|${size.upper}`;
    if (seen.has(key)) return false;
    seen.add(key);
    return !isRepeated(facts, size);
  });
}

/** Whether a line may be cut now. */
export function isClear(facts: Facts, line: LineFact): boolean {
  if (!['agreed', 'cutting'].includes(facts.status) || line.stopDue) return false;
  if (facts.holds.some((hold) => hold.lineId === null || hold.lineId === line.id)) return false;
  if (facts.snags.some((snag) => snag.lineId === null || snag.lineId === line.id)) return false;
  return (
    isPriced(facts, line) &&
    partsWrong(facts, line) === null &&
    (!line.needsSizes || lineSizes(facts, line) === 'met')
  );
}

/** What keeps a line from being cut, in words, for the person who asks. */
export function whyNotClear(facts: Facts, line: LineFact): string | null {
  if (isClear(facts, line)) return null;
  if (line.stopDue) return 'Say first what is already cut: a new rev came.';
  if (facts.holds.some((hold) => hold.lineId === null || hold.lineId === line.id)) return 'A hold stands.';
  if (facts.snags.some((snag) => snag.lineId === null || snag.lineId === line.id))
    return 'A snag waits for its answer.';
  if (!isPriced(facts, line)) return 'The price is not agreed.';
  const wrong = partsWrong(facts, line);
  if (wrong !== null) return `The parts are not all here: ${wrong}.`;
  return lineSizes(facts, line) === 'none'
    ? 'There are no sizes yet.'
    : 'The sizes have not been repeated back.';
}

/** What is missing of a line's parts and kit, in words. */
export function partsWrong(facts: Facts, line: LineFact): string | null {
  const own = facts.parts.filter((part) => line.partIds.includes(part.id));
  const there = own.map((part) => whereabouts(part, facts));
  for (const [index, part] of own.entries()) {
    const where = there[index];
    const wrong = where ? piecesMissing(part, where) : part.kind;
    if (wrong !== null) return wrong;
  }
  const kit = there.flatMap((where) => where.kitThere);
  const absent = line.kit.filter((item) => !kit.includes(item));
  return absent.length > 0 ? `without ${absent.join(' and ')}` : null;
}

function isPriced(facts: Facts, line: LineFact): boolean {
  return isAgreed(facts, 'work') || (!line.needsSizes && isAgreed(facts, 'inspection'));
}

/** Whether a price of this kind has been agreed. */
export function isAgreed(facts: Facts, kind: QuoteFact['kind']): boolean {
  return facts.quotes.some((quote) => quote.kind === kind && quote.state === 'agree');
}

function isRepeated(facts: Facts, size: SizeFact): boolean {
  return facts.repeated.some(
    (said) =>
      said.lineId === size.lineId &&
      said.since === size.since &&
      said.what === size.what &&
      said.lower === size.lower &&
      said.upper === size.upper,
  );
}

function lineSizes(facts: Facts, line: LineFact): 'none' | 'given' | 'met' {
  const own = facts.sizes.filter((size) => size.lineId === line.id);
  if (own.length === 0) return 'none';
  return own.every((size) => isRepeated(facts, size)) ? 'met' : 'given';
}

function punchesOf(facts: Facts): Facts['punches'] {
  if (!['draft', 'sent', 'quoted', 'agreed', 'cutting'].includes(facts.status)) return facts.punches;
  const sized = facts.lines.filter((line) => line.needsSizes);
  const sizes: PunchState =
    sized.length === 0
      ? 'not_needed'
      : sized.every((line) => lineSizes(facts, line) === 'met')
        ? 'met'
        : 'unmet';
  const parts = facts.lines.length > 0 && facts.lines.every((line) => partsWrong(facts, line) === null);
  return { price: isAgreed(facts, 'work') ? 'met' : 'unmet', parts: parts ? 'met' : 'unmet', sizes };
}

type Row = (facts: Facts, allClear: boolean) => Move;

/** The ordered table: open snags and holds come before these. */
const MOVES: Readonly<Record<Status, Row>> = {
  draft: () => ({ clock: 'none', sender: 'Finish and send' }),
  sent: () => ({ clock: 'partner', partner: 'Name a price' }),
  quoted: quotedMove,
  agreed: (facts, allClear) =>
    allClear ? { clock: 'partner', partner: 'Put it on the machine' } : missingMove(facts),
  cutting: (facts, allClear) =>
    allClear ? { clock: 'partner', partner: 'Cut, post readings, report' } : missingMove(facts),
  reported: reportedMove,
  cancelled: (facts) => settlementMove(facts) ?? homewardMove(facts),
  accepted: homewardMove,
  rejected: homewardMove,
  closed: homewardMove,
  declined: homewardMove,
  withdrawn: homewardMove,
};

function firstMove(facts: Facts, allClear: boolean): Move {
  const canStop = ['sent', 'quoted', 'agreed', 'cutting', 'reported'].includes(facts.status);
  const stopped = canStop ? (snagMove(facts) ?? holdMove(facts)) : undefined;
  return stopped ?? MOVES[facts.status](facts, allClear);
}

function snagMove(facts: Facts): Move | undefined {
  const snag = facts.snags[0];
  if (!snag) return undefined;
  if (snag.state === 'raised') return { clock: 'snag', sender: 'Decide about the snag' };
  if (snag.state === 'asked') return { clock: 'snag', partner: 'Answer about the snag' };
  return { clock: 'snag', sender: 'Give the new sizes' };
}

function holdMove(facts: Facts): Move | undefined {
  const hold = facts.holds[0];
  if (!hold) return undefined;
  return hold.waitsFor === 'sender'
    ? { clock: 'sender', sender: 'Clear the hold' }
    : { clock: 'partner', partner: 'Clear the hold' };
}

function quotedMove(facts: Facts): Move {
  const quote = latestQuote(facts, ['inspection', 'work']);
  if (quote?.state === 'ask') return { clock: 'partner', partner: 'Answer about the price' };
  if (quote?.state === 'expired') return { clock: 'partner', partner: 'Quote again' };
  return { clock: 'sender', sender: 'Answer the price' };
}

/** What may be missing, in order, and whose it is. */
const MISSING: readonly { readonly is: (facts: Facts) => boolean; readonly move: (facts: Facts) => Move }[] =
  [
    {
      is: (facts) => facts.lines.some((line) => line.stopDue),
      move: () => ({ clock: 'partner', partner: 'Say what is already cut' }),
    },
    {
      is: (facts) => piecesAway(facts).home > 0,
      move: () => ({ clock: 'sender', sender: 'Send the parts' }),
    },
    {
      is: (facts) => hasSizes(facts, 'none'),
      move: () => ({ clock: 'sender', sender: 'Work out the sizes' }),
    },
    {
      is: (facts) => piecesAway(facts).out > 0,
      move: () => ({ clock: 'road', partner: 'Check in the parts' }),
    },
    {
      is: (facts) => hasSizes(facts, 'given'),
      move: () => ({ clock: 'partner', partner: 'Repeat the sizes back' }),
    },
    { is: (facts) => !isAgreed(facts, 'work'), move: workPriceMove },
  ];

/** Each side's first missing thing; the first of all gives the clock. */
function missingMove(facts: Facts): Move {
  const missing = MISSING.filter((row) => row.is(facts)).map((row) => row.move(facts));
  const found: Move[] = missing.length > 0 ? missing : [{ clock: 'sender', sender: 'Put the parts right' }];
  const sender = found.find((row) => row.sender !== undefined)?.sender;
  const partner = found.find((row) => row.partner !== undefined)?.partner;
  return {
    clock: found[0]?.clock ?? 'none',
    ...(sender === undefined ? {} : { sender }),
    ...(partner === undefined ? {} : { partner }),
  };
}

function hasSizes(facts: Facts, how: 'none' | 'given'): boolean {
  return facts.lines.some((line) => line.needsSizes && lineSizes(facts, line) === how);
}

/** After an inspection fee was agreed, the work itself is still to be priced. */
function workPriceMove(facts: Facts): Move {
  const quote = latestQuote(facts, ['work']);
  return quote?.state === 'open'
    ? { clock: 'sender', sender: 'Answer the price' }
    : { clock: 'partner', partner: 'Name a price for the work' };
}

function reportedMove(facts: Facts): Move {
  const away = piecesAway(facts);
  if (facts.acceptRule === 'readings' || (away.partner === 0 && away.road === 0)) {
    return { clock: 'sender', sender: 'Check and decide' };
  }
  return homewardMove(facts);
}

function settlementMove(facts: Facts): Move | undefined {
  const quote = latestQuote(facts, ['settlement']);
  if (!quote || quote.state === 'turn_down') return { clock: 'partner', partner: 'Say what is owed' };
  if (quote.state === 'open') return { clock: 'sender', sender: 'Answer what is owed' };
  return undefined;
}

function homewardMove(facts: Facts): Move {
  const away = piecesAway(facts);
  if (away.partner > 0) return { clock: 'partner', partner: 'Send the parts back' };
  if (away.road > 0 || away.out > 0) return { clock: 'road', sender: 'Receive the parts' };
  return { clock: 'none' };
}
