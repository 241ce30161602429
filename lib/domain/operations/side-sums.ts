import { rodJournals, rodsOnJournal } from '@/lib/domain/builds/features';
import type { Made } from '@/lib/domain/builds/made';
import { less, smallest, worked } from '@/lib/domain/operations/figures';
import type { Figure } from '@/lib/domain/operations/operation';
import { subtract, times } from '@/lib/domain/quantity/length';

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
