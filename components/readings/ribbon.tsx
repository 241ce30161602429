import type { Cutting } from '@/lib/domain/operations/operation';
import { judge, type Judgement } from '@/lib/domain/readings/judge';
import { largest, type Length, type LengthUnit, nanometres, smallest } from '@/lib/domain/quantity/length';
import { printNear } from '@/lib/domain/quantity/print-length';

interface RibbonProps {
  cutting: Cutting;
  lower: Length;
  upper: Length;
  partner: readonly Length[];
  sender: readonly Length[];
  unit: LengthUnit;
  label: string;
}

const WIDTH = 300;
const STATE = {
  unread: { line: 'stroke-ink-3', fill: 'fill-ink-3' },
  in_size: { line: 'stroke-insize', fill: 'fill-insize' },
  to_cut: { line: 'stroke-tocut', fill: 'fill-tocut' },
  past: { line: 'stroke-past', fill: 'fill-past' },
} as const;

/** One line a feature: limit band, ticks, a bar from the smallest to the largest reading; ● the partner, ◆ the sender. Left is always smaller. */
export function Ribbon({ cutting, lower, upper, partner, sender, unit, label }: RibbonProps) {
  const tick = unit === 'in' ? 2540 : 2000;
  const band = Math.max(upper - lower, tick);
  const [from, to] = [lower - 1.4 * band, upper + 1.4 * band];
  const at = (size: number) => Math.min(WIDTH - 8, Math.max(8, ((size - from) / (to - from)) * WIDTH));
  const state = judge(partner.length > 0 ? partner : sender, { cutting, lower, upper });
  const look = STATE[state.state];
  const deciding = cutting === 'bigger' ? smallest : largest;
  const count = Math.min(60, Math.floor((to - from) / tick));
  const first = Math.ceil(from / tick) * tick;
  return (
    <svg
      viewBox={`0 0 ${WIDTH} 26`}
      className="h-[26px] w-full max-w-[320px]"
      role="img"
      aria-label={`${label}: ${sayJudgement(state, unit)}`}
    >
      <rect
        x={at(lower)}
        y="5"
        width={Math.max(2, at(upper) - at(lower))}
        height="16"
        className="fill-insize-wash stroke-insize"
      />
      <path d={`M8 13H${WIDTH - 8}`} className="stroke-rule" />
      {Array.from({ length: count }, (_tick, index) => first + index * tick).map((size) => (
        <path key={size} d={`M${at(size)} 10v6`} className="stroke-ink-3" strokeWidth="0.8" />
      ))}
      {partner.length > 0 && (
        <>
          <path
            d={`M${at(smallest(partner))} 13H${at(largest(partner))}`}
            className={look.line}
            strokeWidth="5"
          />
          <circle cx={at(deciding(partner))} cy="13" r="6" className={look.fill} />
        </>
      )}
      {sender.length > 0 && (
        <path
          d={`M${at(deciding(sender))} 7l6 6-6 6-6-6z`}
          className="fill-none stroke-ink"
          strokeWidth="1.8"
        />
      )}
    </svg>
  );
}

/** A judgement in words, with how much. */
export function sayJudgement(judgement: Judgement, unit: LengthUnit): string {
  switch (judgement.state) {
    case 'unread':
      return 'not read yet';
    case 'in_size':
      return 'in size';
    case 'to_cut':
      return `still to cut ${printNear(nanometres(judgement.by), unit)}`;
    case 'past':
      return `past size by ${printNear(nanometres(judgement.by), unit)}`;
  }
}
