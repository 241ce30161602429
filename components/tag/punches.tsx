import type { PunchState } from '@/lib/domain/orders/facts';

export interface PunchesValue {
  readonly price: PunchState;
  readonly parts: PunchState;
  readonly sizes: PunchState;
}

const WORDS = { met: 'met', unmet: 'not met', not_needed: 'not needed' } as const;
const NAMES = ['price', 'parts', 'sizes'] as const;

/** One punch: a dark hole is a met condition, a dashed ring an unmet one, a short rule "not needed". */
function Hole({ state, size }: { state: PunchState; size: number }) {
  const middle = size / 2;
  return (
    <svg width={size} height={size} viewBox={`0 0 ${size} ${size}`} aria-hidden className="mx-auto block">
      {state === 'met' && <circle cx={middle} cy={middle} r={middle} className="fill-ink" />}
      {state === 'met' && (
        <path
          d={`M${size * 0.28} ${size * 0.52}l${size * 0.15} ${size * 0.15} ${size * 0.3} -${size * 0.32}`}
          className="fill-none stroke-manila-2"
          strokeWidth={size * 0.075}
        />
      )}
      {state === 'unmet' && (
        <circle
          cx={middle}
          cy={middle}
          r={middle - 1.5}
          className="fill-none stroke-ink-2"
          strokeWidth="2"
          strokeDasharray="4 3"
        />
      )}
      {state === 'not_needed' && (
        <path d={`M${size * 0.1} ${middle}H${size * 0.9}`} className="stroke-ink-3" strokeWidth="2" />
      )}
    </svg>
  );
}

/** The three punches small, as on a stub in a list; a stop covers them. */
export function SmallPunches({ punches, stopped }: { punches: PunchesValue; stopped: boolean }) {
  const words = NAMES.map((name) => `${name} ${WORDS[punches[name]]}`).join(', ');
  return (
    <div>
      <span className="sr-only">{stopped ? `Stopped; ${words}` : words}</span>
      <div aria-hidden className="relative flex w-max gap-2">
        {NAMES.map((name) => (
          <span key={name} className={`hole hole-${punches[name]}`} />
        ))}
        {stopped && (
          <span className="absolute -inset-x-1 inset-y-0 bg-past text-center font-stencil text-[15px] leading-[18px] font-extrabold tracking-widest text-paper">
            STOP
          </span>
        )}
      </div>
      <div aria-hidden className="mt-1 text-[12.5px] text-ink-2">
        price parts sizes
      </div>
    </div>
  );
}

interface LargePunchesProps {
  punches: PunchesValue;
  stopped: boolean;
  says: Readonly<Record<(typeof NAMES)[number], string>>;
}

/** The three punches on the tag, each with its words. */
export function LargePunches({ punches, stopped, says }: LargePunchesProps) {
  return (
    <div className="relative">
      <ul className="flex justify-between gap-1 sm:gap-3">
        {NAMES.map((name) => (
          <li key={name} className="w-24 text-center text-[13px] leading-tight text-manila-ink sm:w-28">
            <Hole state={punches[name]} size={38} />
            <b className="mt-1.5 block text-[14.5px] font-semibold text-ink capitalize">{name}</b>
            {says[name]}
            <span className="sr-only">: {WORDS[punches[name]]}</span>
          </li>
        ))}
      </ul>
      {stopped && (
        <p className="absolute inset-x-0 top-0 bg-past text-center font-stencil text-[30px] leading-[38px] font-extrabold tracking-[0.2em] text-paper">
          STOP
        </p>
      )}
    </div>
  );
}
