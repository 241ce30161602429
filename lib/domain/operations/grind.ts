import { mains, rodJournals, rodsOnJournal } from '@/lib/domain/builds/features';
import type { Made } from '@/lib/domain/builds/made';
import { largest, less, plus, smallest, taken, worked } from '@/lib/domain/operations/figures';
import {
  type Check,
  type CleanUp,
  type Field,
  type Fields,
  type Figure,
  type Known,
  operation,
  type Print,
  type Setting,
  type Size,
  type Worked,
} from '@/lib/domain/operations/operation';
import {
  add,
  type Length,
  magnitude,
  smallest as smallestOf,
  subtract,
  times,
} from '@/lib/domain/quantity/length';
import { parseLength } from '@/lib/domain/quantity/parse-length';

const COMMON = 'common practice, no source';
const WEAR = ['front, in line', 'front, across', 'rear, in line', 'rear, across'] as const;

const SHARED_FIELDS = {
  source: {
    quantity: 'choice',
    label: 'Where the size comes from',
    per: 'line',
    choices: [
      { value: 'measured', label: 'Measured: bores with these shells in' },
      { value: 'book', label: 'Book: the maker’s undersize' },
      { value: 'partner_proposes', label: 'The machine shop proposes the least that cleans up' },
    ],
    fallback: { value: 'measured', source: 'house default' },
  },
  shells: {
    quantity: 'words',
    label: 'Shells: make, number, size stamped on the back',
    per: 'line',
    optional: true,
  },
  asFitted: {
    quantity: 'choice',
    label: 'How the bores were measured',
    per: 'line',
    choices: [
      { value: 'torqued', label: 'These shells in, bolts torqued and lubricated' },
      { value: 'loose', label: 'Otherwise' },
    ],
    fallback: { value: 'torqued', source: 'house default' },
  },
  standardLow: { quantity: 'length', label: 'Standard, smallest', per: 'line', plausible: ['.4', '6'] },
  standardHigh: { quantity: 'length', label: 'Standard, largest', per: 'line', plausible: ['.4', '6'] },
  undersize: {
    quantity: 'length',
    label: 'Undersize of the shells',
    per: 'line',
    plausible: ['.0', '.06'],
    fallback: { value: '.000', source: 'standard shells' },
  },
  least: { quantity: 'length', label: 'Oil clearance, at least', per: 'line', plausible: ['.0003', '.008'] },
  most: {
    quantity: 'length',
    label: 'Oil clearance, at most',
    per: 'line',
    optional: true,
    plausible: ['.0005', '.012'],
  },
  limit: {
    quantity: 'length',
    label: 'Limit below the size',
    per: 'line',
    plausible: ['.0001', '.002'],
    fallback: { value: '.0005', source: COMMON },
  },
  allowance: {
    quantity: 'length',
    label: 'Metal that must come off to be clean, on diameter',
    per: 'line',
    plausible: ['.0', '.01'],
    fallback: { value: '.002', source: COMMON },
  },
  polishLeast: {
    quantity: 'length',
    label: 'The polish takes at least',
    per: 'line',
    plausible: ['.0', '.001'],
    fallback: { value: '.0001', source: COMMON },
  },
  polishMost: {
    quantity: 'length',
    label: 'The polish takes at most',
    per: 'line',
    plausible: ['.0', '.001'],
    fallback: { value: '.0003', source: COMMON },
  },
  typed: { quantity: 'length', label: 'Finish to, by hand', per: 'line', optional: true },
  typedReason: { quantity: 'words', label: 'Why by hand', per: 'line', optional: true },
} as const satisfies Fields;

const BORES = {
  quantity: 'length',
  label: 'Bearing bores',
  per: 'feature',
  condition: 'these shells in, caps torqued; the smaller of front and rear, in line with the beam',
  optional: true,
  plausible: ['.4', '6'],
  spread: '.004',
} as const satisfies Field;

