import type { Cutting } from '@/lib/domain/operations/operation';
import { add, largest, type Length, smallest, subtract } from '@/lib/domain/quantity/length';

/** How a comparator stands against what it was set to. */
export type ComparatorSide = 'smaller' | 'on' | 'bigger';

/** The size that a comparator reading means: set to, and so far to a named side. Exact. */
export function comparatorSize(setTo: Length, away: Length, side: ComparatorSide): Length {
  if (side === 'on') return setTo;
  return side === 'smaller' ? subtract(setTo, away) : add(setTo, away);
}

/** What the readings of one feature say in terms of metal. */
export type Judgement =
  | { readonly state: 'unread' }
  | { readonly state: 'in_size' }
  | { readonly state: 'to_cut'; readonly by: Length }
  | { readonly state: 'past'; readonly by: Length };

interface Limits {
  readonly cutting: Cutting;
  readonly lower: Length;
  readonly upper: Length;
}

/**
 * Judges a feature by plain limits (simple acceptance, JCGM 106); a reading exactly on a limit is in size. The largest
 * reading of a journal decides still to cut, the smallest past size; a bore the other way round.
 */
export function judge(readings: readonly Length[], { cutting, lower, upper }: Limits): Judgement {
  if (readings.length === 0) return { state: 'unread' };
  const low = smallest(readings);
  const high = largest(readings);
  if (cutting === 'bigger') {
    if (high > upper) return { state: 'past', by: subtract(high, upper) };
    if (low < lower) return { state: 'to_cut', by: subtract(lower, low) };
    return { state: 'in_size' };
  }
  if (low < lower) return { state: 'past', by: subtract(lower, low) };
  if (high > upper) return { state: 'to_cut', by: subtract(high, upper) };
  return { state: 'in_size' };
}

/** A reading with its place along the feature and around it, as `front, in line` or `Top across`. */
export interface PlacedReading {
  readonly position: string;
  readonly size: Length;
}

/** Greatest difference around the feature at one place along it: out-of-round. Null with fewer than two directions. */
export function outOfRound(readings: readonly PlacedReading[]): Length | null {
  return greatest(readings, (position) => split(position).along);
}

/** Greatest difference along the feature in one direction: taper, in total. Null with fewer than two places. */
export function taper(readings: readonly PlacedReading[]): Length | null {
  return greatest(readings, (position) => split(position).around);
}

function greatest(readings: readonly PlacedReading[], group: (position: string) => string): Length | null {
  const groups = groupBy(readings, group);
  const spreads = [...groups.values()]
    .filter((members) => members.length > 1)
    .map((members) =>
      subtract(largest(members.map(({ size }) => size)), smallest(members.map(({ size }) => size))),
    );
  return spreads.length === 0 ? null : largest(spreads);
}

function split(position: string): { along: string; around: string } {
  const [along = '', around = ''] = position.split(/,\s*|\s+/, 2);
  return { along: along.toLowerCase(), around: around.toLowerCase() };
}

function groupBy(
  readings: readonly PlacedReading[],
  group: (position: string) => string,
): Map<string, PlacedReading[]> {
  const groups = new Map<string, PlacedReading[]>();
  for (const reading of readings) {
    const key = group(reading.position);
    groups.set(key, [...(groups.get(key) ?? []), reading]);
  }
  return groups;
}
