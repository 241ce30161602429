import { randomUUID } from 'node:crypto';
import { changeShopAction, invitePersonAction, removePersonAction } from '@/app/(workspace)/settings/actions';
import { Form, Submit } from '@/components/forms/form';
import { ChoiceField, SelectField, TextField } from '@/components/forms/fields';
import { Sheet } from '@/components/ui/sheet';
import { begin } from '@/db/client';
import { loadPeople } from '@/db/read-models/partners';
import { loadShop } from '@/db/read-models/shop';
import { requirePageTicket } from '@/lib/auth/ticket';
import { can } from '@/lib/domain/actor';

export const metadata = { title: 'Settings' };

const UNITS = [
  { value: 'in', label: 'Inches' },
  { value: 'mm', label: 'Millimetres' },
];
const ROLES = [
  { value: 'bench', label: 'Bench', note: 'sizes, cutting, readings, decisions' },
  { value: 'counter', label: 'Counter', note: 'parts, prices, messages' },
  { value: 'owner', label: 'Owner', note: 'everything, with people and turnaround' },
];

export default async function SettingsPage() {
  const view = await begin(await requirePageTicket(), async (tx, actor) => ({
    actor,
    shop: await loadShop(tx, actor),
    people: await loadPeople(tx, actor),
  }));
  const { actor, shop, people } = view;
  const zones = ['UTC', ...Intl.supportedValuesOf('timeZone')].map((value) => ({ value, label: value }));
  const mayChange = can(actor, 'settings');
  return (
    <main className="page">
      <h1 className="mb-4">Settings</h1>
      <div className="grid items-start gap-5 lg:grid-cols-2">
        <Sheet title="The shop">
          {mayChange ? (
            <Form action={changeShopAction} version={shop.version} className="grid gap-4" label="The shop">
              <TextField name="name" label="Name" defaultValue={shop.name} />
              <SelectField name="unit" label="You measure in" options={UNITS} defaultValue={shop.unit} />
              <SelectField name="timeZone" label="Time zone" options={zones} defaultValue={shop.timeZone} />
              <TextField
                name="opens"
                label="Opens, Monday to Friday"
                defaultValue={shop.opens}
                hint="As 08:00"
                mono
              />
              <TextField name="closes" label="Closes" defaultValue={shop.closes} hint="As 16:00" mono />
              <Submit>Keep</Submit>
            </Form>
          ) : (
            <p className="note">Only an owner changes the shop’s settings.</p>
          )}
        </Sheet>
        <Sheet title="People">
          <ul className="mb-4">
            {people.map((person) => (
              <li key={person.id} className="flex flex-wrap items-center gap-x-3 border-b border-rule-2 py-2">
                <b className="font-semibold">{person.name}</b>
                <span className="note">{person.email}</span>
                <span className="note">{person.roles.join(', ')}</span>
                {can(actor, 'people') && person.id !== actor.personId && (
                  <Form
                    action={removePersonAction}
                    hidden={{ personId: person.id }}
                    className="ml-auto"
                    label={`Remove ${person.name}`}
                  >
                    <Submit kind="stop">Remove</Submit>
                  </Form>
                )}
              </li>
            ))}
          </ul>
          {can(actor, 'people') && (
            <Form
              action={invitePersonAction}
              requestKey={randomUUID()}
              className="grid gap-4"
              label="Invite a person"
            >
              <TextField name="email" label="Invite somebody by e-mail" type="email" autoComplete="off" />
              <ChoiceField kind="checkbox" name="roles" label="What they do" options={ROLES} />
              <Submit kind="ghost">Invite</Submit>
            </Form>
          )}
        </Sheet>
      </div>
    </main>
  );
}
