import 'server-only';
import type { Tx } from '@/db/client';

/** A notice as the task that sends it sees it. */
export interface NoticeRow {
  readonly id: string;
  readonly shopId: string;
  readonly orderId: string | null;
  readonly personId: string | null;
  readonly kind: string;
  readonly step: string | null;
  readonly detail: Readonly<Record<string, string>>;
  readonly email: string;
  readonly name: string;
  readonly seq: number | null;
}

/** Takes a waiting notice with its reader; undefined when it is sent or dropped already. */
export async function takeNotice(tx: Tx, noticeId: string): Promise<NoticeRow | undefined> {
  const { rows } = await tx.raw<{ rows: NoticeRow[] }>(
    `select n.id, n.shop_id as "shopId", n.order_id as "orderId", n.person_id as "personId", n.kind, n.step, n.detail, r.email, r.name
     from take_notice(?) n cross join reader_of(n.id) r where n.id is not null`,
    [noticeId],
  );
  return rows[0];
}

/** Closes a notice as sent, or as dropped with the reason. */
export async function closeNotice(
  tx: Tx,
  noticeId: string,
  outcome: 'sent' | 'dropped',
  why = '',
): Promise<void> {
  await tx.raw('select close_notice(?, ?, ?)', [noticeId, outcome, why]);
}
