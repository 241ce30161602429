declare const brand: unique symbol;

/** A signed length held as a whole number of nanometres. */
export type Length = number & { readonly [brand]: 'Length' };

/** Units a person may write. Each factor is exact: nanometres in one. */
export const LENGTH_UNITS = { mm: 1_000_000, in: 25_400_000 } as const;
export type LengthUnit = keyof typeof LENGTH_UNITS;

/** @throws RangeError unless `value` is a safe integer: a caller's bug, never a person's mistake. */
export function nanometres(value: number): Length {
  if (!Number.isSafeInteger(value)) throw new RangeError(`Not whole nanometres: ${String(value)}`);
  return value as Length;
}
