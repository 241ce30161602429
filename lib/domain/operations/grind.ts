import { mains, rodJournals } from '@/lib/domain/builds/features';
import { less, smallest, taken } from '@/lib/domain/operations/figures';
import {
  bookChecks,
  clearanceChecks,
  foundChecks,
  INCH_STEPS,
  typedChecks,
} from '@/lib/domain/operations/grind-checks';
import { BORES, FOUND, type GrindKnown, SHARED_FIELDS } from '@/lib/domain/operations/grind-fields';
import {
  type CleanUp,
  type Figure,
  operation,
  type Setting,
  type Size,
  type Worked,
} from '@/lib/domain/operations/operation';
import {
  add,
  type Length,
  smallest as smallestOf,
  subtract,
  times,
  ZERO,
} from '@/lib/domain/quantity/length';
import { lengthOf } from '@/lib/domain/quantity/parse-length';

const WEAR = ['front, in line', 'front, across', 'rear, in line', 'rear, across'] as const;

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

/** Common practice: a shaft cleans up even at found − stock, one-sided at standard − 2 × wear − stock; mains also less runout. */
function cleanUp(
  known: GrindKnown,
  found: readonly Figure[],
  cut: { target: Length; runout: Figure | null },
): CleanUp[] {
  const standard = known.length('standardHigh');
  const stock = known.length('allowance').value;
  const runout = cut.runout?.value ?? ZERO;
  const least = smallestOf(found.map((journal) => journal.value));
  const wear = subtract(standard.value, least);
  const even = subtract(subtract(least, stock), runout);
  const oneSided = subtract(subtract(subtract(standard.value, times(wear, 2)), stock), runout);
  const chosen = known.length('undersize').value;
  const steps = new Set([...INCH_STEPS.slice(0, 3).map(lengthOf), chosen]);
  return [...steps]
    .filter((step) => step > 0)
    .toSorted((a, b) => a - b)
    .map((step) => {
      const cutTo = step === chosen ? cut.target : subtract(standard.value, step);
      return { step, cutTo, even: cutTo <= even, oneSided: cutTo <= oneSided, chosen: step === chosen };
    });
}

function nothing(words: string): Worked {
  return { column: [], sizes: [], windows: [], cleanUp: [], checks: [{ tone: 'refuse', words }] };
}
