import { TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import type { FormAction } from '@/lib/forms/form-state';

interface NameShopProps {
  action: FormAction;
  requestKey: string;
  label: string;
  press: string;
  kind?: 'main' | 'ghost';
  className?: string;
}

/** A machine shop that is not here yet, and the address of its owner. */
export function NameShop({ action, requestKey, label, press, kind = 'main', className = '' }: NameShopProps) {
  return (
    <Form action={action} requestKey={requestKey} className={`grid gap-4 ${className}`} label={label}>
      <TextField name="shopName" label="Name of the shop" />
      <TextField name="email" label="E-mail of its owner" type="email" autoComplete="off" />
      <Submit kind={kind}>{press}</Submit>
    </Form>
  );
}
