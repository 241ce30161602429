import { groupSizes } from '@/components/order/sizes-table';
import { Sum } from '@/components/order/sum';
import { Notice } from '@/components/ui/notice';
import type { Filled } from '@/lib/domain/operations/fill';
import type { Worked } from '@/lib/domain/operations/operation';
import { type LengthUnit, subtract } from '@/lib/domain/quantity/length';
import { printNear } from '@/lib/domain/quantity/print-length';

interface SheetAnswerProps {
  worked: Worked | null;
  filled: Filled;
  unit: LengthUnit;
}

/** What the sheet answers: the sum, the limits, what cleans up, and what it has found out. */
export function SheetAnswer({ worked, filled, unit }: SheetAnswerProps) {
  if (!worked) {
    const why =
      filled.questions.length > 0
        ? 'Something is questioned; answer it first.'
        : 'Something is still missing.';
    return (
      <section className="sheet px-5 py-4" aria-live="polite">
        <h2 className="text-[17px]">The sum</h2>
        <p className="num my-2 text-[23px]">–</p>
        <p className="note">{why}</p>
      </section>
    );
  }
  const steps = worked.column.map((row) =>
    row === 'rule' ? { rule: true } : { label: row.label, text: printNear(row.value, unit) },
  );
  return (
    <div className="grid gap-5" aria-live="polite">
      {worked.cleanUp.length > 0 && (
        <section className="sheet px-5 py-4">
          <h2 className="mb-2 text-[17px]">What cleans up</h2>
          <ul>
            {worked.cleanUp.map((row) => (
              <li
                key={row.step}
                className={`grid grid-cols-[70px_minmax(0,1fr)] gap-3 border-b px-2 py-2 text-[15px] ${row.chosen ? 'border-[1.5px] border-blue bg-blue-wash' : 'border-rule-2'}`}
              >
                <b className="num">{printNear(row.step, unit)}</b>
                <span>
                  {sayCleanUp(row)}
                  {row.chosen && <b className="block font-semibold">chosen</b>}
                </span>
              </li>
            ))}
          </ul>
        </section>
      )}
      <section className="sheet px-5 py-4">
        <h2 className="mb-2 text-[17px]">The sum</h2>
        <Sum steps={steps} />
        {groupSizes(worked.sizes.map((size) => ({ ...size, target: size.target.value }))).map((group) => (
          <p key={group.key} className="mt-2 flex justify-between gap-3 border-t border-rule-2 pt-2">
            <span>
              {group.what} <span className="note">{group.features}</span>
            </span>
            <span className="num text-right">
              <b className="text-[20px]">{printNear(group.target, unit)}</b>{' '}
              {printNear(subtract(group.upper, group.target), unit, { signed: true })}{' '}
              {printNear(subtract(group.lower, group.target), unit, { signed: true }).replace(
                '+.0000',
                '−.0000',
              )}
            </span>
          </p>
        ))}
        {worked.windows.map((window) => (
          <p key={window.label} className="note mt-2">
            {window.label}: <span className="num">{printNear(window.lower, unit)}</span> to{' '}
            <span className="num">{printNear(window.upper, unit)}</span>
          </p>
        ))}
      </section>
      <div className="grid gap-2">
        {worked.checks.map((check) => (
          <Notice key={check.words} tone={check.tone}>
            {check.words}
          </Notice>
        ))}
      </div>
    </div>
  );
}

function sayCleanUp({ even, oneSided }: { even: boolean; oneSided: boolean }): string {
  if (oneSided) return '● cleans up, wear all on one side too';
  return even ? '▲ cleans up if the wear is even' : '■ does not clean up';
}
