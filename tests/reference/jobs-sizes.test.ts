// The whole jobs of tests/reference/data/jobs.md: invented shops and engines, arithmetic computed independently.
// The clean-up rule in them is common practice, no source.
import { describe, expect, it } from 'vitest';
import { smallestPerJournal } from '@/lib/domain/operations/side-sums';
import { column, figure, made, mustWorkOut, text, workOut } from '../support/worksheet';

describe('job 1: the crank goes down first and waits for the rods', () => {
  const rods = {
    ...column('bores', '', '1.9921 1.9919 1.9922 1.9918 1.9920 1.9921'),
    ...column('found', '', '1.9979 1.9982 1.9976 1.9981 1.9984 1.9980'),
    standardLow: '1.9990',
    standardHigh: '2.0000',
    undersize: '.010',
    least: '.0018',
  };
  const six = { made: made('inline6') };

  it('grinds the rods to 1.9900 and no smaller than 1.9895', () => {
    const { sizes, column: sum, windows, checks } = mustWorkOut('grind_rods', rods, six);
    expect(sizes).toHaveLength(6);
    expect(sizes.map(({ lower, upper }) => [text(lower), text(upper)])).toEqual(
      Array(6).fill(['1.9895', '1.9900']),
    );
    expect(sum.map((row) => (row === 'rule' ? '—' : text(row.value)))).toEqual([
      '1.9918',
      '−.0018',
      '—',
      '1.9900',
    ]);
    expect(windows.map(({ lower, upper }) => [text(lower), text(upper)])).toEqual([['1.9898', '1.9901']]);
    expect(checks.map((check) => check.words)).toEqual([
      'Across all this leaves .0018 to .0027.',
      'The book size is also 1.9900.',
    ]);
  });

  it('says that .010 cleans up, wear on one side too', () => {
    const { cleanUp } = mustWorkOut('grind_rods', rods, six);
    expect(cleanUp[0]).toMatchObject({ even: true, oneSided: true, chosen: true });
    expect(cleanUp.map(({ cutTo }) => text(cutTo))[0]).toBe('1.9900');
  });

  it('grinds the mains to 2.4900 and no smaller than 2.4895', () => {
    const mains = {
      ...column('bores', 'M', '2.4922 2.4920 2.4921 2.4920 2.4923 2.4921 2.4922'),
      standardLow: '2.4990',
      standardHigh: '2.5000',
      undersize: '.010',
      least: '.0020',
    };
    const { sizes, checks } = mustWorkOut('grind_mains', mains, six);
    expect(sizes).toHaveLength(7);
    expect(sizes.map(({ lower, upper }) => [text(lower), text(upper)])[0]).toEqual(['2.4895', '2.4900']);
    expect(checks[0]?.words).toBe('Across all this leaves .0020 to .0028.');
  });

  it('questions 2.0018 for rod 4 and works nothing out until it is answered', () => {
    const { filled, worked } = workOut('grind_rods', { ...rods, 'bores.4': '2.0018' }, six);
    expect(worked).toBeNull();
    expect(filled.questions).toHaveLength(1);
    expect(filled.questions[0]?.path).toBe('bores.4');
    expect(filled.questions[0]?.words).toContain('were the standard shells still in?');
  });

  it('refuses a size bigger than every journal that is there, had all six been measured so', () => {
    const all = { ...rods, ...column('bores', '', '2.0021 2.0019 2.0022 2.0018 2.0020 2.0021') };
    const { checks, sizes } = mustWorkOut('grind_rods', all, six);
    expect(sizes.map(({ upper }) => text(upper))[0]).toBe('2.0000');
    expect(checks.filter((check) => check.tone === 'refuse').map((check) => check.words)).toContain(
      'Journal 3 is 1.9976 as found: already past this size by .0019.',
    );
  });
});

describe('job 3: shells of the wrong family', () => {
  const raw = {
    ...column('bores', '', '2.1225 2.1224 2.1226 2.1225 2.1224 2.1226 2.1225 2.1225'),
    standardLow: '2.1490',
    standardHigh: '2.1500',
    undersize: '.030',
    least: '.0020',
    most: '.0030',
  };

  it('says that these bores fit 0.75 mm shells, not .030', () => {
    const { checks, sizes } = mustWorkOut('grind_rods', raw, { made: made('v8') });
    expect(sizes.map(({ upper }) => text(upper))[0]).toBe('2.1204');
    expect(checks.map((check) => check.words)).toEqual([
      'Across all this leaves .0020 to .0027.',
      'The book size is 2.1200; this differs by .0004.',
      'These bores fit 0.75 mm shells, not .0300.',
    ]);
  });

  it('shows what the book size would do on these shells', () => {
    const { checks } = mustWorkOut(
      'grind_rods',
      { ...raw, typed: '2.1200', typedReason: 'book' },
      { made: made('v8') },
    );
    expect(checks.map((check) => check.words)).toContain('.0031 is past the .0030 wanted at most.');
    expect(checks.map((check) => check.words)).toContain(
      'Typed by hand: 2.1200. Worked out: 2.1204. It leaves .0024 at the smallest bore.',
    );
  });

  it.each([
    ['v8', '2.1224 2.1225 2.1224 2.1225'],
    ['v8bank', '2.1224 2.1224 2.1225 2.1225'],
  ])('takes the smallest bore per pin from the build: %s', (preset, expected) => {
    const bores = '2.1225 2.1224 2.1226 2.1225 2.1224 2.1226 2.1225 2.1225'
      .split(' ')
      .map((bore, index) => figure(`rod ${index + 1}`, bore));
    expect(
      smallestPerJournal(made(preset), bores)
        .map(({ value }) => text(value))
        .join(' '),
    ).toBe(expected);
  });
});

