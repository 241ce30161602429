import type { Made } from '@/lib/domain/builds/made';
import type { FeatureState } from '@/components/parts-map/crank-map';

const LOOKS = {
  none: ['fill-paper', 'stroke-blue'],
  in_size: ['fill-insize-wash', 'stroke-insize'],
  to_cut: ['fill-tocut-wash', 'stroke-tocut'],
  past: ['fill-past-wash', 'stroke-past'],
} as const;

/** The block from above: its banks with the cylinders numbered as the trade numbers them. */
export function BlockMap({
  made,
  states = {},
}: {
  made: Made;
  states?: Readonly<Record<string, FeatureState>>;
}) {
  const longest = Math.max(...made.banks.map((bank) => bank.length));
  const width = 40 + longest * 130;
  const height = made.banks.length * 124 + 26;
  return (
    <svg
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label={`Block from above, ${made.cylinders} cylinders`}
      className="my-3 block max-h-72 w-full"
    >
      <rect x="6" y="8" width={width - 12} height={height - 34} className="fill-granite stroke-ink-2" />
      {made.banks.map((bank, row) =>
        bank.map((cylinder, index) => {
          const [fill, line] = LOOKS[states[String(cylinder)] ?? 'none'];
          const [cx, cy] = [80 + index * 130 + (row === 1 ? 18 : 0), 70 + row * 124];
          return (
            <g key={cylinder}>
              <circle cx={cx} cy={cy} r="46" strokeWidth="2" className={`${fill} ${line}`} />
              <text
                x={cx}
                y={cy + 7}
                textAnchor="middle"
                fontSize="20"
                fontWeight="700"
                className="num fill-blue"
              >
                {cylinder}
              </text>
            </g>
          );
        }),
      )}
      <text x="10" y={height - 6} fontSize="13" className="fill-ink-3">
        {made.numberedFrom === 'front' ? 'Front' : 'Flywheel end'}
      </text>
    </svg>
  );
}
