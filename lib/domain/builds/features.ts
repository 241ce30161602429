import type { Made } from '@/lib/domain/builds/made';

/** Rod journals: one a throw, named 1, 2, 3 from the numbered end. */
export function rodJournals(made: Made): readonly string[] {
  return made.throws.map((_pin, index) => String(index + 1));
}

/** Rods by cylinder number, in order. */
export function rods(made: Made): readonly string[] {
  return made.throws
    .flatMap((pin) => pin.rods)
    .toSorted((a, b) => a - b)
    .map(String);
}

/** Main journals M1, M2 … from the numbered end. */
export function mains(made: Made): readonly string[] {
  return Array.from({ length: made.mains }, (_main, index) => `M${index + 1}`);
}

/** Cylinders by number, in order. */
export function cylinders(made: Made): readonly string[] {
  return made.banks
    .flat()
    .toSorted((a, b) => a - b)
    .map(String);
}

/** Which rods run on a rod journal. */
export function rodsOnJournal(made: Made, journal: string): readonly string[] {
  return (made.throws[Number(journal) - 1]?.rods ?? []).map(String);
}
