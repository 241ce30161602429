import 'server-only';
import type { Tx } from '@/db/client';
import type { Permission, Role } from '@/lib/domain/actor';
import { PERMISSIONS } from '@/lib/domain/actor';

/** Queues a background task that commits or vanishes with this transaction. */
export async function putTask(
  tx: Tx,
  task: string,
  ref: Readonly<Record<string, unknown>>,
  more: { key?: string; runAt?: string } = {},
): Promise<void> {
  await tx.raw('select outbox.put(?, ?::json, ?, ?::timestamptz)', [
    task,
    JSON.stringify(ref),
    more.key ?? null,
    more.runAt ?? null,
  ]);
}

/** Tells a shop's members whose roles hold the permission, one mail a person, without the one who acted. */
export async function tellShop(
  tx: Tx,
  about: {
    readonly shopId: string;
    readonly orderId: string;
    readonly seq: number;
    readonly kind: string;
    readonly step: string | null;
  },
  permission: Permission,
): Promise<void> {
  const roles = (Object.keys(PERMISSIONS) as Role[]).filter((role) =>
    (PERMISSIONS[role] as readonly Permission[]).includes(permission),
  );
  await tx.raw(
    `select outbox.put('send_notice', json_build_object('noticeId', n), 'notice-' || n, null)
     from tell_shop(?, ?, ?, ?, ?, ?) as n`,
    [about.shopId, about.orderId, about.seq, about.kind, about.step, roles],
  );
}

/** Writes the notice of a password reset, for the person's own address. */
export async function tellReset(
  tx: Tx,
  mail: { readonly id: string; readonly email: string; readonly resetId: string },
): Promise<void> {
  await tx.raw('select tell_reset(?, ?, ?::jsonb)', [
    mail.id,
    mail.email,
    JSON.stringify({ resetId: mail.resetId }),
  ]);
}
