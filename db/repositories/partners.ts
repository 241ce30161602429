import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor, Role } from '@/lib/domain/actor';

/** Makes a shop that waits to be claimed, and the partnership with it. */
export async function inviteShop(tx: Tx, shopId: string, shopName: string): Promise<void> {
  await tx.raw('select invite_shop(?, ?)', [shopId, shopName]);
}

/** Writes an invitation down; only the hash of its secret is kept. */
export async function insertInvitation(
  tx: Tx,
  actor: Actor,
  row: {
    readonly id: string;
    readonly invitedShopId: string;
    readonly email: string;
    readonly roles: readonly Role[];
    readonly tokenHash: string;
  },
): Promise<void> {
  await tx.raw(
    `insert into invitations (id, shop_id, invited_shop_id, email_norm, roles, token_hash, until)
     values (?, ?, ?, ?, ?, ?, now() + interval '14 days')`,
    [row.id, actor.shopId, row.invitedShopId, row.email, [...row.roles], row.tokenHash],
  );
}

/** An invitation as its page shows it. */
export interface InvitationView {
  readonly shopName: string;
  readonly invitingShopName: string;
  readonly email: string;
  /** The address has an account already: its person must sign in to accept. */
  readonly known: boolean;
}

/** Reads an open invitation by the hash of its secret. */
export async function findInvitation(tx: Tx, tokenHash: string): Promise<InvitationView | undefined> {
  const { rows } = await tx.raw<{ rows: InvitationView[] }>(
    `select shop_name as "shopName", inviting_shop_name as "invitingShopName", email_norm as email, known from read_invitation(?)`,
    [tokenHash],
  );
  return rows[0];
}

/** Takes an invitation once; undefined when it is used, revoked or too old. */
export async function takeInvitation(
  tx: Tx,
  row: {
    readonly tokenHash: string;
    readonly personId: string;
    readonly name: string;
    readonly passwordHash: string;
    readonly signedInId: string | null;
  },
): Promise<{ personId: string; shopId: string } | undefined> {
  const { rows } = await tx.raw<{ rows: { personId: string; shopId: string }[] }>(
    `select person_id as "personId", shop_id as "shopId" from take_invitation(?, ?, ?, ?, ?)`,
    [row.tokenHash, row.personId, row.name, row.passwordHash, row.signedInId],
  );
  return rows[0];
}

/** A partner that the asker's shop has invited and that nobody has claimed yet, with its latest invitation. */
export async function findInvited(
  tx: Tx,
  shopId: string,
): Promise<{ shopName: string; email: string; invitationId: string; isOpen: boolean } | undefined> {
  const { rows } = await tx.raw<{
    rows: { shopName: string; email: string; invitationId: string; isOpen: boolean }[];
  }>(
    `select s.name as "shopName", i.email_norm as email, i.id as "invitationId",
       i.used_at is null and i.revoked_at is null and i.until > now() + interval '1 day' as "isOpen"
     from invitations i join shops s on s.id = i.invited_shop_id
     where i.invited_shop_id = ? and i.shop_id <> i.invited_shop_id and s.claimed_at is null order by i.created_at desc, i.id desc limit 1`,
    [shopId],
  );
  return rows[0];
}

/** Queues a mail to an address that may belong to nobody here. */
export async function tellAddress(
  tx: Tx,
  mail: {
    readonly id: string;
    readonly shopId: string;
    readonly email: string;
    readonly kind: string;
    readonly detail: Readonly<Record<string, string>>;
  },
): Promise<void> {
  await tx.raw('select tell_address(?, ?, ?, ?, ?::jsonb)', [
    mail.id,
    mail.shopId,
    mail.email,
    mail.kind,
    JSON.stringify(mail.detail),
  ]);
  await tx.raw(`select outbox.put('send_notice', json_build_object('noticeId', ?::text), ?, null)`, [
    mail.id,
    `notice-${mail.id}`,
  ]);
}
