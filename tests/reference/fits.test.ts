import { describe, expect, it } from 'vitest';
import { clearanceChain, regrind } from '@/lib/domain/operations/side-sums';
import { figure, text } from '../support/worksheet';

const f = (written: string) => figure('', written);

describe('published figures', () => {
  // Published: TM 10-3930-632-34, rod bore 1.6240–1.6245, shell 0.0614–0.0617, pin 1.499–1.500: 0.0006–0.0027 in.
  it('agrees with the rod clearance chain of TM 10-3930-632-34', () => {
    const [least, most] = clearanceChain(
      [f('1.6240'), f('1.6245')],
      [f('.0614'), f('.0617')],
      [f('1.499'), f('1.500')],
    );
    expect([text(least.value), text(most.value)]).toEqual(['.0006', '.0027']);
  });

  // Published: TM 10-3930-638-24&P p.4-29, standard 2.2480–2.2490.
  it.each([
    ['.002', '2.2460', '2.2470'],
    ['.010', '2.2380', '2.2390'],
    ['.020', '2.2280', '2.2290'],
    ['.030', '2.2180', '2.2190'],
  ])('agrees with the regrind table of TM 10-3930-638-24&P at −%s', (under, low, high) => {
    expect(regrind([f('2.2480'), f('2.2490')], f(under)).map(({ value }) => text(value))).toEqual([
      low,
      high,
    ]);
  });

  // Published: TM 5-2420-230-24-2, B5.9 rod journal minimum 68.987 mm at undersizes 0.25, 0.50, 0.75, 1.00 mm.
  it.each([
    ['0.25 mm', '68.737 mm'],
    ['0.50 mm', '68.487 mm'],
    ['0.75 mm', '68.237 mm'],
    ['1.00 mm', '67.987 mm'],
  ])('agrees with the metric regrind table of TM 5-2420-230-24-2 at −%s', (under, low) => {
    const [lower] = regrind([f('68.987 mm'), f('69.000 mm')], f(under));
    expect(lower.value).toBe(f(low).value);
  });
});
