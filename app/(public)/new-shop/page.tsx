import { newShopAction } from '@/app/(public)/new-shop/actions';
import { Form, Submit } from '@/components/forms/form';
import { SelectField, TextField } from '@/components/forms/fields';
import { Sheet } from '@/components/ui/sheet';

export const metadata = { title: 'Open your shop' };

const UNITS = [
  { value: 'in', label: 'Inches' },
  { value: 'mm', label: 'Millimetres' },
];
const CURRENCIES = ['USD', 'CAD', 'EUR', 'GBP', 'AUD', 'NZD', 'PLN', 'SEK'].map((value) => ({
  value,
  label: value,
}));

export default function NewShopPage() {
  const zones = ['UTC', ...Intl.supportedValuesOf('timeZone')].map((value) => ({ value, label: value }));
  return (
    <>
      <h1 className="mb-4">Open your shop</h1>
      <Sheet>
        <Form action={newShopAction} className="grid gap-4">
          <TextField name="shopName" label="Name of the shop" autoComplete="organization" />
          <SelectField name="unit" label="You measure in" options={UNITS} />
          <SelectField name="currency" label="Currency" options={CURRENCIES} />
          <SelectField name="timeZone" label="Time zone" options={zones} defaultValue="America/Chicago" />
          <TextField name="name" label="Your name" autoComplete="name" />
          <TextField name="email" label="E-mail" type="email" autoComplete="username" />
          <TextField
            name="password"
            label="Password"
            type="password"
            autoComplete="new-password"
            hint="At least 8 letters; 15 are better."
          />
          <Submit>Open the shop</Submit>
        </Form>
      </Sheet>
    </>
  );
}
