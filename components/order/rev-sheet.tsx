import { Scroll } from '@/components/ui/scroll';
import { SizesTable } from '@/components/order/sizes-table';
import { Sum } from '@/components/order/sum';
import { Notice } from '@/components/ui/notice';
import type { Length, LengthUnit } from '@/lib/domain/quantity/length';
import type { PartnerFigures } from '@/lib/domain/sizes/partner-figures';
import { sayMoment } from '@/lib/forms/say';

interface RevSheetProps {
  rev: {
    readonly number: number;
    readonly unit: LengthUnit;
    readonly reason: string;
    readonly author: string;
    readonly releasedAt: string;
    readonly lines: readonly {
      readonly lineId: string;
      readonly title: string;
      readonly since: number;
      readonly steps: readonly { readonly rule?: boolean; readonly label?: string; readonly text?: string }[];
      readonly checks: readonly {
        readonly tone: 'fine' | 'note' | 'warn' | 'refuse';
        readonly words: string;
      }[];
      readonly sizes: readonly {
        readonly feature: string;
        readonly what: string;
        readonly target: Length;
        readonly lower: Length;
        readonly upper: Length;
        readonly partner: PartnerFigures | null;
      }[];
    }[];
  };
  isCurrent: boolean;
  otherUnit: LengthUnit | undefined;
  timeZone: string;
}

/** A numbered, unchangeable release of sizes with its working. A replaced one says so and is folded away. */
export function RevSheet({ rev, isCurrent, otherUnit, timeZone }: RevSheetProps) {
  const body = rev.lines.map((line) => (
    <section key={line.lineId} className="mb-6">
      <h3 className="mb-2">
        {line.title} <span className="note font-normal">since rev {line.since}</span>
      </h3>
      <Scroll label={`Sizes of ${line.title}`}>
        <SizesTable sizes={line.sizes} unit={rev.unit} otherUnit={otherUnit} />
      </Scroll>
      <div className="mt-4 grid gap-5 md:grid-cols-2">
        <Sum steps={line.steps} />
        <div className="grid content-start gap-2">
          {line.checks.map((check) => (
            <Notice key={check.words} tone={check.tone}>
              {check.words}
            </Notice>
          ))}
        </div>
      </div>
    </section>
  ));
  const head = `Rev ${rev.number}`;
  const by = `${rev.author}, ${sayMoment(rev.releasedAt, timeZone)}${rev.reason === '' ? '' : `: ${rev.reason.replace(/[.\s]+$/, '')}`}`;
  if (!isCurrent) {
    return (
      <details className="border-b border-rule-2 py-2">
        <summary className="cursor-pointer">
          <s>{head}</s> <span className="note">replaced, do not use. {by}</span>
        </summary>
        <div className="mt-3 opacity-80">{body}</div>
      </details>
    );
  }
  return (
    <div>
      <h2>{head}</h2>
      <p className="note mb-4">{by}. The limits are finished limits.</p>
      {body}
    </div>
  );
}
