import type { SizeFact } from '@/lib/domain/orders/facts';
import { type Length, type LengthUnit, magnitude, nanometres, subtract } from '@/lib/domain/quantity/length';
import { parseLength } from '@/lib/domain/quantity/parse-length';
import { printNear } from '@/lib/domain/quantity/print-length';

/** Sizes that stand in a message: figures with at least three places, as the trade writes them. */
export function findSizes(text: string, unit: LengthUnit): Length[] {
  const written = text.match(/\d*[.,]\d{3,5}(?:\s*mm|\s*in|")?/g) ?? [];
  return written.flatMap((one) => {
    const parsed = parseLength(one, unit);
    return parsed.ok ? [parsed.value] : [];
  });
}

/**
 * A quiet note for a message that names a size close to one of the current rev's and not equal to its limits or
 * target. Undefined where nothing is to be said: a message never changes the sizes.
 */
export function quietNote(
  text: string,
  sizes: readonly SizeFact[],
  rev: number | null,
  unit: LengthUnit,
): string | undefined {
  if (rev === null) return undefined;
  for (const said of findSizes(text, unit)) {
    const near = sizes.filter((size) => magnitude(subtract(said, size.target)) < nanometres(254_000));
    if (near.length === 0) continue;
    const equal = near.some((size) => [size.lower, size.upper, size.target].includes(said));
    const [first] = near;
    if (!equal && first) {
      return `This says ${printNear(said, unit)}. Rev ${rev} says ${first.what.toLowerCase()} ${printNear(first.lower, unit)} to ${printNear(first.upper, unit)}.`;
    }
  }
  return undefined;
}
