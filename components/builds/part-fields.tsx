import { SelectField, TextField } from '@/components/forms/fields';
import { PART_KINDS } from '@/lib/schemas/build';

/** What a part asks. */
export function PartFields() {
  return (
    <>
      <SelectField
        name="kind"
        label="Add a part"
        options={PART_KINDS.map((kind) => ({ value: kind, label: kind }))}
      />
      <TextField name="pieces" label="Pieces" defaultValue="1" mono />
      <TextField name="stamps" label="Stamps" hint="One a piece, with spaces between, or none." mono />
      <TextField name="makerNo" label="Maker’s or casting number" mono />
      <TextField name="condition" label="Condition" className="sm:col-span-2" />
    </>
  );
}