const FOUND = {
  quantity: 'length',
  label: 'Journals as found',
  per: 'feature',
  condition: 'smallest of each journal',
  optional: true,
  plausible: ['.4', '6'],
  spread: '.015',
} as const satisfies Field;

const SHEET = [
  { title: 'Bearing bores', show: ['source', 'shells', 'asFitted', 'bores', 'least', 'most'] },
  { title: 'The crankshaft', show: ['standardLow', 'standardHigh', 'undersize', 'found'] },
  { title: 'Limits', show: ['limit', 'allowance', 'polishLeast', 'polishMost', 'typed', 'typedReason'] },
] as const;

const CAUTIONS = [
  'Grinding wheels burst and catch clothing and hands: guards on, wheel rung and dressed, crankshaft driven from a steady.',
  'Keep the fillet radius. A sharp corner breaks the crankshaft.',
  'The engine and bearing makers’ data and the machinist’s judgement come before any figure on this sheet.',
];

const METHOD =
  'Fit the shells that will be run, torque the caps with the bolts lubricated, and measure each bore in line with the beam (mains: vertical), ' +
  'front and rear, never at the split. Finish to = smallest bore − least clearance. The clearance over all is from smallest bore − size to largest ' +
  'bore − lower limit. A size cleans up with the wear even when it is no more than smallest found − stock, and with all the wear on one side when it ' +
  'is no more than standard − 2 × wear − stock.';

/** Grind rod journals to size. */
export const GRIND_RODS = operation({
  key: 'grind_rods',
  title: 'Grind rod journals',
  part: 'crank',
  cutting: 'smaller',
  kit: [],
  after: ['hot_wash', 'crack_test'],
  features: rodJournals,
  positions: WEAR,
  fields: { ...SHARED_FIELDS, bores: { ...BORES, rows: 'rods' }, found: FOUND },
  sheet: SHEET,
  work: (known, setting) =>
    grind(known, setting, { what: 'Rods', features: rodJournals(setting.made), noun: 'rod', runout: null }),
  cautions: CAUTIONS,
  method: METHOD,
});

/** Grind main journals to size. */
export const GRIND_MAINS = operation({
  key: 'grind_mains',
  title: 'Grind main journals',
  part: 'crank',
  cutting: 'smaller',
  kit: [],
  after: ['hot_wash', 'crack_test'],
  features: mains,
  positions: WEAR,
  fields: {
    ...SHARED_FIELDS,
    bores: BORES,
    found: FOUND,
    runout: {
      quantity: 'length',
      label: 'Runout, total reading at the middle main',
      per: 'line',
      plausible: ['.0', '.03'],
      fallback: { value: '.0000', source: 'not measured' },
    },
  },
  sheet: [...SHEET.slice(0, 2), { title: 'Runout', show: ['runout'] }, ...SHEET.slice(2)],
  work: (known, setting) =>
    grind(known, setting, {
      what: 'Mains',
      features: mains(setting.made),
      noun: 'main',
      runout: known.length('runout'),
    }),
  cautions: CAUTIONS,
  method: METHOD,
});

interface Journals {
  readonly what: string;
  readonly noun: string;
  readonly features: readonly string[];
  readonly runout: Figure | null;
}

type GrindKnown = Known<typeof SHARED_FIELDS & { bores: Field; found: Field }>;

