import 'server-only';
import { begin, beginUnknown } from '@/db/client';
import { once } from '@/db/repositories/idempotency';
import {
  findInvitation,
  insertInvitation,
  inviteShop,
  type InvitationView,
  takeInvitation,
  tellAddress,
} from '@/db/repositories/partners';
import { newId } from '@/lib/adapters/ids';
import { linkSecret } from '@/lib/adapters/links';
import type { Role, Ticket } from '@/lib/domain/actor';
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
      const shopId = input.shopId ?? newId();
      await inviteShop(tx, shopId, input.shopName);
      const invitationId = newId();
      const secret = linkSecret('invitation', invitationId);
      const email = normalEmail(input.email);
      await insertInvitation(tx, actor, {
        id: invitationId,
        invitedShopId: shopId,
        email,
        roles: ['owner'],
        tokenHash: tokenHash(secret),
      });
      const detail = { invitationId, invitingShop: actor.shopName, shop: input.shopName };
      await tellAddress(tx, { id: newId(), shopId: actor.shopId, email, kind: 'invitation.partner', detail });
      return { shopId, invitationId };
    });
  });
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
