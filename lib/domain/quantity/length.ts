declare const brand: unique symbol;

/** A signed length held as a whole number of nanometres. */
export type Length = number & { readonly [brand]: 'Length' };

/** Units a person may write. Each factor is exact: nanometres in one. */
export const LENGTH_UNITS = { mm: 1_000_000, in: 25_400_000 } as const;
export type LengthUnit = keyof typeof LENGTH_UNITS;

/** Nothing at all. */
export const ZERO = 0 as Length;

/** @throws RangeError unless `value` is a safe integer: a caller's bug, never a person's mistake. */
export function nanometres(value: number): Length {
  if (!Number.isSafeInteger(value)) throw new RangeError(`Not whole nanometres: ${String(value)}`);
  return value as Length;
}

/** a + b, exactly. */
export function add(a: Length, b: Length): Length {
  return nanometres(a + b);
}

/** a − b, exactly. */
export function subtract(a: Length, b: Length): Length {
  return nanometres(a - b);
}

/** A whole multiple, exactly. @throws RangeError when `factor` is not whole. */
export function times(a: Length, factor: number): Length {
  if (!Number.isSafeInteger(factor)) throw new RangeError(`Not a whole factor: ${String(factor)}`);
  return nanometres(a * factor);
}

/** The same length without its sign. */
export function magnitude(a: Length): Length {
  return nanometres(Math.abs(a));
}

/** The smallest of at least one length. @throws RangeError for none. */
export function smallest(lengths: readonly Length[]): Length {
  if (lengths.length === 0) throw new RangeError('The smallest of nothing');
  return nanometres(Math.min(...lengths));
}

/** The largest of at least one length. @throws RangeError for none. */
export function largest(lengths: readonly Length[]): Length {
  if (lengths.length === 0) throw new RangeError('The largest of nothing');
  return nanometres(Math.max(...lengths));
}

/** How a length that cannot be held or shown exactly is brought to a step. Always named by the caller. */
export type Rounding = 'down' | 'up' | 'half_away';

/** Brings a length to a whole multiple of `step`. `down` is towards minus infinity, `up` towards plus. */
export function roundTo(value: Length, step: Length, rounding: Rounding): Length {
  const parts = value / step;
  if (rounding === 'down') return times(step, Math.floor(parts));
  if (rounding === 'up') return times(step, Math.ceil(parts));
  return times(step, Math.sign(parts) * Math.round(Math.abs(parts)));
}
