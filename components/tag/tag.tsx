import type { ReactNode } from 'react';
import { LargePunches, type PunchesValue } from '@/components/tag/punches';

export interface TagProps {
  number: number;
  title: string;
  facts: readonly { label: string; value: string }[];
  punches: PunchesValue;
  stopped: boolean;
  says: Readonly<Record<'price' | 'parts' | 'sizes', string>>;
  verdict: string;
  children?: ReactNode;
}

/** The order's identity: the manila tag, large on its page. */
export function Tag({ number, title, facts, punches, stopped, says, verdict, children }: TagProps) {
  return (
    <div className="tag">
      <div className="tag-face grid items-center gap-x-7 gap-y-5 py-5 pr-5 pl-[76px] lg:grid-cols-[minmax(0,1fr)_25rem]">
        <div>
          <h1>
            <span className="block font-stencil text-[40px] leading-none font-extrabold tracking-wide">
              WO {number}
            </span>
            <span className="mt-1 block text-[21px] font-semibold">{title}</span>
          </h1>
          <dl className="mt-2.5 flex flex-wrap gap-x-6 gap-y-2 text-sm text-manila-ink">
            {facts.map(({ label, value }) => (
              <div key={label}>
                <dt className="text-xs">{label}</dt>
                <dd className="font-medium text-ink">{value}</dd>
              </div>
            ))}
          </dl>
          {children}
        </div>
        <div className="-ml-14 lg:ml-0">
          <LargePunches punches={punches} stopped={stopped} says={says} />
          <p className="mt-3 border-t-[1.5px] border-dashed border-manila-edge pt-2.5 text-center text-[15px] font-semibold">
            {verdict}
          </p>
        </div>
      </div>
      <span aria-hidden className="tag-eye max-lg:top-16" />
    </div>
  );
}
