import type { Actor } from '@/lib/domain/actor';
import type { Change } from '@/lib/domain/orders/changes';
import type { CommandKind, CommandOf } from '@/lib/domain/orders/commands';
import type { Facts, Side } from '@/lib/domain/orders/facts';
import { fail, type Result } from '@/lib/domain/result';

/** Who asks, on which side, and when. */
export interface Asking {
  readonly actor: Pick<Actor, 'roles'>;
  readonly side: Side;
  /** ISO instant. */
  readonly now: string;
  /** The day that it is at the partner, as 2026-12-01. */
  readonly today: string;
  /** The promised day when the promise is a number of working days from clear to cut: worked out by the caller. */
  readonly dayAfter: (workingDays: number) => string;
}

/** Why a command is refused, in words for the person who asked. */
export interface Refusal {
  readonly code: 'not_your_move' | 'not_permitted' | 'wrong_status' | 'refused';
  readonly words: string;
}

/** One thing that happened, for the log. */
export interface OrderEvent {
  readonly type: string;
  readonly payload: Readonly<Record<string, unknown>>;
}

/** What a deed answers: rows to write and what to tell; `note` enters the event's payload. */
export interface Deed {
  readonly changes: readonly Change[];
  readonly note?: Readonly<Record<string, unknown>>;
  /** Further events of the same moment, after the command's own. */
  readonly also?: readonly OrderEvent[];
}

export type DeedResult = Result<Deed, Refusal>;
export type Deeds<K extends CommandKind> = {
  readonly [N in K]: (facts: Facts, command: CommandOf<N>, asking: Asking) => DeedResult;
};

/** Refuses a deed with a sentence that says what is wrong and what to do. */
export function no(words: string): { readonly ok: false; readonly problem: Refusal } {
  return fail({ code: 'refused', words });
}
