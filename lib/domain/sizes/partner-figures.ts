import { type Length, type LengthUnit, nanometres, roundTo } from '@/lib/domain/quantity/length';

/** Limits and target fixed in the partner's unit. */
export interface PartnerFigures {
  readonly target: Length;
  readonly lower: Length;
  readonly upper: Length;
}

/** The last step that each unit's machinists work to: .001 mm, .0001 in. */
const STEPS = { mm: nanometres(1000), in: nanometres(2540) } as const;

/**
 * The partner's figures of a size: limits rounded inward to the unit's step, the target to the nearest step inside
 * them. Null when no step lies between the limits.
 */
export function partnerFigures(
  size: { readonly target: Length; readonly lower: Length; readonly upper: Length },
  unit: LengthUnit,
): PartnerFigures | null {
  const step = STEPS[unit];
  const lower = roundTo(size.lower, step, 'up');
  const upper = roundTo(size.upper, step, 'down');
  if (lower > upper) return null;
  const nearest = roundTo(size.target, step, 'half_away');
  return { lower, upper, target: nanometres(Math.min(upper, Math.max(lower, nearest))) };
}
