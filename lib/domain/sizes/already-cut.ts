import { rodsOnJournal } from '@/lib/domain/builds/features';
import type { Made } from '@/lib/domain/builds/made';
import type { Filled } from '@/lib/domain/operations/fill';
import type { Operation } from '@/lib/domain/operations/operation';
import type { SizeFact } from '@/lib/domain/orders/facts';
import { largest, type Length, smallest, subtract } from '@/lib/domain/quantity/length';
import { judge, type Judgement } from '@/lib/domain/readings/judge';

/** What is known to be cut of one feature: its readings of this round, or what was said at a STOP. */
export interface CutFeature {
  readonly lineId: string;
  readonly feature: string;
  readonly sizes: readonly Length[];
}

/** What new limits make of a feature that is cut already. */
export interface MadeOfCut {
  readonly lineId: string;
  readonly feature: string;
  readonly what: string;
  readonly sizes: readonly Length[];
  readonly is: Judgement;
  /** The clearance that it would run with, where the sheet knows the bore, and whether that is over the most that is wanted. */
  readonly runs: { readonly clearance: Length; readonly isOver: boolean } | null;
}

/** A sheet as it is worked out now. */
export interface SheetAtHand {
  readonly operation: Operation;
  readonly made: Made;
  readonly figures: Filled['figures'];
}

/** A line's limits: about to be released, or as they stand. */
interface LineLimits {
  readonly lineId: string;
  readonly sizes: readonly Pick<SizeFact, 'feature' | 'what' | 'cutting' | 'lower' | 'upper'>[];
}

/** Holds what is already cut against a line's limits; with the sheet at hand also the clearance it would run with. */
export function madeOfCut(
  cut: readonly CutFeature[],
  line: LineLimits,
  sheet?: SheetAtHand,
): readonly MadeOfCut[] {
  return line.sizes.flatMap((size) => {
    const found = cut.find((one) => one.lineId === line.lineId && one.feature === size.feature);
    if (!found || found.sizes.length === 0) return [];
    return [
      {
        ...{ lineId: line.lineId, feature: size.feature, what: size.what, sizes: found.sizes },
        ...{ is: judge(found.sizes, size), runs: sheet ? runsWith(found, sheet) : null },
      },
    ];
  });
}

/** Largest bore on a journal less its smallest reading: the most that it will run with. */
function runsWith(
  { feature, sizes }: CutFeature,
  { operation, made, figures }: SheetAtHand,
): MadeOfCut['runs'] {
  const rows = operation.fields['bores']?.rows === 'rods' ? rodsOnJournal(made, feature) : [feature];
  const bores = rows.flatMap((row) => figures.get(`bores.${row}`)?.value ?? []);
  if (bores.length === 0) return null;
  const clearance = subtract(largest(bores), smallest(sizes));
  const most = figures.get('most');
  return { clearance, isOver: most !== undefined && clearance > most.value };
}

/** What may be decided about features that the new limits leave past size: on the button, and in the rev's reason. */
export const PAST_DECISIONS = {
  as_is: { label: 'Accept them as they are', said: 'accepted as they are' },
  undersize: { label: 'Next undersize for all', said: 'the next undersize for all' },
  shells: { label: 'Other shells for these', said: 'other shells for these' },
} as const;
export type PastDecision = keyof typeof PAST_DECISIONS;
