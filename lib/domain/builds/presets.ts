import type { Made, Throw } from '@/lib/domain/builds/made';

/** Throw angles of inline engines, from the numbered end. */
const INLINE_ANGLES: Readonly<Record<number, readonly number[]>> = {
  1: [0],
  2: [0, 180],
  3: [0, 120, 240],
  4: [0, 180, 180, 0],
  5: [0, 144, 216, 288, 72],
  6: [0, 120, 240, 240, 120, 0],
  8: [0, 180, 90, 270, 270, 90, 180, 0],
};

function inline(cylinders: number): Made {
  const numbers = Array.from({ length: cylinders }, (_one, index) => index + 1);
  const angles = INLINE_ANGLES[cylinders] ?? [];
  return {
    layout: cylinders === 1 ? 'single' : 'inline',
    bankAngle: 0,
    numberedFrom: 'front',
    cylinders,
    banks: [numbers],
    mains: cylinders + 1,
    throws: angles.map((angle, index) => ({ angle, rods: [index + 1] })),
  };
}

interface Vee {
  readonly cylinders: number;
  readonly bankAngle: number;
  readonly angles: readonly number[];
  readonly numbering: 'across' | 'by_bank';
}

/** A vee with two rods a pin. Across: pin 1 carries 1 and 2. By bank: pin 1 carries 1 and the first of the other bank. */
function vee({ cylinders, bankAngle, angles, numbering }: Vee): Made {
  const half = cylinders / 2;
  const pins = Array.from({ length: half }, (_pin, index) => index);
  const rodsOf = (pin: number) =>
    numbering === 'across' ? [2 * pin + 1, 2 * pin + 2] : [pin + 1, pin + 1 + half];
  const throws: Throw[] = pins.map((pin) => ({ angle: angles[pin] ?? 0, rods: rodsOf(pin) }));
  return {
    layout: bankAngle === 180 ? 'flat' : 'vee',
    bankAngle,
    numberedFrom: 'front',
    cylinders,
    banks: [0, 1].map((bank) => pins.map((pin) => rodsOf(pin)[bank] ?? 0)),
    mains: half + 1,
    throws,
  };
}

const CROSS = [0, 90, 270, 180];
const FLAT_PLANE = [0, 180, 180, 0];
const SIX = [0, 120, 240];
const TWELVE = [0, 120, 240, 240, 120, 0];

/** Common configurations to start a build from; each can be changed afterwards. */
export const PRESETS: readonly { readonly key: string; readonly label: string; readonly made: Made }[] = [
  { key: 'single', label: 'Single', made: inline(1) },
  ...[2, 3, 4, 5, 6, 8].map((n) => ({ key: `inline${n}`, label: `Inline ${n}`, made: inline(n) })),
  {
    key: 'v6',
    label: 'V6, numbered across',
    made: vee({ cylinders: 6, bankAngle: 90, angles: SIX, numbering: 'across' }),
  },
  {
    key: 'v8',
    label: 'V8 cross-plane, numbered across',
    made: vee({ cylinders: 8, bankAngle: 90, angles: CROSS, numbering: 'across' }),
  },
  {
    key: 'v8bank',
    label: 'V8 cross-plane, numbered by bank',
    made: vee({ cylinders: 8, bankAngle: 90, angles: CROSS, numbering: 'by_bank' }),
  },
  {
    key: 'v8flat',
    label: 'V8 flat-plane, numbered by bank',
    made: vee({ cylinders: 8, bankAngle: 90, angles: FLAT_PLANE, numbering: 'by_bank' }),
  },
  {
    key: 'v12',
    label: 'V12, numbered by bank',
    made: vee({ cylinders: 12, bankAngle: 60, angles: TWELVE, numbering: 'by_bank' }),
  },
  { key: 'flat4', label: 'Flat 4', made: flat([0, 180, 180, 0]) },
  { key: 'flat6', label: 'Flat 6', made: flat([0, 180, 120, 300, 240, 60]) },
];

/** A flat engine: one rod a pin, odd numbers on one bank, even on the other. */
function flat(angles: readonly number[]): Made {
  const numbers = angles.map((_angle, index) => index + 1);
  return {
    layout: 'flat',
    bankAngle: 180,
    numberedFrom: 'front',
    cylinders: angles.length,
    banks: [numbers.filter((n) => n % 2 === 1), numbers.filter((n) => n % 2 === 0)],
    mains: angles.length / 2 + 1,
    throws: angles.map((angle, index) => ({ angle, rods: [index + 1] })),
  };
}

/** Finds a preset by its key. */
export function findPreset(key: string): Made | undefined {
  return PRESETS.find((preset) => preset.key === key)?.made;
}

/** The configuration in words: `V8, 90°, 4 throws, 5 mains`. */
export function describeMade(made: Made): string {
  const shape = {
    single: 'Single',
    inline: `Inline ${made.cylinders}`,
    vee: `V${made.cylinders}, ${made.bankAngle}°`,
    flat: `Flat ${made.cylinders}`,
  };
  return `${shape[made.layout]}, ${made.throws.length} throws, ${made.mains} mains`;
}