describe('job 5: the pistons are late', () => {
  const v8 = { made: made('v8') };
  const worst = Object.fromEntries(
    Array.from({ length: 8 }, (_cylinder, index) => index + 1).flatMap((cylinder) =>
      ['Top across', 'Top along', 'Middle across', 'Middle along', 'Bottom across', 'Bottom along'].map(
        (place) => [
          `found.${cylinder}.${place}`,
          cylinder === 5 && place === 'Top across' ? '3.7561' : '3.7520',
        ],
      ),
    ),
  );
  const bore = { ...worst, standard: '3.7500', oversize: '.030' };
  const pistons = {
    ...column('pistons', '', '3.7778 3.7780 3.7776 3.7781 3.7783 3.7779 3.7780 3.7778'),
    least: '.0020',
    most: '.0030',
  };

  it('bores from the nominal, marked that the pistons are not measured', () => {
    const { sizes, checks } = mustWorkOut('bore', bore, v8);
    expect(
      sizes.map(({ lower, upper, target }) => [text(lower), text(target.value), text(upper)])[0],
    ).toEqual(['3.7765', '3.7770', '3.7775']);
    expect(checks[0]?.words).toBe('Pistons not measured: this is the nominal size.');
  });

  it('judges what cleans up at the bored size', () => {
    const { cleanUp } = mustWorkOut('bore', bore, v8);
    expect(cleanUp.slice(0, 3).map(({ cutTo, even, oneSided }) => [text(cutTo), even, oneSided])).toEqual([
      ['3.7570', false, false],
      ['3.7670', true, true],
      ['3.7770', true, true],
    ]);
  });

  it('hones one size from the largest piston and says that it is past what is wanted at most', () => {
    const { sizes, checks } = mustWorkOut('hone', pistons, v8);
    expect(sizes.map(({ lower, upper }) => [text(lower), text(upper)])[0]).toEqual(['3.7803', '3.7808']);
    expect(checks.map((check) => check.words)).toEqual([
      'This leaves .0020 to .0032 over all pistons.',
      '.0032 is past the .0030 wanted at most. Each hole honed to its own piston keeps it.',
    ]);
  });

  it('hones each hole to its own piston: eight sizes, .0020 to .0025 everywhere', () => {
    const { sizes, checks } = mustWorkOut('hone', { ...pistons, fit: 'each' }, v8);
    expect(sizes.map(({ lower }) => text(lower)).join(' ')).toBe(
      '3.7798 3.7800 3.7796 3.7801 3.7803 3.7799 3.7800 3.7798',
    );
    expect(new Set(sizes.map(({ what }) => what)).size).toBe(8);
    expect(checks.map((check) => check.words)).toEqual(['This leaves .0020 to .0025 over all pistons.']);
  });

  it('takes the hone’s stock from the size to be honed when both are asked at once', () => {
    const { sizes, checks } = mustWorkOut('bore_hone', { ...bore, ...pistons, fit: 'each' }, v8);
    expect(new Set(sizes.map(({ what }) => what))).toContain('Bored');
    expect(sizes.map(({ target }) => text(target.value))[0]).toBe('3.7766');
    expect(checks.map((check) => check.words)).toContain('Left for the hone: .0025 to .0042.');
  });
});

describe('job 11: sizes changed while cutting', () => {
  const raw = {
    ...column('bores', '', '1.8870 1.8869 1.8871 1.8869 1.8868 1.8870'),
    standardLow: '1.8990',
    standardHigh: '1.9000',
    undersize: '.015',
    least: '.0018',
    most: '.0030',
  };
  const six = { made: made('inline6') };

  it('works out rev 1, and rev 2 when rod 4 measures 1.8865', () => {
    const first = mustWorkOut('grind_rods', raw, six);
    expect(first.sizes.map(({ upper }) => text(upper))[0]).toBe('1.8850');
    expect(first.checks[0]?.words).toBe('Across all this leaves .0018 to .0026.');
    const second = mustWorkOut('grind_rods', { ...raw, 'bores.4': '1.8865' }, six);
    expect(second.sizes.map(({ upper }) => text(upper))[0]).toBe('1.8847');
    expect(second.checks[0]?.words).toBe('Across all this leaves .0018 to .0029.');
  });
});
