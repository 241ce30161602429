import { COMMON, type Fields, type Known } from '@/lib/domain/operations/operation';

/** What boring asks. */
export const BORE_FIELDS = {
  standard: { quantity: 'length', label: 'Standard bore', per: 'line', plausible: ['1', '10'] },
  oversize: { quantity: 'length', label: 'Oversize', per: 'line', plausible: ['.0', '.13'] },
  found: {
    quantity: 'length',
    label: 'Cylinders as found',
    per: 'position',
    rows: 'cylinders',
    condition: 'across the crank and along it; top under the ridge, middle, bottom',
    optional: true,
    plausible: ['1', '10'],
    spread: '.010',
  },
  stock: {
    quantity: 'length',
    label: 'Leave for the hone',
    per: 'line',
    plausible: ['.001', '.012'],
    fallback: { value: '.003', source: COMMON },
  },
  boreLimit: {
    quantity: 'length',
    label: 'Bored, plus and minus',
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
} as const satisfies Fields;

/** What honing asks. */
export const HONE_FIELDS = {
  pistons: {
    quantity: 'length',
    label: 'Pistons',
    per: 'feature',
    rows: 'cylinders',
    condition: 'at the maker’s gauge point, square to the pin, part cool',
    plausible: ['1', '10'],
    spread: '.003',
  },
  plate: {
    quantity: 'choice',
    label: 'Torque plate',
    per: 'line',
    choices: [
      { value: 'on', label: 'Plate on, gasket and bolts as run' },
      { value: 'off', label: 'Without a plate' },
    ],
    fallback: { value: 'on', source: 'house default' },
  },
  fit: {
    quantity: 'choice',
    label: 'Fit',
    per: 'line',
    choices: [
      { value: 'one', label: 'One size for all, from the largest piston' },
      { value: 'each', label: 'Each hole to its own piston' },
    ],
    fallback: { value: 'one', source: 'house default' },
  },
  least: {
    quantity: 'length',
    label: 'Piston clearance, at least',
    per: 'line',
    plausible: ['.0003', '.012'],
  },
  most: {
    quantity: 'length',
    label: 'Piston clearance, at most',
    per: 'line',
    optional: true,
    plausible: ['.0005', '.02'],
  },
  honeLimit: {
    quantity: 'length',
    label: 'Limit above the size',
    per: 'line',
    plausible: ['.0001', '.002'],
    fallback: { value: '.0005', source: COMMON },
  },
} as const satisfies Fields;

export type BoreKnown = Known<typeof BORE_FIELDS>;
export type HoneKnown = Known<typeof HONE_FIELDS>;
