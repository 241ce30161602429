import { PartFields } from '@/components/builds/part-fields';
import { Form, Submit } from '@/components/forms/form';
import type { FormAction } from '@/lib/forms/form-state';

interface AddPartProps {
  action: FormAction;
  requestKey: string;
  /** Empty for a part with no build. */
  buildId: string;
  className?: string;
}

/** Writes a part down, on a build or on none. */
export function AddPart({ action, requestKey, buildId, className = '' }: AddPartProps) {
  return (
    <Form
      action={action}
      requestKey={requestKey}
      hidden={{ buildId }}
      className={`grid gap-3 ${className}`}
      label="Add a part"
    >
      <PartFields />
      <div>
        <Submit kind="ghost">Add the part</Submit>
      </div>
    </Form>
  );
}
