import type { ShopUnit } from '@/lib/domain/actor';
import type { Cutting } from '@/lib/domain/operations/operation';
import type { Length } from '@/lib/domain/quantity/length';

export const STATUSES = [
  'draft',
  'sent',
  'quoted',
  'agreed',
  'cutting',
  'reported',
  'accepted',
  'rejected',
  'closed',
  'declined',
  'withdrawn',
  'cancelled',
] as const;
export type Status = (typeof STATUSES)[number];

export type Side = 'sender' | 'partner';
export type Clock = 'none' | 'sender' | 'partner' | 'road' | 'snag';
export type QuoteKind = 'inspection' | 'work' | 'settlement';
export type QuoteState = 'open' | 'ask' | 'turn_down' | 'agree' | 'void' | 'expired';
export type DecisionKind = 'accept' | 'as_is' | 'send_back' | 'reject';
export type MoveKind = 'sent' | 'checked_in' | 'sent_back' | 'received';

/** One operation on the order. */
export interface LineFact {
  readonly id: string;
  readonly operation: string;
  readonly title: string;
  readonly needsSizes: boolean;
  readonly started: boolean;
  /** A new rev came while it was being cut, and what is already cut has not been said yet. */
  readonly stopDue: boolean;
  readonly partIds: readonly string[];
  /** What must travel with the part. */
  readonly kit: readonly string[];
  /** `feature|position` pairs that must be read before it is reported. */
  readonly required: readonly string[];
}

/** One hand-over of pieces. */
export interface MoveFact {
  readonly id: string;
  readonly partId: string;
  readonly kind: MoveKind;
  readonly pieces: number;
  readonly stamps: readonly string[];
  readonly kit: readonly string[];
  readonly replacesId: string | null;
}

/** One piece that was given another stamp. */
export interface RestampFact {
  readonly partId: string;
  readonly from: string;
  readonly to: string;
}

export interface PartFact {
  readonly id: string;
  readonly kind: string;
  readonly pieces: number;
  /** One stamp a piece where pieces are told apart by stamp. */
  readonly stamps: readonly string[];
}

export interface QuoteFact {
  readonly revision: number;
  readonly kind: QuoteKind;
  readonly totalMinor: number;
  readonly promisedOn: string | null;
  readonly promiseDays: number | null;
  readonly validUntil: string | null;
  readonly state: QuoteState;
}

/** One size of the latest rev. */
export interface SizeFact {
  readonly lineId: string;
  /** The rev since which this line's sizes stand. */
  readonly since: number;
  readonly feature: string;
  readonly what: string;
  readonly cutting: Cutting;
  readonly target: Length;
  readonly lower: Length;
  readonly upper: Length;
  /** The same limits fixed in the partner's unit, rounded inward, where the two shops differ. */
  readonly partner: { readonly target: Length; readonly lower: Length; readonly upper: Length } | null;
}

/** A size that has been repeated back and was equal. */
export interface RepeatedFact {
  readonly lineId: string;
  readonly since: number;
  readonly what: string;
  readonly lower: Length;
  readonly upper: Length;
}

export interface HoldFact {
  readonly id: string;
  readonly lineId: string | null;
  readonly reason: 'sizes' | 'parts' | 'decision' | 'machine' | 'other';
  readonly words: string;
  readonly waitsFor: Side;
  readonly placedBy: Side;
}

export interface SnagFact {
  readonly id: string;
  readonly lineId: string | null;
  readonly state: 'raised' | 'asked' | 'approved';
  readonly sizesDue: boolean;
  readonly priceMinor: number;
  readonly days: number;
}

export interface ReadFact {
  readonly lineId: string;
  readonly round: number;
  readonly place: string;
}

export interface DecisionFact {
  readonly lineId: string;
  readonly round: number;
  readonly decision: DecisionKind;
}

export type PunchState = 'met' | 'unmet' | 'not_needed';

/** Everything a decision sees. It holds no clock: what depends on now is an event. */
export interface Facts {
  readonly id: string;
  readonly number: number;
  readonly version: number;
  readonly logSeq: number;
  readonly status: Status;
  readonly round: number;
  readonly acceptRule: 'readings' | 'own_check';
  readonly currency: string;
  readonly sender: {
    readonly shopId: string;
    readonly name: string;
    readonly unit: ShopUnit;
    readonly timeZone: string;
  };
  readonly partner: {
    readonly shopId: string;
    readonly name: string;
    readonly unit: ShopUnit;
    readonly timeZone: string;
  } | null;
  readonly partnership: 'invited' | 'active' | 'paused' | 'ended' | null;
  readonly neededBackOn: string | null;
  readonly promisedOn: string | null;
  readonly firstPromisedOn: string | null;
  readonly promiseDays: number | null;
  readonly lines: readonly LineFact[];
  readonly parts: readonly PartFact[];
  readonly moves: readonly MoveFact[];
  readonly restamps: readonly RestampFact[];
  readonly quotes: readonly QuoteFact[];
  readonly latestRev: number | null;
  readonly sizes: readonly SizeFact[];
  readonly repeated: readonly RepeatedFact[];
  /** Open ones, oldest first. */
  readonly holds: readonly HoldFact[];
  /** Raised, asked back, or approved with sizes still due; oldest first. */
  readonly snags: readonly SnagFact[];
  readonly read: readonly ReadFact[];
  readonly decisions: readonly DecisionFact[];
  /** As they stood at the last change; from `reported` on they stay. */
  readonly punches: { readonly price: PunchState; readonly parts: PunchState; readonly sizes: PunchState };
  readonly clock: Clock;
}
