import { randomUUID } from 'node:crypto';
import {
  changeRolesAction,
  endSignInAction,
  invitePersonAction,
  removePersonAction,
} from '@/app/(workspace)/settings/actions';
import { ChoiceField, TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { Sheet } from '@/components/ui/sheet';
import type { PersonRow } from '@/db/read-models/partners';
import type { ShopView } from '@/db/read-models/shop';
import { type Actor, can } from '@/lib/domain/actor';
import { sayMoment } from '@/lib/forms/say';

const ROLES = [
  { value: 'bench', label: 'Bench', note: 'sizes, cutting, readings, decisions' },
  { value: 'counter', label: 'Counter', note: 'parts, prices, messages' },
  { value: 'owner', label: 'Owner', note: 'everything, with people and turnaround' },
];

/** Who works here and what they do. */
export function PeopleSheet({ people, actor }: { people: readonly PersonRow[]; actor: Actor }) {
  const mayChange = can(actor, 'people');
  return (
    <Sheet title="People">
      <ul className="mb-4">
        {people.map((person) => (
          <li key={person.id} className="border-b border-rule-2 py-2">
            <p className="flex flex-wrap items-baseline gap-x-3">
              <b className="font-semibold">{person.name}</b>
              <span className="note">{person.email}</span>
              <span className="note">{person.roles.join(', ')}</span>
            </p>
            {mayChange && (
              <details>
                <summary className="cursor-pointer py-1 text-[15px]">Change or remove</summary>
                <Form
                  action={changeRolesAction}
                  hidden={{ personId: person.id }}
                  className="my-2 grid gap-3"
                  label={`What ${person.name} does`}
                >
                  <ChoiceField
                    kind="checkbox"
                    name="roles"
                    label="What they do"
                    options={ROLES}
                    defaultValue={person.roles.join('\n')}
                  />
                  <div>
                    <Submit kind="ghost">Keep</Submit>
                  </div>
                </Form>
                {person.id !== actor.personId && (
                  <Form
                    action={removePersonAction}
                    hidden={{ personId: person.id }}
                    label={`Remove ${person.name}`}
                  >
                    <Submit kind="stop">Remove</Submit>
                  </Form>
                )}
              </details>
            )}
          </li>
        ))}
      </ul>
      {mayChange && (
        <Form
          action={invitePersonAction}
          requestKey={randomUUID()}
          className="grid gap-4"
          label="Invite a person"
        >
          <TextField name="email" label="Invite somebody by e-mail" type="email" autoComplete="off" />
          <ChoiceField kind="checkbox" name="roles" label="What they do" options={ROLES} />
          <div>
            <Submit kind="ghost">Invite</Submit>
          </div>
        </Form>
      )}
    </Sheet>
  );
}

/** The asker's own sign-ins, on this screen and others. */
export function SignInsSheet({ signIns, timeZone }: { signIns: ShopView['signIns']; timeZone: string }) {
  return (
    <Sheet title="Where you are signed in">
      <ul>
        {signIns.map((one) => (
          <li
            key={one.id}
            className="flex flex-wrap items-center gap-x-3 gap-y-1 border-b border-rule-2 py-2"
          >
            <span className="min-w-0 grow">
              {sayDevice(one.agent)}
              <span className="note block">
                {one.shop} · last seen {sayMoment(one.seenAt, timeZone)}
              </span>
            </span>
            {one.isThis ? (
              <span className="note">this screen</span>
            ) : (
              <Form
                action={endSignInAction}
                hidden={{ signInId: one.id }}
                label={`End ${sayDevice(one.agent)}, last seen ${sayMoment(one.seenAt, timeZone)}, ${one.id.slice(-4)}`}
              >
                <Submit kind="ghost">End it</Submit>
              </Form>
            )}
          </li>
        ))}
      </ul>
    </Sheet>
  );
}

/** A browser's own words about itself, as far as a person would say them. */
function sayDevice(agent: string): string {
  const browser = /Firefox|Edg|Chrome|Safari/.exec(agent)?.[0]?.replace('Edg', 'Edge') ?? 'A browser';
  const system = /iPhone|iPad|Android|Windows|Mac OS|Linux/.exec(agent)?.[0];
  return system === undefined ? browser : `${browser} on ${system}`;
}
