import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseTemperature, printTemperature } from '@/lib/domain/quantity/temperature';

const read = (text: string, unit: 'C' | 'F' = 'C') => {
  const parsed = parseTemperature(text, unit);
  return parsed.ok ? parsed.value : parsed.problem;
};

describe('temperatures', () => {
  // Fixed points of the two scales: 32 °F is 0 °C, 212 °F is 100 °C, 68 °F is 20 °C, the reference temperature of ISO 1:2022.
  it.each([
    ['20', 20_000],
    ['20.5 C', 20_500],
    ['20,5 °C', 20_500],
    ['32 F', 0],
    ['68F', 20_000],
    ['70 °F', 21_111],
    ['50 F', 10_000],
    ['-4 F', -20_000],
    ['−5', -5_000],
  ])('reads %s', (text, expected) => expect(read(text)).toBe(expected));

  it('takes the unit of the shop where none is said', () => expect(read('68', 'F')).toBe(20_000));

  it.each([
    ['warm', 'not_a_temperature'],
    ['20 K', 'not_a_temperature'],
    ['', 'not_a_temperature'],
    ['2 0', 'not_a_temperature'],
    ['300', 'out_of_range'],
    ['-60 F', 'out_of_range'],
  ])('refuses %s', (text, expected) => expect(read(text)).toBe(expected));

  it('prints what it reads again, for every temperature there is', () => {
    fc.assert(
      fc.property(fc.integer({ min: -30_000, max: 200_000 }), (mc) => {
        expect(read(printTemperature(mc))).toBe(mc);
      }),
    );
  });
});
