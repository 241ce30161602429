import { createHash } from 'node:crypto';
import { linkSecret } from '@/lib/adapters/links';
import type { Role } from '@/lib/domain/actor';
import { DEMO_PASSWORD, DEMO_SIGN_INS, type DemoSignIn } from '@/lib/demo/sign-ins';
import { openShop } from '@/lib/services/identity';
import { acceptInvitation, invitePartner, invitePerson } from '@/lib/services/invitations';

/** A person of the demonstration as the services know them. */
export interface Player {
  readonly personId: string;
  readonly shopId: string;
}

/** The people of the demonstration by key, as `works-owner`. */
export type Cast = Readonly<Record<string, Player>>;

/** An id that a name always has: the scenario comes out the same each time. */
export function demoId(name: string): string {
  const hex = createHash('sha256').update(`demonstration ${name}`).digest('hex');
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-7${hex.slice(13, 16)}-8${hex.slice(17, 20)}-${hex.slice(20, 32)}`;
}

/** Opens the shops and brings their people in, through the product's own doors. Null when they are here already. */
export async function bringInTheCast(): Promise<Cast | null> {
  const works = DEMO_SIGN_INS.find(({ key }) => key === 'works-owner');
  if (!works) throw new Error('The demonstration has no owner');
  const opened = await openShop({
    ...{
      shopId: demoId('works'),
      personId: demoId(works.key),
      shopName: works.shop,
      unit: 'in',
      currency: 'USD',
      timeZone: 'UTC',
    },
    ...{ email: works.email, personName: works.name, password: DEMO_PASSWORD },
  });
  if (!opened) return null;
  const cast: Record<string, Player> = { [works.key]: opened };
  for (const owner of DEMO_SIGN_INS.filter(({ role, shopKey }) => role === 'owner' && shopKey !== 'works')) {
    const { invitationId } = await invitePartner(opened, demoId(`invite ${owner.key}`), {
      shopName: owner.shop,
      email: owner.email,
      shopId: demoId(owner.shopKey),
    });
    cast[owner.key] = await accept(invitationId, owner);
  }
  for (const person of DEMO_SIGN_INS.filter(({ role }) => role !== 'owner')) {
    const host = cast[`${person.shopKey}-owner`];
    if (!host) throw new Error(`${person.shopKey} has no owner`);
    const roles: readonly Role[] = [person.role];
    const { invitationId } = await invitePerson(host, demoId(`invite ${person.key}`), {
      email: person.email,
      roles,
    });
    cast[person.key] = await accept(invitationId, person);
  }
  return cast;
}

function accept(invitationId: string, person: DemoSignIn): Promise<Player> {
  const secret = linkSecret('invitation', invitationId);
  return acceptInvitation(secret, {
    name: person.name,
    password: DEMO_PASSWORD,
    personId: demoId(person.key),
    signedInId: null,
  });
}
