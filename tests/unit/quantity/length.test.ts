import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  add,
  largest,
  type LengthUnit,
  nanometres,
  roundTo,
  smallest,
  subtract,
  times,
} from '@/lib/domain/quantity/length';
import { LENGTH_PROBLEM_WORDS, parseLength } from '@/lib/domain/quantity/parse-length';
import { isExactIn, printLength, printNear, printWithUnit } from '@/lib/domain/quantity/print-length';

describe('reading a length', () => {
  it.each<[string, LengthUnit, number]>([
    ['2.2405', 'in', 56_908_700],
    ['2.2405"', 'mm', 56_908_700],
    ['.030', 'in', 762_000],
    ['+.030', 'in', 762_000],
    ['-.0005', 'in', -12_700],
    ['−.0005', 'in', -12_700],
    ['2-1/4', 'in', 57_150_000],
    ['2 1/4', 'in', 57_150_000],
    ['1/64', 'in', 396_875],
    ['2 thou', 'in', 50_800],
    ['2 thou', 'mm', 50_800],
    ['5 tenths', 'in', 12_700],
    ['57.19 mm', 'in', 57_190_000],
    ['57,19 mm', 'in', 57_190_000],
    ['57,19', 'mm', 57_190_000],
    ['2.11505', 'in', 53_722_270],
    [' 2 in. ', 'mm', 50_800_000],
    ['-0', 'in', 0],
  ])('reads %s in a shop that works in %s', (text, unit, nm) => {
    expect(parseLength(text, unit)).toEqual({ ok: true, value: nm });
  });

  it.each([
    ['', 'in', 'empty'],
    ['.', 'in', 'not_a_number'],
    ['two', 'in', 'not_a_number'],
    ['1/0', 'in', 'not_a_number'],
    ['2.115.0', 'in', 'not_a_number'],
    ['1,234.5', 'in', 'not_a_number'],
    ['2.1O50', 'in', 'letter_for_digit'],
    ['2.l150', 'in', 'letter_for_digit'],
    ['.000001', 'in', 'too_precise'],
    ['1/128', 'in', 'too_precise'],
    ['1/3', 'in', 'too_precise'],
    ['0.0000001', 'mm', 'too_precise'],
    ['99999999', 'in', 'out_of_range'],
    ['5 tenths', 'mm', 'which_tenths'],
    ['1/4 mm', 'in', 'fraction_of_mm'],
  ] as const)('refuses %j in a shop that works in %s: %s', (text, unit, problem) => {
    expect(parseLength(text, unit)).toEqual({ ok: false, problem });
    expect(LENGTH_PROBLEM_WORDS[problem]).toMatch(/\.$/);
  });
});

describe('printing a length', () => {
  it.each<[number, LengthUnit, string]>([
    [50_800, 'in', '.0020'],
    [53_721_000, 'in', '2.1150'],
    [53_722_270, 'in', '2.11505'],
    [-12_700, 'in', '−.0005'],
    [0, 'in', '.0000'],
    [57_190_000, 'mm', '57.190'],
    [500_000, 'mm', '0.500'],
    [396_875, 'in', '.015625'],
  ])('prints %i nm in %s as %s', (nm, unit, text) => {
    expect(printLength(nanometres(nm), unit)).toBe(text);
  });

  it('shows limits with their sign', () => {
    expect(printLength(nanometres(0), 'in', { signed: true })).toBe('+.0000');
    expect(printLength(nanometres(-12_700), 'in', { signed: true })).toBe('−.0005');
  });

  it('marks what is not exact in the other unit and never prints it as if it were', () => {
    const size = nanometres(57_190_000);
    expect(isExactIn(size, 'in')).toBe(false);
    expect(printNear(size, 'in')).toBe('≈ 2.2516');
    expect(printWithUnit(nanometres(53_721_000), 'mm')).toBe('53.721 mm');
    expect(() => printLength(size, 'in')).toThrow(RangeError);
  });
});

describe('exactness', () => {
  const lengths = fc.integer({ min: -9_000_000_000, max: 9_000_000_000 });

  it('reads back exactly what it prints, in millimetres', () => {
    fc.assert(
      fc.property(lengths, (nm) => {
        expect(parseLength(printLength(nanometres(nm), 'mm'), 'mm')).toEqual({ ok: true, value: nm });
      }),
    );
  });

  it('reads back exactly what it prints, in inches', () => {
    fc.assert(
      fc.property(fc.integer({ min: -70_000_000, max: 70_000_000 }), (steps) => {
        const value = times(nanometres(127), steps);
        expect(parseLength(printLength(value, 'in'), 'in')).toEqual({ ok: true, value });
      }),
    );
  });

  it('adds and subtracts without rounding', () => {
    fc.assert(
      fc.property(lengths, lengths, (a, b) => {
        expect(subtract(add(nanometres(a), nanometres(b)), nanometres(b))).toBe(a);
      }),
    );
  });

  it('rounds only where asked, and then to the step', () => {
    fc.assert(
      fc.property(lengths, (nm) => {
        const step = nanometres(1000);
        const down = roundTo(nanometres(nm), step, 'down');
        const up = roundTo(nanometres(nm), step, 'up');
        expect(down % 1000 === 0 && up % 1000 === 0 && down <= nm && nm <= up && up - down <= 1000).toBe(
          true,
        );
        expect([down, up]).toContain(roundTo(nanometres(nm), step, 'half_away'));
      }),
    );
  });

  it('refuses fractions of a nanometre and the extremes of nothing', () => {
    expect(() => nanometres(0.5)).toThrow(RangeError);
    expect(() => times(nanometres(1), 0.5)).toThrow(RangeError);
    expect(() => smallest([])).toThrow(RangeError);
    expect(() => largest([])).toThrow(RangeError);
  });
});
