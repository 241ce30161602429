import { SelectField, TextArea, TextField } from '@/components/forms/fields';
import { PRESETS } from '@/lib/domain/builds/presets';

interface BuildFieldsProps {
  engine?: string;
  preset?: string;
  customerName?: string;
  notes?: string;
  neededOn?: string;
}

/** What a build asks. */
export function BuildFields({
  engine = '',
  preset = 'inline6',
  customerName = '',
  notes = '',
  neededOn = '',
}: BuildFieldsProps) {
  const presets = PRESETS.map(({ key, label }) => ({ value: key, label }));
  return (
    <>
      <TextField name="engine" label="Engine" defaultValue={engine} hint="As you call it: Marrick 215 six" />
      <SelectField name="preset" label="How it is made" options={presets} defaultValue={preset} />
      <TextField
        name="customerName"
        label="Customer"
        defaultValue={customerName}
        hint="Only your shop sees this."
      />
      <TextField name="neededOn" label="Needed by" type="date" defaultValue={neededOn} />
      <TextArea name="notes" label="Notes" defaultValue={notes} hint="Only your shop sees this." />
    </>
  );
}
