import { type Length, LENGTH_UNITS, type LengthUnit, nanometres } from '@/lib/domain/quantity/length';
import { fail, ok, type Result } from '@/lib/domain/result';

/** Why a text is not a length that can be held exactly. */
export type LengthProblem =
  | 'empty'
  | 'not_a_number'
  | 'letter_for_digit'
  | 'too_precise'
  | 'out_of_range'
  | 'which_tenths'
  | 'fraction_of_mm';

/** What each problem says beside the field, and what to do. */
export const LENGTH_PROBLEM_WORDS: Readonly<Record<LengthProblem, string>> = {
  empty: 'Give a size.',
  not_a_number: 'This does not read as a size. Write it as 2.1150, 57.19 mm, 2 1/4 or 5 tenths.',
  letter_for_digit: 'There is a letter among the figures. Write 0 for the letter O and 1 for the letter l.',
  too_precise: 'This is finer than can be held exactly. Write it with fewer places.',
  out_of_range: 'This is too large for a size.',
  which_tenths: 'Tenths of what? Write .0005 in or 0.5 mm.',
  fraction_of_mm: 'Fractions are for inches. Write millimetres with a decimal point.',
};

interface Unit {
  /** Nanometres in one, as a fraction that is exact. */
  readonly numerator: bigint;
  readonly denominator: bigint;
  readonly isInch: boolean;
}

const INCH: Unit = { numerator: BigInt(LENGTH_UNITS.in), denominator: 1n, isInch: true };
const MILLIMETRE: Unit = { numerator: BigInt(LENGTH_UNITS.mm), denominator: 1n, isInch: false };
const THOU: Unit = { numerator: BigInt(LENGTH_UNITS.in), denominator: 1000n, isInch: true };
const TENTH: Unit = { numerator: BigInt(LENGTH_UNITS.in), denominator: 10_000n, isInch: true };

const UNIT_WORDS: readonly (readonly [RegExp, Unit])[] = [
  [/\s*(?:"|″|inch(?:es)?|in\.?)$/i, INCH],
  [/\s*mm\.?$/i, MILLIMETRE],
  [/\s*thous?$/i, THOU],
  [/\s*tenths?$/i, TENTH],
];

/**
 * Reads what the trade types: 2.2405, 2.2405", .030, +.030, 2-1/4, 2 1/4, 1/64, 2 thou, 5 tenths, 57.19 mm,
 * 57,19 mm. Never guesses and never rounds: what cannot be held exactly is refused.
 */
export function parseLength(text: string, shopUnit: LengthUnit): Result<Length, LengthProblem> {
  const plain = text
    .replaceAll(/[\u2212\u2012\u2013]/g, '-')
    .replaceAll(/[\u00a0\u2009\u202f]/g, ' ')
    .trim();
  if (plain === '') return fail('empty');
  const { rest, unit } = takeUnit(plain, shopUnit);
  if (unit === TENTH && shopUnit === 'mm') return fail('which_tenths');
  const fraction = /^([+-]?)(?:(\d{1,4})[ -])?(\d{1,4})\/(\d{1,4})$/.exec(rest);
  if (fraction) return unit.isInch ? fromFraction(fraction, unit) : fail('fraction_of_mm');
  const decimal = /^([+-]?)\s*(\d{0,9})(?:[.,](\d{1,9}))?$/.exec(rest);
  if (decimal && /\d/.test(rest)) return fromDecimal(decimal, unit);
  return fail(/\d/.test(rest) && /[oOlI]/.test(rest) ? 'letter_for_digit' : 'not_a_number');
}

function takeUnit(plain: string, shopUnit: LengthUnit): { rest: string; unit: Unit } {
  for (const [word, unit] of UNIT_WORDS) {
    const found = word.exec(plain);
    if (found) return { rest: plain.slice(0, found.index), unit };
  }
  return { rest: plain, unit: shopUnit === 'in' ? INCH : MILLIMETRE };
}

function fromDecimal(match: RegExpExecArray, unit: Unit): Result<Length, LengthProblem> {
  const [, sign = '', whole = '', places = ''] = match;
  const value = BigInt(`${whole}${places}`);
  return exactly(sign, value * unit.numerator, 10n ** BigInt(places.length) * unit.denominator);
}

function fromFraction(match: RegExpExecArray, unit: Unit): Result<Length, LengthProblem> {
  const [, sign = '', whole = '0', top = '0', bottom = '1'] = match;
  const denominator = BigInt(bottom);
  if (denominator === 0n) return fail('not_a_number');
  const value = BigInt(whole) * denominator + BigInt(top);
  return exactly(sign, value * unit.numerator, denominator * unit.denominator);
}

function exactly(sign: string, numerator: bigint, denominator: bigint): Result<Length, LengthProblem> {
  if (numerator % denominator !== 0n) return fail('too_precise');
  const value = Number(numerator / denominator);
  // Ten metres: no part of an engine is larger, and sums of sizes stay exact.
  if (value > 10_000_000_000) return fail('out_of_range');
  return ok(nanometres(sign === '-' && value !== 0 ? -value : value));
}

/** A size that the code itself writes down. @throws RangeError when it is not one: a bug. */
export function lengthOf(text: string): Length {
  const parsed = parseLength(text, 'in');
  if (!parsed.ok) throw new RangeError(`${text}: ${parsed.problem}`);
  return parsed.value;
}
