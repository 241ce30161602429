import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { nanometres } from '@/lib/domain/quantity/length';
import { partnerFigures } from '@/lib/domain/sizes/partner-figures';
import { inches } from '../../support/worksheet';

describe('figures in the partner’s unit', () => {
  // 2.1151 +.0000 −.0005 in: the target rounded to the nearest .001 mm would be 53.724, past its own limit of 53.72354.
  it('are rounded inward: never past the limits they come from', () => {
    const size = { target: inches('2.1151'), lower: inches('2.1146'), upper: inches('2.1151') };
    expect(partnerFigures(size, 'mm')).toEqual({ target: 53_723_000, lower: 53_711_000, upper: 53_723_000 });
  });

  it('are refused where no step of that unit lies between the limits', () => {
    const size = { target: nanometres(1500), lower: nanometres(1400), upper: nanometres(1600) };
    expect(partnerFigures(size, 'mm')).toBeNull();
  });

  it('always lie inside the limits, and the target inside the figures', () => {
    fc.assert(
      fc.property(fc.nat(100_000_000), fc.nat(20_000), fc.nat(20_000), (lower, below, above) => {
        const size = {
          lower: nanometres(lower),
          target: nanometres(lower + below),
          upper: nanometres(lower + below + above),
        };
        const figures = partnerFigures(size, 'in');
        if (!figures) return;
        expect(size.lower <= figures.lower && figures.lower <= figures.target).toBe(true);
        expect(figures.target <= figures.upper && figures.upper <= size.upper).toBe(true);
        expect([figures.lower % 2540, figures.target % 2540, figures.upper % 2540]).toEqual([0, 0, 0]);
      }),
    );
  });
});
