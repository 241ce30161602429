import { describe, expect, it } from 'vitest';
import { clearanceChain, regrind } from '@/lib/domain/operations/side-sums';
import { figure, inches, made, mustWorkOut, text } from '../support/worksheet';

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

  // Published: TM 5-3825-226-24, standard 4.5000–4.5015: reboring is required at 4.5090 and gives 4.5205 ± .0005; at 4.5290 it
  // gives 4.5405 ± .0005. The steps in between are ours; the manual has .020 and .040 only.
  it.each([
    ['4.5090', '.020', '.010', '4.5200', '4.5210'],
    ['4.5290', '.040', '.030', '4.5400', '4.5410'],
  ])('bores a cylinder found at %s to the oversize of TM 5-3825-226-24', (found, step, less, low, high) => {
    const raw = {
      standard: '4.5000',
      oversize: step,
      stock: '.003',
    };
    const everywhere = Object.fromEntries(
      ['1', '2', '3', '4'].flatMap((cylinder) =>
        ['Top across', 'Top along', 'Middle across', 'Middle along', 'Bottom across', 'Bottom along'].flatMap(
          (place) => [
            [`found.${cylinder}.${place}`, found],
            [`keep:found.${cylinder}.${place}`, found],
          ],
        ),
      ),
    );
    const { cleanUp } = mustWorkOut('bore', { ...raw, ...everywhere }, { made: made('inline4') });
    const cleans = (oversize: string) => cleanUp.find((one) => one.step === inches(oversize))?.even;
    expect([cleans(less), cleans(step)]).toEqual([false, true]);
    // The manual's finished bore holds the standard plus the oversize that the rule picks.
    const finished = inches('4.5000') + inches(step);
    expect(finished).toBeGreaterThanOrEqual(inches(low));
    expect(finished).toBeLessThanOrEqual(inches(high));
  });
});
