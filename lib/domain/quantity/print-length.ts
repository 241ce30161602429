import {
  type Length,
  LENGTH_UNITS,
  type LengthUnit,
  nanometres,
  roundTo,
} from '@/lib/domain/quantity/length';

/** The fewest places each unit prints with. */
const FEWEST_PLACES = { in: 4, mm: 3 } as const;
/** With six places every value that is exact in a unit at all is shown whole. */
const MOST_PLACES = 6;

interface PrintChoices {
  /** Show + before a positive length, as for limits and clearances. */
  readonly signed?: boolean;
}

/** Whether the length has an exact decimal writing in the unit. */
export function isExactIn(value: Length, unit: LengthUnit): boolean {
  return (BigInt(value) * 1_000_000n) % BigInt(LENGTH_UNITS[unit]) === 0n;
}

/**
 * Prints a length the trade's way: inches without a leading zero and with at least four places (.0020, 2.1150),
 * millimetres with at least three. As many places as it needs, so that parse(print(x)) is x.
 * @throws RangeError when it has no exact decimal writing in the unit; use printNear for help in the other unit.
 */
export function printLength(value: Length, unit: LengthUnit, choices: PrintChoices = {}): string {
  const scaled = BigInt(value) * 1_000_000n;
  const factor = BigInt(LENGTH_UNITS[unit]);
  if (scaled % factor !== 0n) throw new RangeError(`No exact writing in ${unit}: ${String(value)} nm`);
  return write(scaled / factor, unit, choices);
}

/** The length in the unit when it is exact there, else rounded to the shop's places with ≈ before it. */
export function printNear(value: Length, unit: LengthUnit, choices: PrintChoices = {}): string {
  if (isExactIn(value, unit)) return printLength(value, unit, choices);
  const step = nanometres(unit === 'in' ? 2540 : 1000);
  return `≈ ${printLength(roundTo(value, step, 'half_away'), unit, choices)}`;
}

/** The length with its unit named: 2.1150 in, 53.721 mm. */
export function printWithUnit(value: Length, unit: LengthUnit): string {
  return `${printNear(value, unit)} ${unit}`;
}

function write(millionths: bigint, unit: LengthUnit, { signed = false }: PrintChoices): string {
  const sign = millionths < 0n ? '−' : signed ? '+' : '';
  const digits = (millionths < 0n ? -millionths : millionths).toString().padStart(MOST_PLACES + 1, '0');
  const whole = digits.slice(0, -MOST_PLACES);
  let places = digits.slice(-MOST_PLACES);
  while (places.length > FEWEST_PLACES[unit] && places.endsWith('0')) places = places.slice(0, -1);
  return `${sign}${unit === 'in' && whole === '0' ? '' : whole}.${places}`;
}
