import { cylinders } from '@/lib/domain/builds/features';
import {
  BORE_FIELDS,
  type BoreKnown,
  HONE_FIELDS,
  type HoneKnown,
} from '@/lib/domain/operations/bore-hone-fields';
import { largest, less, plus, smallest, taken } from '@/lib/domain/operations/figures';
import {
  type Check,
  type CleanUp,
  type Figure,
  operation,
  type Print,
  type Setting,
  type Size,
} from '@/lib/domain/operations/operation';
import {
  add,
  largest as largestOf,
  type Length,
  smallest as smallestOf,
  subtract,
  times,
} from '@/lib/domain/quantity/length';
import { lengthOf } from '@/lib/domain/quantity/parse-length';

const POSITIONS = [
  'Top across',
  'Top along',
  'Middle across',
  'Middle along',
  'Bottom across',
  'Bottom along',
] as const;

const CAUTIONS = [
  'Boring bars and hones catch clothing and hands. Clamp the block, keep guards on.',
  'Check the wall thickness before the second oversize.',
  'The engine and piston makers’ data and the machinist’s judgement come before any figure on this sheet.',
];

/** Bore cylinders, leaving stock for the hone. */
export const BORE = operation({
  key: 'bore',
  title: 'Bore cylinders',
  part: 'block',
  cutting: 'bigger',
  kit: [],
  after: ['hot_wash', 'crack_test'],
  features: cylinders,
  positions: POSITIONS,
  fields: BORE_FIELDS,
  sheet: [
    { title: 'Cylinders as found', show: ['standard', 'found'] },
    { title: 'The cut', show: ['oversize', 'stock', 'boreLimit', 'allowance'] },
  ],
  work: (known, setting) => {
    const finish = plus(
      'Finished size, pistons not measured',
      known.length('standard'),
      known.length('oversize'),
    );
    const bored = boredSize(known, finish);
    return {
      column: [
        known.length('standard'),
        known.length('oversize'),
        'rule',
        finish,
        taken(known.length('stock')),
        'rule',
        bored,
      ],
      sizes: boredSizes(known, setting, bored),
      windows: [],
      cleanUp: cleanUp(known),
      checks: [
        { tone: 'note', words: 'Pistons not measured: this is the nominal size.' },
        ...reachChecks(known, setting.print, bored),
      ],
    };
  },
  cautions: CAUTIONS,
  method:
    'Measure each cylinder top, middle and bottom, across the crank and along it. The bar’s size is the finished size less the stock for the hone. ' +
    'A size cleans up with the wear even when it is at least the largest found + stock, and with all the wear on one side when it is at least ' +
    'standard + 2 × wear + stock, judged at the size actually bored.',
});

/** Hone cylinders to the pistons in hand. */
export const HONE = operation({
  key: 'hone',
  title: 'Hone cylinders',
  part: 'block',
  cutting: 'bigger',
  kit: ['pistons', 'torque plate gasket'],
  after: ['bore'],
  features: cylinders,
  positions: POSITIONS,
  fields: HONE_FIELDS,
  sheet: [
    { title: 'Pistons', show: ['pistons', 'plate', 'fit'] },
    { title: 'Clearance', show: ['least', 'most', 'honeLimit'] },
  ],
  work: (known, setting) => {
    const honed = honedSizes(known, setting);
    return { column: honed.column, sizes: honed.sizes, windows: [], cleanUp: [], checks: honed.checks };
  },
  cautions: CAUTIONS,
  method:
    'Measure every piston at its maker’s gauge point, square to the pin. One common size is the LARGEST piston + the least clearance; or each hole is honed ' +
    'to its own piston and both are marked. Hone through the torque plate with the part cool.',
});

/** Bore and hone: both sizes, both repeated back. */
export const BORE_AND_HONE = operation({
  key: 'bore_hone',
  title: 'Bore and hone cylinders',
  part: 'block',
  cutting: 'bigger',
  kit: ['pistons', 'torque plate gasket'],
  after: ['hot_wash', 'crack_test'],
  features: cylinders,
  positions: POSITIONS,
  fields: { ...BORE_FIELDS, ...HONE_FIELDS },
  sheet: [
    { title: 'Cylinders as found', show: ['standard', 'found'] },
    { title: 'Pistons', show: ['pistons', 'plate', 'fit', 'least', 'most'] },
    { title: 'The cut', show: ['oversize', 'stock', 'boreLimit', 'honeLimit', 'allowance'] },
  ],
  work: (known, setting) => {
    const honed = honedSizes(known, setting);
    const bored = less('Bore to', honed.smallestTarget, known.length('stock'));
    const left = stockLeft(known, honed.sizes, bored);
    return {
      column: [...honed.column, taken(known.length('stock')), 'rule', bored],
      sizes: [...boredSizes(known, setting, bored), ...honed.sizes],
      windows: [],
      cleanUp: cleanUp(known),
      checks: [...honed.checks, left.check(setting.print), ...reachChecks(known, setting.print, bored)],
    };
  },
  cautions: CAUTIONS,
  method:
    'As boring and as honing. The bar’s size is worked from the size to be honed, less the stock; both are repeated back.',
});

