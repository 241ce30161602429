import { COMMON, type Field, type Fields, type Known } from '@/lib/domain/operations/operation';

/** What grinding rods and mains both ask. */
export const SHARED_FIELDS = {
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

/** One bore a rod or main. */
export const BORES = {
  quantity: 'length',
  label: 'Bearing bores',
  per: 'feature',
  condition: 'these shells in, caps torqued; the smaller of front and rear, in line with the beam',
  optional: true,
  plausible: ['.4', '6'],
  spread: '.004',
} as const satisfies Field;

/** One journal each, as found. */
export const FOUND = {
  quantity: 'length',
  label: 'Journals as found',
  per: 'feature',
  condition: 'smallest of each journal',
  optional: true,
  plausible: ['.4', '6'],
  spread: '.015',
} as const satisfies Field;

/** What a grinding sum may read. */
export type GrindKnown = Known<typeof SHARED_FIELDS & { bores: Field; found: Field }>;