function grind(known: GrindKnown, setting: Setting, journals: Journals): Worked {
  const bores = known.each('bores');
  const found = known.each('found');
  const source = known.words('source');
  const book = less('Book size', known.length('standardHigh'), known.length('undersize'));
  const measured = source === 'measured';
  if (measured && bores.length === 0) {
    return nothing('Measure the bearing bores with the shells in, or say that the size is the book’s.');
  }
  const least = known.length('least');
  const smallestBore = measured ? smallest('Smallest bearing bore', bores) : null;
  const derived = smallestBore ? less('Finish to', smallestBore, least) : { ...book, label: 'Finish to' };
  const typed = known.maybe('typed');
  const target = typed ?? derived;
  const lower = subtract(target.value, known.length('limit').value);
  const column = smallestBore
    ? [smallestBore, taken(least), 'rule' as const, derived]
    : [known.length('standardHigh'), taken(known.length('undersize')), 'rule' as const, derived];
  const sizes = journals.features.map((feature): Size => ({
    feature,
    what: journals.what,
    target,
    lower,
    upper: target.value,
    cutting: 'smaller',
  }));
  const checks = [
    ...clearanceChecks(known, setting, { target: target.value, lower, measured }),
    ...typedChecks(known, setting.print, derived),
    ...bookChecks(known, setting.print, { target: target.value, book: book.value, source }),
    ...foundChecks(found, setting.print, { target: target.value, lower }),
  ];
  return {
    column,
    sizes,
    windows: [
      {
        label: 'Before the polish',
        lower: add(lower, known.length('polishMost').value),
        upper: add(target.value, known.length('polishLeast').value),
      },
    ],
    cleanUp:
      found.length === 0 ? [] : cleanUp(known, found, { target: target.value, runout: journals.runout }),
    checks,
  };
}

interface Cut {
  readonly target: Length;
  readonly lower: Length;
}

function clearanceChecks(known: GrindKnown, { print }: Setting, cut: Cut & { measured: boolean }): Check[] {
  const bores = known.each('bores');
  if (!cut.measured)
    return [
      { tone: 'warn', words: 'The clearance is unproven: the bores were not measured with these shells in.' },
    ];
  if (known.words('asFitted') !== 'torqued') {
    return [
      {
        tone: 'refuse',
        words:
          'The bores were not measured with these shells in and the bolts torqued, so nothing is judged.',
      },
    ];
  }
  const low = subtract(smallest('', bores).value, cut.target);
  const high = subtract(largest('', bores).value, cut.lower);
  const over: Check = { tone: 'fine', words: `Across all this leaves ${print(low)} to ${print(high)}.` };
  const most = known.maybe('most');
  if (low <= 0)
    return [
      over,
      { tone: 'refuse', words: 'A journal would be as large as its bore. Check the sign and the shells.' },
    ];
  if (most && high > most.value) {
    return [over, { tone: 'warn', words: `${print(high)} is past the ${print(most.value)} wanted at most.` }];
  }
  return [over];
}

function typedChecks(known: GrindKnown, print: Print, derived: Figure): Check[] {
  const typed = known.maybe('typed');
  if (!typed || typed.value === derived.value) return [];
  const bores = known.each('bores');
  const leaves =
    bores.length > 0
      ? ` It leaves ${print(subtract(smallest('', bores).value, typed.value))} at the smallest bore.`
      : '';
  const words = `Typed by hand: ${print(typed.value)}. Worked out: ${print(derived.value)}.${leaves}`;
  const reason: Check[] =
    known.words('typedReason') === ''
      ? [{ tone: 'refuse', words: 'Say why the size is typed by hand.' }]
      : [];
  return [{ tone: 'warn', words }, ...reason];
}

const METRIC_STEPS = ['0.25 mm', '0.50 mm', '0.75 mm', '1.00 mm'];
const INCH_STEPS = ['.010 in', '.020 in', '.030 in', '.040 in'];

function bookChecks(
  known: GrindKnown,
  print: Print,
  { target, book, source }: { target: Length; book: Length; source: string },
): Check[] {
  if (source !== 'measured') return [];
  if (target === book) return [{ tone: 'fine', words: `The book size is also ${print(book)}.` }];
  const difference = subtract(target, book);
  const notes: Check[] = [
    { tone: 'note', words: `The book size is ${print(book)}; this differs by ${print(difference)}.` },
  ];
  const standard = known.length('standardHigh').value;
  const other = [...METRIC_STEPS, ...INCH_STEPS].find((step) => {
    const size = subtract(standard, must(step));
    return (
      size !== book &&
      magnitude(subtract(size, book)) < must('.0012 in') &&
      magnitude(subtract(target, size)) < magnitude(difference)
    );
  });
  if (other !== undefined)
    notes.push({
      tone: 'warn',
      words: `These bores fit ${other} shells, not ${print(known.length('undersize').value)}.`,
    });
  return notes;
}

