import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { nanometres } from '@/lib/domain/quantity/length';
import { comparatorSize, judge, outOfRound, taper } from '@/lib/domain/readings/judge';
import { inches, text } from '../../support/worksheet';

const journal = { cutting: 'smaller', lower: inches('2.1145'), upper: inches('2.1150') } as const;
const bore = { cutting: 'bigger', lower: inches('3.7803'), upper: inches('3.7808') } as const;
const sizes = (...written: string[]) => written.map(inches);

describe('judging in terms of metal', () => {
  it.each([
    ['in size on both limits', ['2.1145', '2.1150'], { state: 'in_size' }],
    ['still to cut by the largest', ['2.1150', '2.1152'], { state: 'to_cut', by: inches('.0002') }],
    ['past by the smallest', ['2.1143', '2.1150'], { state: 'past', by: inches('.0002') }],
    ['past before still to cut', ['2.1144', '2.1152'], { state: 'past', by: inches('.0001') }],
    ['unread', [], { state: 'unread' }],
  ])('a journal is %s', (_words, written, expected) => {
    expect(judge(sizes(...written), journal)).toEqual(expected);
  });

  it.each([
    ['in size', ['3.7803', '3.7808'], { state: 'in_size' }],
    ['still to cut by the smallest', ['3.7801', '3.7804'], { state: 'to_cut', by: inches('.0002') }],
    ['past by the largest', ['3.7803', '3.7810'], { state: 'past', by: inches('.0002') }],
  ])('a bore is %s', (_words, written, expected) => {
    expect(judge(sizes(...written), bore)).toEqual(expected);
  });

  it('turns round when cutting turns round', () => {
    const mirror = { smaller: 'bigger', bigger: 'smaller' } as const;
    fc.assert(
      fc.property(
        fc.integer({ min: -50, max: 50 }),
        fc.constantFrom('smaller' as const, 'bigger' as const),
        (away, cutting) => {
          const limits = { lower: nanometres(-10), upper: nanometres(10) };
          const one = judge([nanometres(away)], { cutting, ...limits });
          expect(judge([nanometres(-away || 0)], { cutting: mirror[cutting], ...limits })).toEqual(one);
        },
      ),
    );
  });
});

describe('a comparator in words', () => {
  it.each([
    ['smaller', '2.1148'],
    ['bigger', '2.1152'],
    ['on', '2.1150'],
  ] as const)('%s than set to 2.1150 by 2 tenths is %s', (side, expected) => {
    expect(text(comparatorSize(inches('2.1150'), inches('.0002'), side))).toBe(expected);
  });
});

describe('form', () => {
  // Definition: Infiniti VQ35 service text, dims X, Y at sections A, B: out-of-round = |X − Y| at A and at B, taper = |A − B| at X and at Y.
  const readings = [
    { position: 'front, in line', size: inches('2.1150') },
    { position: 'front, across', size: inches('2.1148') },
    { position: 'rear, in line', size: inches('2.1147') },
    { position: 'rear, across', size: inches('2.1147') },
  ];
  it('takes out-of-round at each place and taper in each direction', () => {
    expect(text(outOfRound(readings) ?? nanometres(0))).toBe('.0002');
    expect(text(taper(readings) ?? nanometres(0))).toBe('.0003');
  });
  it('says nothing from a single reading', () => {
    expect(outOfRound(readings.slice(0, 1))).toBeNull();
    expect(taper(readings.slice(0, 2))).toBeNull();
  });
});
