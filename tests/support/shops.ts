import { randomUUID } from 'node:crypto';
import { linkSecret } from '@/lib/adapters/links';
import type { Role, ShopUnit, Ticket } from '@/lib/domain/actor';
import { openShop, signIn, tokenHash } from '@/lib/services/identity';
import { acceptInvitation, invitePartner, invitePerson } from '@/lib/services/invitations';

export const PASSWORD = 'grind-to-size-2026';

/** A shop with its owner signed in. */
export interface TestShop {
  readonly shopId: string;
  readonly name: string;
  readonly owner: Ticket & { tokenHash: string };
  readonly ownerEmail: string;
}

let count = 0;

/** Opens a shop through the product's own door. */
export async function buildShop(name = 'Test Engines', unit: ShopUnit = 'in'): Promise<TestShop> {
  count += 1;
  const ownerEmail = `owner${count}-${randomUUID().slice(0, 8)}@shop.example`;
  const shop = await openShop({
    ...{ shopName: name, unit, currency: 'USD', timeZone: 'UTC', email: ownerEmail },
    ...{ personName: `${name} owner`, password: PASSWORD },
  });
  if (!shop) throw new Error('The shop was not opened');
  return { shopId: shop.shopId, name, ownerEmail, owner: await ticketOf(ownerEmail) };
}

/** A partner of the shop: invited by e-mail, accepted, signed in. */
export async function buildPartner(of: TestShop, name = 'Test Grinding'): Promise<TestShop> {
  count += 1;
  const ownerEmail = `partner${count}-${randomUUID().slice(0, 8)}@shop.example`;
  const { shopId, invitationId } = await invitePartner(of.owner, randomUUID(), {
    shopName: name,
    email: ownerEmail,
  });
  await acceptInvitation(linkSecret('invitation', invitationId), {
    name: `${name} owner`,
    password: PASSWORD,
    signedInId: null,
  });
  return { shopId, name, ownerEmail, owner: await ticketOf(ownerEmail) };
}

/** A person of the shop with the roles given, signed in. */
export async function buildPerson(
  of: TestShop,
  roles: readonly Role[],
): Promise<{ tokenHash: string; email: string }> {
  count += 1;
  const email = `person${count}-${randomUUID().slice(0, 8)}@shop.example`;
  const { invitationId } = await invitePerson(of.owner, randomUUID(), { email, roles });
  await acceptInvitation(linkSecret('invitation', invitationId), {
    name: `Person ${count}`,
    password: PASSWORD,
    signedInId: null,
  });
  return { ...(await ticketOf(email)), email };
}

/** Signs in and answers the ticket. */
export async function ticketOf(email: string): Promise<{ tokenHash: string }> {
  const secret = await signIn({ email, password: PASSWORD, address: `test-${count}`, agent: 'test' });
  if (secret === null) throw new Error(`${email} could not sign in`);
  return { tokenHash: tokenHash(secret) };
}
