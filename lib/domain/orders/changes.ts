import type { CommandOf, KeyedSize, MovedPart, ReleasedLine } from '@/lib/domain/orders/commands';
import type {
  DecisionKind,
  Facts,
  HoldFact,
  MoveKind,
  QuoteKind,
  Side,
  SizeFact,
  SnagFact,
  Status,
} from '@/lib/domain/orders/facts';

/** The order's own columns that a command may set. */
export interface OrderSet {
  readonly status?: Status;
  readonly round?: number;
  readonly promisedOn?: string | null;
  readonly firstPromisedOn?: string | null;
  readonly promiseDays?: number | null;
  readonly neededBackOn?: string | null;
  readonly notes?: string;
  readonly standingInstruction?: string;
  readonly sentAt?: string;
  readonly agreedAt?: string;
  readonly endedAt?: string | null;
}

/** Rows that a decided command writes, and nothing else does. */
export type Change =
  | { readonly row: 'order'; readonly set: OrderSet }
  | { readonly row: 'line'; readonly lineId: string; readonly started?: true; readonly stopDue?: boolean }
  | {
      readonly row: 'quote';
      readonly revision: number;
      readonly kind: QuoteKind;
      readonly lines: CommandOf<'quote'>['lines'];
      readonly extras: CommandOf<'quote'>['extras'];
      readonly taxMinor: number;
      readonly totalMinor: number;
      readonly promisedOn: string | null;
      readonly promiseDays: number | null;
      readonly validUntil: string | null;
      readonly note: string;
    }
  | {
      readonly row: 'quote_answer';
      readonly revision: number;
      readonly kind: QuoteKind;
      readonly answer: 'ask' | 'turn_down' | 'agree' | 'void' | 'expired';
      readonly note: string;
    }
  | {
      readonly row: 'rev';
      readonly number: number;
      readonly reason: string;
      readonly changed: readonly ReleasedLine[];
      /** Lines whose sizes stand as they were, copied from the rev before. */
      readonly kept: readonly string[];
      readonly sizes: readonly SizeFact[];
    }
  | {
      readonly row: 'repeat_back';
      readonly sizes: readonly (KeyedSize & { since: number; asked: SizeFact; matches: boolean })[];
    }
  | { readonly row: 'move'; readonly kind: MoveKind; readonly part: MovedPart; readonly occurredAt: string }
  | {
      readonly row: 'restamp';
      readonly id: string;
      readonly partId: string;
      readonly from: string;
      readonly to: string;
      readonly words: string;
    }
  | { readonly row: 'hold'; readonly hold: HoldFact }
  | { readonly row: 'hold_set'; readonly holdId: string; readonly waitsFor?: Side; readonly lifted?: true }
  | {
      readonly row: 'snag';
      readonly snag: SnagFact;
      readonly kind: string;
      readonly words: string;
      readonly proposal: string;
    }
  | {
      readonly row: 'snag_set';
      readonly snagId: string;
      readonly state: SnagFact['state'] | 'declined' | 'settled';
      readonly sizesDue: boolean;
    }
  | {
      readonly row: 'snag_answer';
      readonly snagId: string;
      readonly answer: 'approve' | 'ask' | 'reply' | 'decline_carry_on' | 'decline_stop';
      readonly words: string;
    }
  | {
      readonly row: 'decision';
      readonly lineId: string;
      readonly decision: DecisionKind;
      readonly reason: string;
      readonly features: readonly string[];
    };

/** The facts as they are once the changes are written. */
export function applyChanges(facts: Facts, changes: readonly Change[]): Facts {
  return changes.reduce(applyChange, facts);
}

type Apply = { readonly [R in Change['row']]: (facts: Facts, change: Extract<Change, { row: R }>) => Facts };

const APPLY: Apply = {
  order: (facts, { set }) => ({
    ...facts,
    status: set.status ?? facts.status,
    round: set.round ?? facts.round,
    promisedOn: set.promisedOn === undefined ? facts.promisedOn : set.promisedOn,
    firstPromisedOn: set.firstPromisedOn === undefined ? facts.firstPromisedOn : set.firstPromisedOn,
    promiseDays: set.promiseDays === undefined ? facts.promiseDays : set.promiseDays,
    neededBackOn: set.neededBackOn === undefined ? facts.neededBackOn : set.neededBackOn,
  }),
  line: (facts, change) => ({
    ...facts,
    lines: facts.lines.map((line) =>
      line.id === change.lineId
        ? { ...line, started: change.started ?? line.started, stopDue: change.stopDue ?? line.stopDue }
        : line,
    ),
  }),
  quote: (facts, change) => ({
    ...facts,
    quotes: [
      ...facts.quotes,
      {
        revision: change.revision,
        kind: change.kind,
        totalMinor: change.totalMinor,
        promisedOn: change.promisedOn,
        promiseDays: change.promiseDays,
        validUntil: change.validUntil,
        state: 'open',
      },
    ],
  }),
  quote_answer: (facts, change) => ({
    ...facts,
    quotes: facts.quotes.map((quote) =>
      quote.revision === change.revision ? { ...quote, state: change.answer } : quote,
    ),
  }),
  rev: (facts, change) => ({ ...facts, latestRev: change.number, sizes: change.sizes }),
  repeat_back: (facts, change) => ({
    ...facts,
    repeated: [
      ...facts.repeated,
      ...change.sizes
        .filter((size) => size.matches)
        .map(({ lineId, since, asked }) => ({
          lineId,
          since,
          what: asked.what,
          lower: asked.lower,
          upper: asked.upper,
        })),
    ],
  }),
  move: (facts, { kind, part }) => ({
    ...facts,
    moves: [
      ...facts.moves,
      {
        id: part.id,
        partId: part.partId,
        kind,
        pieces: part.pieces,
        stamps: part.stamps,
        kit: part.kit,
        replacesId: part.replacesId,
      },
    ],
  }),
  restamp: (facts, { partId, from, to }) => ({
    ...facts,
    restamps: [...facts.restamps, { partId, from, to }],
  }),
  hold: (facts, { hold }) => ({ ...facts, holds: [...facts.holds, hold] }),
  hold_set: (facts, change) => ({
    ...facts,
    holds: facts.holds
      .filter((hold) => hold.id !== change.holdId || change.lifted !== true)
      .map((hold) =>
        hold.id === change.holdId ? { ...hold, waitsFor: change.waitsFor ?? hold.waitsFor } : hold,
      ),
  }),
  snag: (facts, { snag }) => ({ ...facts, snags: [...facts.snags, snag] }),
  snag_set: (facts, change) => ({
    ...facts,
    snags: facts.snags.flatMap((snag) => {
      if (snag.id !== change.snagId) return [snag];
      if (
        change.state === 'declined' ||
        change.state === 'settled' ||
        (change.state === 'approved' && !change.sizesDue)
      )
        return [];
      return [{ ...snag, state: change.state, sizesDue: change.sizesDue }];
    }),
  }),
  snag_answer: (facts) => facts,
  decision: (facts, change) => ({
    ...facts,
    decisions: [...facts.decisions, { lineId: change.lineId, round: facts.round, decision: change.decision }],
  }),
};

function applyChange(facts: Facts, change: Change): Facts {
  const apply = APPLY[change.row] as (facts: Facts, change: Change) => Facts;
  return apply(facts, change);
}
