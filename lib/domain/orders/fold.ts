import { applyChanges, type Change } from '@/lib/domain/orders/changes';
import type { Facts, ReadFact } from '@/lib/domain/orders/facts';
import { type Leg, nextLeg } from '@/lib/domain/orders/legs';
import { type Stand, stand } from '@/lib/domain/orders/stand';

/** What one entry of the log did; an entry of words only did nothing. */
export interface Did {
  /** The order as it was when it was sent: the beginning of its log. */
  readonly opens?: Facts;
  readonly changes?: readonly Change[];
  /** Places that were read. */
  readonly read?: readonly ReadFact[];
}

export interface LogEntry {
  readonly seq: number;
  /** ISO instant. */
  readonly at: string;
  readonly did: Did;
}

/** An order rebuilt from its log alone. */
export interface Folded {
  readonly facts: Facts;
  readonly stand: Stand;
  readonly legs: readonly (Leg & {
    readonly startedSeq: number;
    readonly startedAt: string;
    readonly endedAt: string | null;
  })[];
}

/** What of a decision the log keeps: all but the working of the sizes, which its rev keeps for good. */
export function didOf(opens: Facts | undefined, changes: readonly Change[]): Did {
  const kept = changes.map((change) => (change.row === 'rev' ? { ...change, changed: [] } : change));
  return { ...(opens ? { opens } : {}), changes: kept };
}

/**
 * Rebuilds status, punches, whose move, the clock and its legs from an order's log, oldest entry first.
 * Undefined for a log that does not begin with the order being sent.
 */
export function fold(log: readonly LogEntry[]): Folded | undefined {
  const opens = log[0]?.did.opens;
  if (!opens) return undefined;
  const begun: Folded = { facts: opens, stand: stand(opens), legs: [] };
  return log.reduce(step, begun);
}

function step(folded: Folded, { seq, at, did }: LogEntry): Folded {
  const facts = applyChanges(folded.facts, did.changes ?? []);
  const known = { ...facts, read: [...facts.read, ...(did.read ?? [])] };
  if (did.changes === undefined) return { ...folded, facts: known };
  const after = stand(known);
  const next = { ...known, punches: after.punches, clock: after.clock };
  const leg = nextLeg(folded.facts, next, after);
  if (leg === undefined) return { facts: next, stand: after, legs: folded.legs };
  const ended = folded.legs.map((one) => (one.endedAt === null ? { ...one, endedAt: at } : one));
  const begun = leg === null ? [] : [{ ...leg, startedSeq: seq, startedAt: at, endedAt: null }];
  return { facts: next, stand: after, legs: [...ended, ...begun] };
}
