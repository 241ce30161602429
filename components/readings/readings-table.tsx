import { Scroll } from '@/components/ui/scroll';
import { Ribbon, sayJudgement } from '@/components/readings/ribbon';
import type { SizeFact } from '@/lib/domain/orders/facts';
import { judge, outOfRound, type PlacedReading, taper } from '@/lib/domain/readings/judge';
import { largest, type LengthUnit, smallest } from '@/lib/domain/quantity/length';
import { printNear } from '@/lib/domain/quantity/print-length';
import { printTemperature } from '@/lib/domain/quantity/temperature';

interface Reading extends PlacedReading {
  readonly side: 'sender' | 'partner';
  readonly feature: string;
  readonly marks: readonly string[];
  readonly instrument: string;
  readonly partMc: number | null;
}

interface ReadingsTableProps {
  sizes: readonly SizeFact[];
  readings: readonly Reading[];
  unit: LengthUnit;
}

const MARKS = {
  unread: ['', 'text-ink-3'],
  in_size: ['● ', 'text-insize'],
  to_cut: ['▲ ', 'text-tocut'],
  past: ['■ ', 'text-past'],
} as const;

/** Where every feature sits against its limits, both shops' readings on the same ribbon. */
export function ReadingsTable({ sizes, readings, unit }: ReadingsTableProps) {
  const cutting = sizes[0]?.cutting ?? 'smaller';
  const isBore = cutting === 'bigger';
  return (
    <Scroll label="Readings">
      <table className="w-full min-w-[36rem] text-[15px]">
        <thead>
          <tr className="border-b border-rule text-left text-[13px] text-ink-3">
            <th className="py-1 font-medium">{isBore ? 'Cylinder' : 'Journal'}</th>
            <th className="w-[44%] py-1 font-medium">Where it sits against the limits</th>
            <th className="py-1 text-right font-medium">{isBore ? 'Smallest' : 'Biggest'}</th>
            <th className="px-2 py-1 text-right font-medium">Taper</th>
            <th className="px-2 py-1 text-right font-medium">Out of round</th>
            <th className="py-1 font-medium">Is</th>
          </tr>
        </thead>
        <tbody>
          {sizes.map((size) => {
            const own = readings.filter((reading) => reading.feature === size.feature);
            const partner = own.filter(({ side }) => side === 'partner');
            const sender = own.filter(({ side }) => side === 'sender');
            const deciding = partner.length > 0 ? partner : sender;
            const values = deciding.map((reading) => reading.size);
            const state = judge(values, size);
            const [mark, tone] = MARKS[state.state];
            const form = [taper(deciding), outOfRound(deciding)];
            return (
              <tr key={`${size.feature}${size.what}`} className="border-b border-rule-2">
                <th scope="row" className="num py-1 text-left font-normal">
                  {size.feature}
                </th>
                <td>
                  <Ribbon
                    {...size}
                    partner={partner.map((reading) => reading.size)}
                    sender={sender.map((reading) => reading.size)}
                    unit={unit}
                    label={`${size.what} ${size.feature}`}
                  />
                </td>
                <td className="num text-right">
                  {values.length === 0 ? '–' : printNear(isBore ? smallest(values) : largest(values), unit)}
                </td>
                {form.map((value, index) => (
                  <td key={index} className="num px-2 text-right">
                    {value === null ? '–' : printNear(value, unit)}
                  </td>
                ))}
                <td className={`py-1 text-[13.5px] font-semibold whitespace-nowrap ${tone}`}>
                  {mark}
                  {sayJudgement(state, unit)}
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
      {notesOf(readings).map((words) => (
        <p key={words} className="note mt-1">
          {words}
        </p>
      ))}
      <p className="note mt-2 flex justify-between gap-3">
        <span>◀ smaller: {isBore ? 'still to cut' : 'past size'}</span>
        <span>● machine shop ◆ rebuilder</span>
        <span>bigger: {isBore ? 'past size' : 'still to cut'} ▶</span>
      </p>
    </Scroll>
  );
}

/** What else was said with the readings: instruments, temperatures, a gauge that had moved. */
function notesOf(readings: readonly Reading[]): string[] {
  const said = (['partner', 'sender'] as const).flatMap((side) => {
    const own = readings.filter((reading) => reading.side === side);
    const words = [
      ...new Set(own.map(({ instrument }) => instrument)),
      ...new Set(own.map(({ partMc }) => (partMc === null ? '' : `part at ${printTemperature(partMc)}`))),
      ...new Set(own.flatMap(({ marks }) => marks)),
    ].filter((word) => word !== '');
    return words.length === 0 ? [] : [`${side === 'partner' ? '●' : '◆'} ${words.join(' · ')}`];
  });
  return said;
}
