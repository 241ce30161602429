import { mains, rodJournals } from '@/lib/domain/builds/features';
import {
  type Check,
  type Fields,
  type Known,
  operation,
  type Size,
  type Worked,
} from '@/lib/domain/operations/operation';

const NOTHING = { fields: {}, sheet: [], work: null } as const;
const JUDGEMENT = 'The makers’ data, local codes and the machinist’s judgement come before any figure here.';

/** Crack test: no sized metal. */
export const CRACK_TEST = operation({
  ...NOTHING,
  key: 'crack_test',
  title: 'Crack test',
  part: 'any',
  cutting: 'none',
  kit: [],
  after: ['hot_wash'],
  features: () => [],
  positions: [],
  cautions: [
    'Dye and magnetic fluids: gloves and air. Magnetic particles find cracks in iron and steel only; use dye on aluminium.',
    JUDGEMENT,
  ],
  method: 'Pass, or an indication at a named place with a photo. Iron and steel are demagnetised afterwards.',
});

/** Hot wash: no sized metal. */
export const HOT_WASH = operation({
  ...NOTHING,
  key: 'hot_wash',
  title: 'Hot wash',
  part: 'any',
  cutting: 'none',
  kit: [],
  after: [],
  features: () => [],
  positions: [],
  cautions: [
    'Hot tanks scald. Caustic never on aluminium or bearings. Plugs out before washing a crankshaft.',
    JUDGEMENT,
  ],
  method: 'Plugs out, washed, oilways brushed and blown through.',
});

const POLISH_FIELDS = {
  rodsLow: {
    quantity: 'length',
    label: 'Rods, no smaller than',
    per: 'line',
    optional: true,
    plausible: ['.4', '6'],
  },
  rodsHigh: {
    quantity: 'length',
    label: 'Rods, no bigger than',
    per: 'line',
    optional: true,
    plausible: ['.4', '6'],
  },
  mainsLow: {
    quantity: 'length',
    label: 'Mains, no smaller than',
    per: 'line',
    optional: true,
    plausible: ['.4', '6'],
  },
  mainsHigh: {
    quantity: 'length',
    label: 'Mains, no bigger than',
    per: 'line',
    optional: true,
    plausible: ['.4', '6'],
  },
  where: {
    quantity: 'words',
    label: 'Where these sizes come from',
    per: 'line',
    fallback: { value: 'the size that keeps the clearance', source: 'house default' },
  },
} as const satisfies Fields;

/** Polish journals: a tenth or two. */
export const POLISH = operation({
  key: 'polish',
  title: 'Polish journals',
  part: 'crank',
  cutting: 'smaller',
  kit: [],
  after: ['grind_rods', 'grind_mains'],
  features: (made) => [...rodJournals(made), ...mains(made)],
  positions: ['front, in line', 'rear, in line'],
  fields: POLISH_FIELDS,
  sheet: [{ title: 'Sizes to keep', show: ['rodsLow', 'rodsHigh', 'mainsLow', 'mainsHigh', 'where'] }],
  work: (known, { made }) => {
    const groups = [
      pair(known, { what: 'Rods', low: 'rodsLow', high: 'rodsHigh', features: rodJournals(made) }),
      pair(known, { what: 'Mains', low: 'mainsLow', high: 'mainsHigh', features: mains(made) }),
    ];
    const sizes = groups.flatMap((group) => group.sizes);
    const checks = groups.flatMap((group) => group.checks);
    if (sizes.length === 0 && checks.length === 0) {
      checks.push({ tone: 'refuse', words: 'Give the sizes of the rods, of the mains, or of both.' });
    }
    return { column: [], sizes, windows: [], cleanUp: [], checks } satisfies Worked;
  },
  cautions: ['A belt takes hold of gloves and sleeves.', JUDGEMENT],
  method: 'A polish takes a tenth or two. The smallest size is the one that keeps the clearance at most.',
});

interface Group {
  readonly what: string;
  readonly low: keyof typeof POLISH_FIELDS;
  readonly high: keyof typeof POLISH_FIELDS;
  readonly features: readonly string[];
}

function pair(known: Known<typeof POLISH_FIELDS>, group: Group): { sizes: Size[]; checks: Check[] } {
  const low = known.maybe(group.low);
  const high = known.maybe(group.high);
  if (!low && !high) return { sizes: [], checks: [] };
  if (!low || !high)
    return { sizes: [], checks: [{ tone: 'refuse', words: `${group.what}: give both sizes.` }] };
  if (low.value > high.value) {
    return {
      sizes: [],
      checks: [{ tone: 'refuse', words: `${group.what}: "no smaller than" is above "no bigger than".` }],
    };
  }
  const sizes = group.features.map((feature): Size => ({
    feature,
    what: group.what,
    target: high,
    lower: low.value,
    upper: high.value,
    cutting: 'smaller',
  }));
  return { sizes, checks: [] };
}

const PLACES = ['A', 'B', 'C', 'D'] as const;
const FREE_FIELDS = {
  does: {
    quantity: 'choice',
    label: 'What cutting does',
    per: 'line',
    choices: [
      { value: 'smaller', label: 'Makes it smaller' },
      { value: 'bigger', label: 'Makes it bigger' },
      { value: 'one_limit', label: 'One limit only' },
    ],
    fallback: { value: 'smaller', source: 'house default' },
  },
  what: { quantity: 'words', label: 'What is cut', per: 'line' },
  low: { quantity: 'length', label: 'No smaller than', per: 'line' },
  high: { quantity: 'length', label: 'No bigger than', per: 'line' },
  where: { quantity: 'words', label: 'Where this size comes from', per: 'line' },
} as const satisfies Fields;

/** Something else: free limits, judged like all others. */
export const SOMETHING_ELSE = operation({
  key: 'something_else',
  title: 'Something else',
  part: 'any',
  cutting: 'smaller',
  kit: [],
  after: [],
  features: () => PLACES,
  positions: ['measured'],
  fields: FREE_FIELDS,
  sheet: [{ title: 'The size', show: ['what', 'does', 'low', 'high', 'where'] }],
  work: (known) => {
    const [low, high] = [known.length('low'), known.length('high')];
    const cutting = cuttingOf(known.words('does'));
    if (low.value > high.value) {
      return {
        column: [],
        sizes: [],
        windows: [],
        cleanUp: [],
        checks: [{ tone: 'refuse', words: '"No smaller than" is above "no bigger than".' }],
      };
    }
    const target = cutting === 'bigger' ? low : high;
    const sizes: Size[] = [
      { feature: 'A', what: known.words('what'), target, lower: low.value, upper: high.value, cutting },
    ];
    return {
      column: [],
      sizes,
      windows: [],
      cleanUp: [],
      checks: [{ tone: 'note', words: `From: ${known.words('where')}` }],
    };
  },
  cautions: [JUDGEMENT],
  method: 'Give both limits and where they come from.',
});

function cuttingOf(word: string): 'smaller' | 'bigger' | 'one_limit' {
  return word === 'bigger' || word === 'one_limit' ? word : 'smaller';
}
