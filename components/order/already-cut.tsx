import { sayJudgement } from '@/components/readings/ribbon';
import { Scroll } from '@/components/ui/scroll';
import type { LengthUnit } from '@/lib/domain/quantity/length';
import { largest, smallest } from '@/lib/domain/quantity/length';
import { printNear } from '@/lib/domain/quantity/print-length';
import type { MadeOfCut } from '@/lib/domain/sizes/already-cut';

const TONES = { unread: '', in_size: 'text-insize', to_cut: 'text-tocut', past: 'text-past' } as const;
const MARKS = { unread: '', in_size: '●', to_cut: '▲', past: '■' } as const;

/** What is cut already, and what the new limits make of it, feature by feature. */
export function AlreadyCut({
  made,
  unit,
  title,
}: {
  made: readonly MadeOfCut[];
  unit: LengthUnit;
  title: string;
}) {
  const runs = made.some((one) => one.runs !== null);
  return (
    <Scroll label={title}>
      <table className="w-full max-w-2xl text-[15px]">
        <caption className="pb-1 text-left font-semibold">{title}</caption>
        <thead>
          <tr className="border-b border-rule text-left text-[13px] text-ink-3">
            <th className="py-1 pr-3 font-medium">Feature</th>
            <th className="py-1 pr-3 font-medium">Is at</th>
            <th className="py-1 pr-3 font-medium">The new sizes make it</th>
            {runs && <th className="py-1 font-medium">It runs with</th>}
          </tr>
        </thead>
        <tbody>
          {made.map((one) => (
            <tr key={`${one.lineId} ${one.feature}`} className="border-b border-rule-2 whitespace-nowrap">
              <th scope="row" className="py-1.5 pr-3 text-left font-normal">
                {one.what} {one.feature}
              </th>
              <td className="num pr-3">{sayRange(one, unit)}</td>
              <td className={`pr-3 font-semibold ${TONES[one.is.state]}`}>
                {MARKS[one.is.state]} {sayJudgement(one.is, unit)}
              </td>
              {runs && <td>{one.runs === null ? '–' : <Runs runs={one.runs} unit={unit} />}</td>}
            </tr>
          ))}
        </tbody>
      </table>
    </Scroll>
  );
}

function Runs({ runs, unit }: { runs: NonNullable<MadeOfCut['runs']>; unit: LengthUnit }) {
  return (
    <>
      <span className="num">{printNear(runs.clearance, unit)}</span>
      {runs.isOver && <b className="font-semibold text-past"> over the most</b>}
    </>
  );
}

function sayRange({ sizes }: MadeOfCut, unit: LengthUnit): string {
  const [low, high] = [smallest(sizes), largest(sizes)];
  return low === high ? printNear(low, unit) : `${printNear(low, unit)} to ${printNear(high, unit)}`;
}
