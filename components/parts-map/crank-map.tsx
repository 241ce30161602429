import type { Made } from '@/lib/domain/builds/made';

/** State of a feature, carried by shape, colour and word. */
export type FeatureState = 'none' | 'in_size' | 'to_cut' | 'past';

const LOOKS = {
  none: { fill: 'fill-blue-wash', line: 'stroke-blue', mark: '', word: '' },
  in_size: { fill: 'fill-insize-wash', line: 'stroke-insize', mark: '●', word: 'in size' },
  to_cut: { fill: 'fill-tocut-wash', line: 'stroke-tocut', mark: '▲', word: 'still to cut' },
  past: { fill: 'fill-past-wash', line: 'stroke-past', mark: '■', word: 'past size' },
} as const;

interface CrankMapProps {
  made: Made;
  states?: Readonly<Record<string, FeatureState>>;
  /** Which journals the sheet is about; the others are hatched. */
  about?: 'rods' | 'mains' | 'both';
}

const MAIN = 44;
const WEB = 12;
const PIN = 46;

/** The crankshaft in side view with its real throws, and from its numbered end. */
export function CrankMap({ made, states = {}, about = 'both' }: CrankMapProps) {
  const perBay = made.throws.length / Math.max(1, made.mains - 1);
  const width = 60 + made.mains * MAIN + made.throws.length * (PIN + 2 * WEB) + 130;
  const pieces: React.ReactNode[] = [];
  let x = 30;
  let pin = 0;
  for (let main = 0; main < made.mains; main += 1) {
    pieces.push(
      <Journal
        key={`m${main}`}
        name={`M${main + 1}`}
        x={x}
        y={78}
        width={MAIN}
        state={states[`M${main + 1}`] ?? 'none'}
        isSubject={about !== 'rods'}
      />,
    );
    x += MAIN;
    const until = Math.round((main + 1) * perBay);
    while (pin < until && main < made.mains - 1) {
      const rise = Math.round(-34 * Math.cos(((made.throws[pin]?.angle ?? 0) * Math.PI) / 180));
      const name = String(pin + 1);
      pieces.push(<Web key={`a${name}`} x={x} rise={rise} />);
      pieces.push(
        <Journal
          key={`p${name}`}
          name={name}
          x={x + WEB}
          y={78 + rise}
          width={PIN}
          state={states[name] ?? 'none'}
          isSubject={about !== 'mains'}
        />,
      );
      pieces.push(<Web key={`b${name}`} x={x + WEB + PIN} rise={rise} />);
      x += PIN + 2 * WEB;
      pin += 1;
    }
  }
  return (
    <svg
      viewBox={`0 0 ${width} 190`}
      role="img"
      aria-label={describe(made, states)}
      className="my-4 block w-full"
    >
      <defs>
        <pattern id="hatch" width="6" height="6" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <rect width="6" height="6" className="fill-paper" />
          <path d="M0 0V6" className="stroke-rule" strokeWidth="1.6" />
        </pattern>
      </defs>
      <rect x="4" y="86" width="26" height="22" className="fill-granite stroke-ink-2" />
      {pieces}
      <rect x={x} y="66" width="16" height="62" className="fill-granite stroke-ink-2" />
      <text x="4" y="180" fontSize="13" className="fill-ink-3">
        {made.numberedFrom === 'front' ? 'Front' : 'Flywheel end'}
      </text>
      <EndView made={made} x={x + 76} />
    </svg>
  );
}

function Journal({
  name,
  x,
  y,
  width,
  state,
  isSubject,
}: {
  name: string;
  x: number;
  y: number;
  width: number;
  state: FeatureState;
  isSubject: boolean;
}) {
  const look = LOOKS[state];
  const isMain = name.startsWith('M');
  return (
    <g>
      <rect
        x={x}
        y={y}
        width={width}
        height="38"
        strokeWidth={isSubject ? 2 : 1}
        className={isSubject ? `${look.fill} ${look.line}` : 'stroke-ink-2'}
        fill={isSubject ? undefined : 'url(#hatch)'}
      />
      <text
        x={x + width / 2}
        y={isMain ? 138 : y + 24}
        textAnchor="middle"
        fontSize="13"
        className={`num ${isSubject ? 'fill-ink font-bold' : 'fill-ink-3'}`}
      >
        {name}
      </text>
      {state !== 'none' && (
        <text
          x={x + width / 2}
          y={isMain ? 102 : y - 6}
          textAnchor="middle"
          fontSize="11"
          className="fill-ink"
        >
          {look.mark}
        </text>
      )}
    </g>
  );
}

function Web({ x, rise }: { x: number; rise: number }) {
  return (
    <rect
      x={x}
      y={Math.min(78, 78 + rise) - 12}
      width={WEB}
      height={38 + Math.abs(rise) + 24}
      rx="3"
      className="fill-granite stroke-ink-2"
    />
  );
}

function EndView({ made, x }: { made: Made; x: number }) {
  const angles = [...new Set(made.throws.map(({ angle }) => angle))];
  return (
    <g transform={`translate(${x} 96)`} fontSize="12">
      <circle r="40" className="fill-none stroke-rule" />
      {angles.map((angle) => {
        const turn = (angle * Math.PI) / 180;
        const names = made.throws.flatMap((one, index) => (one.angle === angle ? [index + 1] : [])).join(' ');
        const [dx, dy] = [Math.sin(turn), -Math.cos(turn)].map((part) => Math.round(part * 1000) / 1000);
        return (
          <g key={angle}>
            <path d={`M0 0L${(dx ?? 0) * 32} ${(dy ?? 0) * 32}`} className="stroke-ink-2" strokeWidth="7" />
            <text x={(dx ?? 0) * 54} y={(dy ?? 0) * 54 + 4} textAnchor="middle" className="fill-ink-3">
              {names}
            </text>
          </g>
        );
      })}
      <circle r="9" className="fill-ink-2" />
    </g>
  );
}

function describe(made: Made, states: Readonly<Record<string, FeatureState>>): string {
  const said = Object.entries(states).flatMap(([name, state]) =>
    state === 'none'
      ? []
      : [`${name.startsWith('M') ? `main ${name.slice(1)}` : `rod journal ${name}`} ${LOOKS[state].word}`],
  );
  return `Crankshaft with ${made.throws.length} rod journals and ${made.mains} mains${said.length > 0 ? `: ${said.join(', ')}` : ''}`;
}
