import { type Length, type LengthUnit, subtract } from '@/lib/domain/quantity/length';
import type { PartnerFigures } from '@/lib/domain/sizes/partner-figures';
import { printLength, printNear } from '@/lib/domain/quantity/print-length';

interface SizeRow {
  readonly feature: string;
  readonly what: string;
  readonly target: Length;
  readonly lower: Length;
  readonly upper: Length;
  /** The figures released in the partner's unit. */
  readonly partner?: PartnerFigures | null;
}

interface SizesTableProps {
  sizes: readonly SizeRow[];
  unit: LengthUnit;
  /** The other shop's unit: its released figures stand below, exactly as they are to be keyed back. */
  otherUnit?: LengthUnit | undefined;
}

/** Sizes of a rev, equal ones on one line, with limits and both ends. */
export function SizesTable({ sizes, unit, otherUnit }: SizesTableProps) {
  return (
    <table className="w-full text-[15px]">
      <thead>
        <tr className="border-b border-rule text-left text-[13px] text-ink-3">
          <th className="py-1.5 font-medium">What</th>
          <th className="py-1.5 text-right font-medium">Size</th>
          <th className="py-1.5 text-right font-medium">Limits</th>
          <th className="py-1.5 text-right font-medium">No smaller than</th>
          <th className="py-1.5 text-right font-medium">No bigger than</th>
        </tr>
      </thead>
      <tbody>
        {groupSizes(sizes).map((group) => (
          <tr key={group.key} className="border-b border-rule-2 align-baseline">
            <th scope="row" className="py-2 text-left font-normal">
              {group.what} <span className="note">{group.features}</span>
            </th>
            <td className="num text-right text-[20px] font-semibold">
              {printNear(group.target, unit)}
              <Released unit={otherUnit} value={group.partner?.target} />
            </td>
            <td className="num text-right">
              {printNear(subtract(group.upper, group.target), unit, { signed: true })}
              <br />
              {printNear(subtract(group.lower, group.target), unit, { signed: true }).replace(
                '+.0000',
                '−.0000',
              )}
            </td>
            <td className="num text-right">
              {printNear(group.lower, unit)}
              <Released unit={otherUnit} value={group.partner?.lower} />
            </td>
            <td className="num text-right">
              {printNear(group.upper, unit)}
              <Released unit={otherUnit} value={group.partner?.upper} />
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function Released({ unit, value }: { unit: LengthUnit | undefined; value: Length | undefined }) {
  if (unit === undefined || value === undefined) return null;
  return (
    <span className="note block font-normal">
      {printLength(value, unit)} {unit}
    </span>
  );
}

interface Group extends Omit<SizeRow, 'feature'> {
  readonly key: string;
  readonly features: string;
}

/** Equal sizes of one name, with the features they stand for: 1 to 6, or 1, 3, 5. */
export function groupSizes(sizes: readonly SizeRow[]): Group[] {
  const groups = new Map<string, SizeRow[]>();
  for (const size of sizes) {
    const key = `${size.what}|${size.lower}|${size.upper}|${size.target}`;
    groups.set(key, [...(groups.get(key) ?? []), size]);
  }
  return [...groups.entries()].flatMap(([key, members]) => {
    const [first] = members;
    if (!first) return [];
    const { what, target, lower, upper } = first;
    return [
      { key, what, target, lower, upper, features: sayFeatures(members.map(({ feature }) => feature)) },
    ];
  });
}

function sayFeatures(features: readonly string[]): string {
  const [first = ''] = features;
  const last = features.at(-1) ?? '';
  const numbers = features.map((feature) => Number(feature.replace(/^M/, '')));
  const runs =
    features.length > 2 &&
    numbers.every((number, index) => index === 0 || number === (numbers[index - 1] ?? 0) + 1);
  return runs ? `${first} to ${last}` : features.join(', ');
}
