import { spawnSync } from 'node:child_process';
import { describe, expect, it } from 'vitest';

interface Answer {
  status: number | null;
  out: unknown;
}

function sum(args: readonly string[], input?: unknown): Answer {
  const run = spawnSync(process.execPath, ['--import', 'tsx', 'lib/cli/sum.ts', ...args], {
    encoding: 'utf8',
    ...(input === undefined ? {} : { input: typeof input === 'string' ? input : JSON.stringify(input) }),
  });
  return { status: run.status, out: JSON.parse(run.stdout) as unknown };
}

// Job 1 of tests/reference/data/jobs.md.
const values = {
  bores: { 1: '1.9921', 2: '1.9919', 3: '1.9922', 4: '1.9918', 5: '1.9920', 6: '1.9921' },
  standardLow: '1.9990',
  standardHigh: '2.0000',
  undersize: '.010',
  least: '.0018',
};

describe('the sum command', () => {
  it('lists the sums and gives their JSON Schema', () => {
    expect(sum(['--list'])).toMatchObject({
      status: 0,
      out: expect.arrayContaining([{ name: 'grind_rods', title: 'Grind rod journals' }]) as unknown,
    });
    expect(sum(['grind_rods', '--schema']).out).toMatchObject({
      type: 'object',
      properties: { values: { required: expect.arrayContaining(['least']) as unknown } },
    });
  });

  it('works out the same as the screen', () => {
    const { status, out } = sum(['grind_rods'], { unit: 'in', build: 'inline6', values });
    expect(status).toBe(0);
    expect(out).toMatchObject({
      results: expect.arrayContaining([
        {
          feature: '1',
          what: 'Rods',
          cutting: 'smaller',
          target: { nm: 50_546_000, in: '1.9900', mm: '50.546' },
          upper: { nm: 50_546_000, in: '1.9900', mm: '50.546' },
          lower: { nm: 50_533_300, in: '1.9895', mm: '50.5333' },
        },
      ]) as unknown,
    });
  });

  it('gives the same nanometres for the same job in millimetres', () => {
    const inMillimetres = {
      bores: Object.fromEntries(Object.entries(values.bores).map(([rod, bore]) => [rod, `${bore} in`])),
      ...{ standardLow: '1.9990 in', standardHigh: '50.8', undersize: 0.254, least: '0.04572' },
    };
    const [inches, millimetres] = [
      sum(['grind_rods'], { values }),
      sum(['grind_rods'], { unit: 'mm', values: inMillimetres }),
    ];
    expect((millimetres.out as { results: unknown }).results).toEqual(
      (inches.out as { results: unknown }).results,
    );
  });

  it.each([
    ['an unknown name', ['grind_everything'], {}, 404],
    ['text that is no JSON', ['grind_rods'], '{', 400],
    ['a field that is not there', ['grind_rods'], { values: { ...values, most_of_all: '1' } }, 422],
    ['a size that cannot be held', ['grind_rods'], { values: { ...values, least: '1/3' } }, 422],
    [
      'a questioned size',
      ['grind_rods'],
      { values: { ...values, bores: { ...values.bores, 4: '2.0018' } } },
      422,
    ],
  ])('answers %s with a problem and exits 1', (_words, args, input, status) => {
    expect(sum(args, input)).toMatchObject({ status: 1, out: { status } });
  });
});