function foundChecks(found: readonly Figure[], print: Print, { target, lower }: Cut): Check[] {
  const past = found.filter((journal) => journal.value < lower);
  if (past.length > 0) {
    return past.map((journal) => ({
      tone: 'refuse',
      words: `${capital(journal.label)} is ${print(journal.value)} as found: already past this size by ${print(subtract(lower, journal.value))}.`,
    }));
  }
  return found
    .filter((journal) => journal.value < target)
    .map((journal) => ({
      tone: 'warn',
      words: `${capital(journal.label)} is ${print(journal.value)} as found, smaller than the size.`,
    }));
}

/** Common practice: a shaft cleans up even at found − stock, one-sided at standard − 2 × wear − stock; mains also less runout. */
function cleanUp(
  known: GrindKnown,
  found: readonly Figure[],
  cut: { target: Length; runout: Figure | null },
): CleanUp[] {
  const standard = known.length('standardHigh');
  const stock = known.length('allowance').value;
  const runout = cut.runout?.value ?? (0 as Length);
  const least = smallestOf(found.map((journal) => journal.value));
  const wear = subtract(standard.value, least);
  const even = subtract(subtract(least, stock), runout);
  const oneSided = subtract(subtract(subtract(standard.value, times(wear, 2)), stock), runout);
  const chosen = known.length('undersize').value;
  const steps = new Set([...INCH_STEPS.slice(0, 3).map(must), chosen]);
  return [...steps]
    .filter((step) => step > 0)
    .toSorted((a, b) => a - b)
    .map((step) => {
      const cutTo = step === chosen ? cut.target : subtract(standard.value, step);
      return { step, cutTo, even: cutTo <= even, oneSided: cutTo <= oneSided, chosen: step === chosen };
    });
}

/** The smallest bore of each journal: on a shared pin, of all the rods that run on it. */
export function smallestPerJournal(made: Made, bores: readonly Figure[]): readonly Figure[] {
  return rodJournals(made).map((journal) => {
    const running = rodsOnJournal(made, journal).map((rod) => `rod ${rod}`);
    return smallest(
      `journal ${journal}`,
      bores.filter((bore) => running.includes(bore.label)),
    );
  });
}

/** Rod clearance chain: housing less two shells less pin, at least and at most. */
export function clearanceChain(
  housing: readonly [Figure, Figure],
  shell: readonly [Figure, Figure],
  pin: readonly [Figure, Figure],
): [Figure, Figure] {
  const bore = (house: Figure, wall: Figure) =>
    worked('Bore with shells', subtract(house.value, times(wall.value, 2)), 'less two shells', [house, wall]);
  return [
    less('Clearance, at least', bore(housing[0], shell[1]), pin[1]),
    less('Clearance, at most', bore(housing[1], shell[0]), pin[0]),
  ];
}

/** A regrind table's row: both standard limits less the undersize. */
export function regrind(standard: readonly [Figure, Figure], undersize: Figure): [Figure, Figure] {
  return [less('No smaller than', standard[0], undersize), less('No bigger than', standard[1], undersize)];
}

/** Where a journal size stands with its clearance: bore = journal + clearance. */
export function boreFor(journal: Figure, clearance: Figure): Figure {
  return plus('Bore', journal, clearance);
}

function nothing(words: string): Worked {
  return { column: [], sizes: [], windows: [], cleanUp: [], checks: [{ tone: 'refuse', words }] };
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

function must(text: string): Length {
  const parsed = parseLength(text, 'in');
  if (!parsed.ok) throw new RangeError(`${text}: ${parsed.problem}`);
  return parsed.value;
}