function boredSize(known: BoreKnown, finish: Figure): Figure {
  return less('Bore to', finish, known.length('stock'));
}

function boredSizes(known: BoreKnown, { made }: Setting, bored: Figure): Size[] {
  const limit = known.length('boreLimit').value;
  return cylinders(made).map((feature) => ({
    feature,
    what: 'Bored',
    target: bored,
    lower: subtract(bored.value, limit),
    upper: add(bored.value, limit),
    cutting: 'bigger',
  }));
}

function honedSizes(known: HoneKnown, { made, print }: Setting) {
  const pistons = known.each('pistons');
  const least = known.length('least');
  const limit = known.length('honeLimit').value;
  const each = known.words('fit') === 'each';
  const biggest = largest('Largest piston', pistons);
  const common = plus('Hone to', biggest, least);
  const targets = pistons.map((piston) => (each ? plus(`Hone to, ${piston.label}`, piston, least) : common));
  const sizes = cylinders(made).map((feature, index): Size => {
    const target = targets[index] ?? common;
    const what = each ? `Honed, cylinder ${feature}` : 'Honed';
    return { feature, what, target, lower: target.value, upper: add(target.value, limit), cutting: 'bigger' };
  });
  const high = largestOf(
    sizes.map((size, index) => subtract(size.upper, pistons[index]?.value ?? biggest.value)),
  );
  const checks: Check[] = [
    { tone: 'fine', words: `This leaves ${print(least.value)} to ${print(high)} over all pistons.` },
    ...mostChecks(known, print, { high, each }),
  ];
  if (known.words('plate') === 'off') {
    checks.push({
      tone: 'note',
      words: 'Without a plate the holes change shape when the head is bolted on.',
    });
  }
  const column: (Figure | 'rule')[] = each ? targets : [biggest, least, 'rule', common];
  return { column, sizes, checks, smallestTarget: smallest('Smallest size to be honed', targets) };
}

function mostChecks(
  known: HoneKnown,
  print: Print,
  { high, each }: { high: Length; each: boolean },
): Check[] {
  const most = known.maybe('most');
  if (!most || high <= most.value) return [];
  const offer = each ? '' : ' Each hole honed to its own piston keeps it.';
  return [{ tone: 'warn', words: `${print(high)} is past the ${print(most.value)} wanted at most.${offer}` }];
}

function stockLeft(known: BoreKnown & HoneKnown, honed: readonly Size[], bored: Figure) {
  const limit = known.length('boreLimit').value;
  const least = subtract(smallestOf(honed.map((size) => size.lower)), add(bored.value, limit));
  const most = subtract(largestOf(honed.map((size) => size.lower)), subtract(bored.value, limit));
  return {
    least,
    most,
    check: (print: Print): Check => ({
      tone: 'note',
      words: `Left for the hone: ${print(least)} to ${print(most)}.`,
    }),
  };
}

const STEPS = ['.010', '.020', '.030', '.040'].map(lengthOf);

/** Common practice: a hole cleans up even at largest found + stock, one-sided at standard + 2 × wear + stock. */
function cleanUp(known: BoreKnown): CleanUp[] {
  const found = known.each('found');
  if (found.length === 0) return [];
  const standard = known.length('standard').value;
  const stock = known.length('allowance').value;
  const worst = largestOf(found.map((place) => place.value));
  const even = add(worst, stock);
  const oneSided = add(add(standard, times(subtract(worst, standard), 2)), stock);
  const chosen = known.length('oversize').value;
  return [...new Set([...STEPS, chosen])]
    .toSorted((a, b) => a - b)
    .map((step) => {
      const cutTo = subtract(add(standard, step), known.length('stock').value);
      return { step, cutTo, even: cutTo >= even, oneSided: cutTo >= oneSided, chosen: step === chosen };
    });
}

function reachChecks(known: BoreKnown, print: Print, bored: Figure): Check[] {
  const found = known.each('found');
  if (found.length === 0) return [];
  const worst = largest('Largest found', found);
  const upper = add(bored.value, known.length('boreLimit').value);
  if (worst.value <= upper) return [];
  return [
    {
      tone: 'refuse',
      words: `${worst.label} is ${print(worst.value)}: already past the size to be bored by ${print(subtract(worst.value, upper))}.`,
    },
  ];
}
