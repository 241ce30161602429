import { randomUUID } from 'node:crypto';
import { releaseAction } from '@/app/(workspace)/orders/[orderId]/actions';
import { lendSheetAction } from '@/app/(workspace)/orders/[orderId]/sizes/actions';
import { ChoiceField, TextArea } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { AlreadyCut } from '@/components/order/already-cut';
import { Notice } from '@/components/ui/notice';
import type { OrderView } from '@/db/read-models/order-page';
import type { SizesView } from '@/db/read-models/order-sizes';
import type { LengthUnit } from '@/lib/domain/quantity/length';
import { type CutFeature, PAST_DECISIONS } from '@/lib/domain/sizes/already-cut';
import { isReleased, previewOf } from '@/lib/services/worksheets';

interface SheetsProps {
  view: OrderView;
  sizes: SizesView;
  cut: readonly CutFeature[];
  unit: LengthUnit;
}

/** The sender's sheets, what they make of what is cut already, and the release. */
export function Sheets({ view, sizes, cut: alreadyCut, unit }: SheetsProps) {
  const { facts, allowed } = view;
  const from = { unit, house: view.house };
  const begun = sizes.sheets.filter((sheet) => Object.values(sheet.raw).some((text) => text !== ''));
  const hasNews = begun.some((sheet) => !isReleased(facts, sheet, from));
  const isCut = facts.lines.some((line) => line.started);
  const made = begun.flatMap((sheet) => previewOf(alreadyCut, sheet, from));
  return (
    <section className="mb-6 border-b border-rule pb-6">
      <h2 className="mb-2">Work out the sizes</h2>
      {sizes.sheets.length === 0 && <p className="note">Nothing on this order is cut to a size.</p>}
      <ul>
        {sizes.sheets.map((sheet) => (
          <li key={sheet.id} className="flex flex-wrap items-center gap-3 border-b border-rule-2 py-2">
            <span className="grow">{facts.lines.find((line) => line.id === sheet.lineId)?.title}</span>
            {sheet.shared && <span className="note">the machine shop may fill it in</span>}
            <a href={`/orders/${facts.id}/sheets/${sheet.id}`} className="btn">
              Work out
            </a>
            {facts.status !== 'draft' && (
              <Form
                action={lendSheetAction}
                hidden={{ orderId: facts.id, sheetId: sheet.id, shared: sheet.shared ? 'no' : 'yes' }}
                label="Lend the sheet"
              >
                <Submit kind="ghost">{sheet.shared ? 'Take it back' : 'Ask them to fill it in'}</Submit>
              </Form>
            )}
          </li>
        ))}
      </ul>
      {allowed.includes('release') && hasNews && (
        <Form
          action={releaseAction}
          requestKey={randomUUID()}
          version={facts.version}
          hidden={{ orderId: facts.id }}
          className="mt-4 grid max-w-xl gap-3"
          label="Release the sizes"
        >
          {made.length > 0 && (
            <AlreadyCut made={made} unit={unit} title="What is cut already, held against this sheet" />
          )}
          {isCut && (
            <Notice tone="warn">
              This order is being cut. A new rev stops it until the machine shop has said what is cut and
              repeated the new sizes back.
            </Notice>
          )}
          {facts.latestRev !== null && (
            <TextArea name="reason" label={`Why it replaces rev ${facts.latestRev}`} />
          )}
          {facts.latestRev === null && <input type="hidden" name="reason" value="" />}
          {made.some(({ is }) => is.state === 'past') && (
            <ChoiceField
              kind="radio"
              name="past"
              label="What is past size at the new limits"
              options={Object.entries(PAST_DECISIONS).map(([value, { label }]) => ({ value, label }))}
            />
          )}
          <div>
            <Submit>Release these sizes</Submit>
          </div>
        </Form>
      )}
    </section>
  );
}

/** Sheets that the sender asks the machine shop to fill in. */
export function LentSheets({ view, sizes }: { view: OrderView; sizes: SizesView }) {
  return (
    <>
      {sizes.sheets.map((sheet) => (
        <p key={sheet.id} className="mb-4">
          {view.facts.sender.name} asks you to fill this sheet in:{' '}
          <a href={`/orders/${view.facts.id}/sheets/${sheet.id}`}>
            {view.facts.lines.find((line) => line.id === sheet.lineId)?.title}
          </a>
        </p>
      ))}
    </>
  );
}
