import type { Made } from '@/lib/domain/builds/made';
import { CATALOGUE_VERSION, operationByKey } from '@/lib/domain/operations/catalogue';
import { fill, type Filled, type Raw } from '@/lib/domain/operations/fill';
import { type House, withHouse } from '@/lib/domain/operations/house';
import type { Figure, Worked } from '@/lib/domain/operations/operation';
import type { ReleasedLine } from '@/lib/domain/orders/commands';
import type { Length, LengthUnit } from '@/lib/domain/quantity/length';
import { printNear } from '@/lib/domain/quantity/print-length';

/** A worksheet read and, where it can be, worked out. */
export interface WorkedSheet {
  readonly filled: Filled;
  readonly worked: Worked | null;
}

/** What a sheet is worked out from, besides what was typed on it. */
export interface SheetFrom {
  readonly made: Made;
  readonly unit: LengthUnit;
  /** The defaults of the shop whose order it is. */
  readonly house?: House | undefined;
}

/** Reads a worksheet and works it out; the same on the screen, in a release and for scripts. */
export function workSheet(operationKey: string, raw: Raw, from: SheetFrom): WorkedSheet {
  const operation = withHouse(operationByKey(operationKey), from.house);
  const filled = fill(operation, raw, from.made, from.unit);
  const print = (value: Length) => printNear(value, from.unit);
  const worked =
    filled.known && operation.work ? operation.work(filled.known, { made: from.made, print }) : null;
  return { filled, worked };
}

/** What a rev keeps of a worked sheet; null while the sheet is not finished. */
export function releasedLine(
  lineId: string,
  sheet: { readonly operation: string; readonly raw: Raw },
  from: SheetFrom,
): ReleasedLine | null {
  const { worked } = workSheet(sheet.operation, sheet.raw, from);
  if (!worked) return null;
  const source = sheet.raw['source'] ?? 'measured';
  const printed = (figure: Figure | 'rule') =>
    figure === 'rule'
      ? { rule: true }
      : { label: figure.label, nm: figure.value, text: printNear(figure.value, from.unit) };
  return {
    lineId,
    source: source === 'book' || source === 'partner_proposes' ? source : 'measured',
    catalogueVersion: CATALOGUE_VERSION,
    inputs: sheet.raw,
    steps: worked.column.map(printed),
    checks: [
      ...worked.checks,
      ...worked.windows.map((window) => ({
        tone: 'note',
        words: `${window.label}: ${printNear(window.lower, from.unit)} to ${printNear(window.upper, from.unit)}.`,
      })),
    ],
    typedReason: sheet.raw['typedReason'] ?? '',
    refused: worked.checks.some((check) => check.tone === 'refuse'),
    sizes: worked.sizes.map(({ feature, what, target, lower, upper, cutting }) => ({
      ...{ feature, what, cutting, lower, upper, target: target.value },
      derived: worked.column.findLast((row) => row !== 'rule')?.value ?? null,
    })),
  };
}
