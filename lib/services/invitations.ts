import 'server-only';
import { begin, beginUnknown, type Tx } from '@/db/client';
import { once } from '@/db/repositories/idempotency';
import {
  findInvitation,
  findInvited,
  insertInvitation,
  inviteShop,
  type InvitationView,
  takeInvitation,
  tellAddress,
} from '@/db/repositories/partners';
import { newId } from '@/lib/adapters/ids';
import { linkSecret } from '@/lib/adapters/links';
import type { Actor, Role, Ticket } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';
import { hashNewPassword, normalEmail, tokenHash } from '@/lib/services/identity';
import { requirePermission } from '@/lib/services/permission';

interface PartnerInvitation {
  readonly shopName: string;
  readonly email: string;
  readonly shopId?: string;
}

/** Invites a machine shop that is not here yet: it is a partner at once, and can be sent orders before it accepts. */
export async function invitePartner(
  ticket: Ticket,
  requestKey: string,
  input: PartnerInvitation,
): Promise<{ shopId: string; invitationId: string }> {
  return begin(ticket, (tx, actor) => {
    requirePermission(actor, 'partners');
    return once(tx, actor, { key: requestKey, route: 'partner.invite', input }, async () => {
      const named = await nameNewShop(tx, actor, input);
      const detail = { invitationId: named.invitationId, invitingShop: actor.shopName, shop: input.shopName };
      const mail = {
        id: newId(),
        shopId: actor.shopId,
        email: named.email,
        kind: 'invitation.partner',
        detail,
      };
      await tellAddress(tx, mail);
      return { shopId: named.shopId, invitationId: named.invitationId };
    });
  });
}

/** Names a machine shop that is not here yet, without writing to it: its one e-mail goes out with the first order. */
export async function namePartner(
  ticket: Ticket,
  requestKey: string,
  input: PartnerInvitation,
): Promise<{ shopId: string }> {
  return begin(ticket, (tx, actor) => {
    requirePermission(actor, 'partners');
    return once(tx, actor, { key: requestKey, route: 'partner.name', input }, async () => {
      const { shopId } = await nameNewShop(tx, actor, input);
      return { shopId };
    });
  });
}

/**
 * Writes to a partner that has not come in yet: the way in, and the order that was just sent to it where there is one.
 * A partner that is here is not written to; answers whether a mail goes out.
 */
export async function writeToInvited(
  tx: Tx,
  actor: Actor,
  partnerShopId: string,
  order?: { readonly id: string; readonly number: number; readonly neededBackOn: string | null },
): Promise<boolean> {
  const known = await findInvited(tx, partnerShopId);
  if (!known) return false;
  const invitationId = known.isOpen
    ? known.invitationId
    : await renew(tx, actor, { shopId: partnerShopId, email: known.email });
  const detail = {
    ...{ invitationId, invitingShop: actor.shopName, shop: known.shopName },
    ...(order
      ? { orderId: order.id, number: String(order.number), neededBackOn: order.neededBackOn ?? '' }
      : {}),
  };
  const kind = order ? 'invitation.order' : 'invitation.partner';
  await tellAddress(tx, { id: newId(), shopId: actor.shopId, email: known.email, kind, detail });
  return true;
}

async function nameNewShop(
  tx: Tx,
  actor: Actor,
  input: PartnerInvitation,
): Promise<{ shopId: string; invitationId: string; email: string }> {
  const shopId = input.shopId ?? newId();
  const email = normalEmail(input.email);
  await inviteShop(tx, shopId, input.shopName);
  return { shopId, email, invitationId: await renew(tx, actor, { shopId, email }) };
}

/** A fresh invitation of a shop's first owner. */
async function renew(
  tx: Tx,
  actor: Actor,
  { shopId, email }: { readonly shopId: string; readonly email: string },
): Promise<string> {
  const invitationId = newId();
  await insertInvitation(tx, actor, {
    ...{ id: invitationId, invitedShopId: shopId, email, roles: ['owner'] },
    tokenHash: tokenHash(linkSecret('invitation', invitationId)),
  });
  return invitationId;
}

/** Invites a person into one's own shop. */
export async function invitePerson(
  ticket: Ticket,
  requestKey: string,
  input: { readonly email: string; readonly roles: readonly Role[] },
): Promise<{ invitationId: string }> {
  return begin(ticket, (tx, actor) => {
    requirePermission(actor, 'people');
    return once(tx, actor, { key: requestKey, route: 'person.invite', input }, async () => {
      const invitationId = newId();
      const secret = linkSecret('invitation', invitationId);
      const email = normalEmail(input.email);
      const invitation = {
        id: invitationId,
        invitedShopId: actor.shopId,
        email,
        roles: input.roles,
        tokenHash: tokenHash(secret),
      };
      await insertInvitation(tx, actor, invitation);
      const detail = { invitationId, invitingShop: actor.shopName, shop: actor.shopName };
      await tellAddress(tx, { id: newId(), shopId: actor.shopId, email, kind: 'invitation.person', detail });
      return { invitationId };
    });
  });
}

/** Reads the invitation behind a link, for its page. */
export async function readInvitation(secret: string): Promise<InvitationView | undefined> {
  return beginUnknown((tx) => findInvitation(tx, tokenHash(secret)));
}

/**
 * Accepts an invitation: a new person gives a name and a password, a known one must be signed in.
 * @throws AppError not_found when the link is used, withdrawn or too old; forbidden when its person must sign in first.
 */
export async function acceptInvitation(
  secret: string,
  input: {
    readonly name: string;
    readonly password: string;
    readonly personId?: string;
    readonly signedInId: string | null;
  },
): Promise<{ personId: string; shopId: string }> {
  const passwordHash = await hashNewPassword(input.password);
  const row = {
    tokenHash: tokenHash(secret),
    personId: input.personId ?? newId(),
    name: input.name,
    passwordHash,
    signedInId: input.signedInId,
  };
  try {
    const taken = await beginUnknown((tx) => takeInvitation(tx, row));
    if (taken) return taken;
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === '42501') {
      throw new AppError(
        'forbidden',
        'This address has an account. Sign in first, then open the link again.',
      );
    }
    throw error;
  }
  throw new AppError(
    'not_found',
    'This invitation has been used, withdrawn, or is too old. Ask for a new one.',
  );
}
