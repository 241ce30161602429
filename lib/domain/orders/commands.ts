import type { ShopUnit } from '@/lib/domain/actor';
import type { DecisionKind, HoldFact, MoveKind, QuoteKind, Side } from '@/lib/domain/orders/facts';
import type { Cutting } from '@/lib/domain/operations/operation';
import type { Length } from '@/lib/domain/quantity/length';

/** One size as it is released. */
export interface ReleasedSize {
  readonly feature: string;
  readonly what: string;
  readonly cutting: Cutting;
  readonly derived: Length | null;
  readonly target: Length;
  readonly lower: Length;
  readonly upper: Length;
}

/** What a rev says of one line: its sizes, and the working frozen with them. */
export interface ReleasedLine {
  readonly lineId: string;
  readonly source: 'measured' | 'book' | 'partner_proposes' | 'typed';
  readonly catalogueVersion: number;
  readonly inputs: unknown;
  readonly steps: unknown;
  readonly checks: unknown;
  readonly typedReason: string;
  /** True when the sheet refuses: such a line is not released. */
  readonly refused: boolean;
  readonly sizes: readonly ReleasedSize[];
}

/** One size as keyed at the machine. */
export interface KeyedSize {
  readonly id: string;
  readonly lineId: string;
  readonly what: string;
  readonly lowerText: string;
  readonly upperText: string;
  readonly lower: Length;
  readonly upper: Length;
  readonly unit: ShopUnit;
}

export interface MovedPart {
  readonly id: string;
  readonly partId: string;
  readonly pieces: number;
  readonly stamps: readonly string[];
  readonly kit: readonly string[];
  readonly carrier: string;
  readonly condition: string;
  readonly replacesId: string | null;
}

/** Everything a shop can do to an order. */
export type Command =
  | { readonly do: 'send' }
  | {
      readonly do: 'change';
      readonly neededBackOn: string | null;
      readonly notes: string;
      readonly standingInstruction: string;
    }
  | { readonly do: 'withdraw'; readonly reason: string }
  | {
      readonly do: 'quote';
      readonly kind: Exclude<QuoteKind, 'settlement'>;
      readonly lines: readonly { readonly lineId: string; readonly amountMinor: number }[];
      readonly extras: readonly { readonly words: string; readonly amountMinor: number }[];
      readonly taxMinor: number;
      readonly promisedOn: string | null;
      readonly promiseDays: number | null;
      readonly validUntil: string | null;
      readonly note: string;
    }
  | { readonly do: 'decline'; readonly reason: string }
  | { readonly do: 'ask'; readonly revision: number; readonly note: string }
  | { readonly do: 'turn_down'; readonly revision: number; readonly note: string }
  | { readonly do: 'agree'; readonly revision: number }
  | { readonly do: 'expire'; readonly revision: number }
  | { readonly do: 'cancel'; readonly reason: string }
  | { readonly do: 'settle'; readonly totalMinor: number; readonly note: string }
  | { readonly do: 'answer_settlement'; readonly agree: boolean; readonly note: string }
  | { readonly do: 'release'; readonly lines: readonly ReleasedLine[]; readonly reason: string }
  | { readonly do: 'repeat_back'; readonly rev: number; readonly sizes: readonly KeyedSize[] }
  | {
      readonly do: 'move_parts';
      readonly kind: MoveKind;
      readonly parts: readonly MovedPart[];
      readonly occurredAt: string;
    }
  | {
      readonly do: 'restamp';
      readonly id: string;
      readonly partId: string;
      readonly from: string;
      readonly to: string;
      readonly words: string;
    }
  | {
      readonly do: 'hold';
      readonly id: string;
      readonly lineId: string | null;
      readonly reason: HoldFact['reason'];
      readonly words: string;
      readonly waitsFor: Side;
    }
  | { readonly do: 'answer_hold'; readonly holdId: string; readonly words: string }
  | { readonly do: 'lift_hold'; readonly holdId: string }
  | { readonly do: 'move_promise'; readonly promisedOn: string; readonly reason: string }
  | { readonly do: 'start'; readonly lineId: string }
  | {
      readonly do: 'answer_stop';
      readonly cut: readonly {
        readonly lineId: string;
        readonly feature: string;
        readonly size: Length | null;
        readonly text: string;
      }[];
    }
  | {
      readonly do: 'report';
      readonly unread: readonly { readonly lineId: string; readonly reason: string }[];
    }
  | {
      readonly do: 'raise_snag';
      readonly id: string;
      readonly lineId: string | null;
      readonly kind: string;
      readonly words: string;
      readonly proposal: string;
      readonly priceMinor: number;
      readonly days: number;
    }
  | {
      readonly do: 'approve_snag';
      readonly snagId: string;
      readonly words: string;
      readonly newSizes: boolean;
    }
  | { readonly do: 'ask_snag'; readonly snagId: string; readonly words: string }
  | { readonly do: 'reply_snag'; readonly snagId: string; readonly words: string }
  | {
      readonly do: 'decline_snag';
      readonly snagId: string;
      readonly words: string;
      readonly carryOn: boolean;
    }
  | {
      readonly do: 'decide';
      readonly decisions: readonly {
        readonly lineId: string;
        readonly decision: DecisionKind;
        readonly reason: string;
        readonly features: readonly string[];
      }[];
    };

export type CommandKind = Command['do'];
export type CommandOf<K extends CommandKind> = Extract<Command, { do: K }>;
