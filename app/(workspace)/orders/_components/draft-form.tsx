import { randomUUID } from 'node:crypto';
import { keepDraftAction } from '@/app/(workspace)/orders/new/actions';
import { Autosave } from '@/components/forms/autosave';
import { ChoiceField, SelectField, TextArea, TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { Sheet } from '@/components/ui/sheet';
import type { PartRow } from '@/db/read-models/builds';
import type { PartnerRow } from '@/db/read-models/partners';
import { OPERATIONS } from '@/lib/domain/operations/catalogue';
import { needsSizes } from '@/lib/domain/operations/operation';
import type { DraftInput } from '@/lib/schemas/order-draft';

const TRANSPORT = [
  { value: 'delivered', label: 'We bring them' },
  { value: 'fetched', label: 'They fetch them' },
];
const ACCEPT = [
  { value: 'own_check', label: 'After our own check', note: 'the parts come home first' },
  { value: 'readings', label: 'On their readings' },
];

interface DraftFormProps {
  orderId: string;
  /** 0 for one that is not there yet. */
  version: number;
  values: DraftInput;
  partners: readonly PartnerRow[];
  parts: readonly PartRow[];
}

/** A work order before it is sent: what goes where, when and how. Kept while one types. */
export function DraftForm({ orderId, version, values, partners, parts }: DraftFormProps) {
  return (
    <Form
      action={keepDraftAction}
      requestKey={randomUUID()}
      hidden={{ orderId }}
      className="grid gap-5"
      label="Work order"
    >
      <Sheet title="What goes where">
        <div className="grid gap-4">
          <SelectField
            name="partnerShopId"
            label="To"
            defaultValue={values.partnerShopId ?? ''}
            options={[
              { value: '', label: 'Choose the machine shop' },
              ...partners.map(({ shopId, name, isHere }) => ({
                value: shopId,
                label: isHere ? name : `${name} (not here yet)`,
              })),
            ]}
          />
          <ChoiceField
            kind="checkbox"
            name="partIds"
            label="Parts"
            defaultValue={values.partIds.join('\n')}
            options={parts.map((part) => ({
              value: part.id,
              label: `${part.pieces} ${part.kind}${part.stamps.length > 0 ? `, stamp ${part.stamps.join(' ')}` : ''}`,
              note: part.buildNumber === null ? 'no build' : `B-${part.buildNumber} · ${part.engine ?? ''}`,
            }))}
          />
          <ChoiceField
            kind="checkbox"
            name="operations"
            label="What is to be done"
            defaultValue={values.operations.join('\n')}
            options={OPERATIONS.map((operation) => ({
              value: operation.key,
              label: operation.title,
              note: needsSizes(operation) ? 'needs sizes' : 'needs no sizes',
            }))}
          />
        </div>
      </Sheet>
      <Sheet title="When and how">
        <div className="grid gap-4 sm:grid-cols-2">
          <TextField
            name="neededBackOn"
            label="Needed back"
            type="date"
            defaultValue={values.neededBackOn ?? ''}
          />
          <TextField name="reference" label="Our reference" defaultValue={values.reference} />
          <ChoiceField
            kind="radio"
            name="transport"
            label="How the parts travel"
            options={TRANSPORT}
            defaultValue={values.transport}
            className="sm:col-span-2"
          />
          <ChoiceField
            kind="radio"
            name="acceptRule"
            label="The work is accepted"
            options={ACCEPT}
            defaultValue={values.acceptRule}
            className="sm:col-span-2"
          />
          <TextArea
            name="notes"
            label="Notes for the machine shop"
            defaultValue={values.notes}
            className="sm:col-span-2"
          />
          <TextArea
            name="standingInstruction"
            label="Standing instruction"
            defaultValue={values.standingInstruction}
            hint="An answer given ahead: if it will not clean up go to .020, spend up to so much without asking, or stop and ring."
            className="sm:col-span-2"
          />
        </div>
      </Sheet>
      <div>
        <Submit>Go on to sizes and sending</Submit>
        <p className="note mt-2">Nobody else sees a draft.</p>
        <Autosave url={`/api/v1/drafts/${orderId}`} version={version} lists={['partIds', 'operations']} />
      </div>
    </Form>
  );
}
