'use client';

import { SizeField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import type { FormAction } from '@/lib/forms/form-state';

interface RepeatBackFormProps {
  action: FormAction;
  orderId: string;
  version: number;
  requestKey: string;
  rev: number;
  unit: 'in' | 'mm';
  /** What is to be keyed. The sizes themselves never come here. */
  asked: readonly { lineId: string; what: string; features: string }[];
}

/** What the machinist keys from what stands at the machine, with the sizes hidden. */
export function RepeatBackForm({
  action,
  orderId,
  version,
  requestKey,
  rev,
  unit,
  asked,
}: RepeatBackFormProps) {
  const hidden = Object.fromEntries(
    asked.flatMap(({ lineId, what }, index) => [
      [`line:${index}`, lineId],
      [`what:${index}`, what],
    ]),
  );
  return (
    <Form
      action={action}
      requestKey={requestKey}
      version={version}
      hidden={{ orderId, rev: String(rev), unit, count: String(asked.length), ...hidden }}
      className="grid gap-4"
      label="Repeat the sizes back"
    >
      {asked.map(({ what, features }, index) => (
        <fieldset key={`${what}${index}`} className="grid gap-3 sm:grid-cols-2">
          <legend className="mb-1 font-semibold">
            {what} <span className="note font-normal">{features}</span>
          </legend>
          <SizeField name={`upper:${index}`} label="No bigger than" />
          <SizeField name={`lower:${index}`} label="No smaller than" />
        </fieldset>
      ))}
      <div>
        <Submit>Repeat them back</Submit>
      </div>
    </Form>
  );
}
