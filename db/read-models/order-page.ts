import 'server-only';
import type { Tx } from '@/db/client';
import { findFacts } from '@/db/repositories/order-facts';
import type { Actor } from '@/lib/domain/actor';
import type { Made } from '@/lib/domain/builds/made';
import type { House } from '@/lib/domain/operations/house';
import type { CommandKind } from '@/lib/domain/orders/commands';
import { allowedCommands } from '@/lib/domain/orders/decide';
import type { Facts, Side } from '@/lib/domain/orders/facts';
import { type Stand, stand } from '@/lib/domain/orders/stand';

/** What every page of an order needs. */
export interface OrderView {
  readonly facts: Facts;
  readonly side: Side;
  readonly stand: Stand;
  readonly allowed: readonly CommandKind[];
  readonly title: string;
  readonly engine: string;
  /** How the engine is made, as it was when the order was drafted. */
  readonly made: Made | null;
  /** The sender's own defaults for worksheets. */
  readonly house: House;
  /** Of the sender only. */
  readonly buildNumber: number | null;
  readonly notes: string;
  readonly standingInstruction: string;
  readonly transport: 'delivered' | 'fetched';
  readonly reference: string;
  readonly agreedMinor: number | null;
  readonly revAt: Date | null;
  /** How far the asker has read the thread. */
  readonly seenSeq: number;
  readonly thread: readonly ThreadEntry[];
}

/** A message, or an event of the order between messages. */
export interface ThreadEntry {
  readonly seq: number;
  readonly type: string;
  readonly payload: Readonly<Record<string, unknown>>;
  readonly author: string;
  readonly shopName: string;
  readonly side: Side;
  readonly at: Date;
  readonly body: string | null;
  /** Written by the asker, on whatever screen. */
  readonly isOwn: boolean;
  readonly files: readonly { readonly id: string; readonly name: string; readonly isPicture: boolean }[];
}

interface HeadRow extends Pick<
  OrderView,
  | 'title'
  | 'house'
  | 'made'
  | 'engine'
  | 'buildNumber'
  | 'notes'
  | 'standingInstruction'
  | 'transport'
  | 'reference'
> {
  revAt: Date | null;
  seenSeq: number;
  thread: (Omit<ThreadEntry, 'at'> & { at: string })[];
}

/** Loads an order for its page: two statements. Undefined outside the asker's orders. */
export async function loadOrder(tx: Tx, actor: Actor, orderId: string): Promise<OrderView | undefined> {
  const facts = await findFacts(tx, orderId);
  if (!facts) return undefined;
  const { rows } = await tx.raw<{ rows: HeadRow[] }>(
    `select o.title, o.notes, o.standing_instruction as "standingInstruction", o.transport,
       coalesce((select p.engine from order_parts p where p.order_id = o.id and p.engine <> '' limit 1), '') as engine,
       (select p.made from order_parts p where p.order_id = o.id and p.made is not null limit 1) as made,
       (select json_build_object('unit', coalesce(h.house ->> 'unit', h.unit), 'typed', coalesce(h.house -> 'typed', '{}'::jsonb))
          from shops h where h.id = o.sender_shop_id) as house,
       (select b.number from builds b where b.id = o.build_id) as "buildNumber",
       coalesce((select r.text from order_references r where r.order_id = o.id and r.shop_id = ?), '') as reference,
       (select v.released_at from revs v where v.order_id = o.id and v.number = o.latest_rev) as "revAt",
       coalesce((select r.seen_seq from thread_reads r where r.order_id = o.id and r.person_id = ?), 0) as "seenSeq",
       coalesce((select json_agg(x order by x.seq) from (${THREAD}) x), '[]') as thread
     from orders o where o.id = ?`,
    [actor.shopId, actor.personId, orderId],
  );
  const head = rows[0];
  if (!head) return undefined;
  const side: Side = facts.sender.shopId === actor.shopId ? 'sender' : 'partner';
  const thread = head.thread.map((entry) => ({ ...entry, at: new Date(entry.at) }));
  return {
    ...head,
    ...{ facts, side, thread, stand: stand(facts), allowed: allowedCommands(facts, { actor, side }) },
    agreedMinor:
      facts.quotes.find((quote) => quote.kind === 'work' && quote.state === 'agree')?.totalMinor ?? null,
  };
}

/** The thread and log of an order, its latest 300 entries. */
const THREAD = `select e.seq, e.type, e.payload, e.author_name as author, s.name as "shopName", e.side, e.occurred_at as at, m.body,
    coalesce(e.person_id = app_person(), false) as "isOwn",
    coalesce((select json_agg(json_build_object('id', a.id, 'name', a.name, 'isPicture', a.thumb_key is not null) order by a.at)
      from attachments a where a.order_id = e.order_id and (a.message_id = m.id or a.move_id::text = e.payload ->> 'moveId'
        or a.snag_id::text = e.payload ->> 'snagId' or a.restamp_id::text = e.payload ->> 'restampId')), '[]') as files
  from events e join shops s on s.id = e.shop_id left join messages m on m.event_id = e.id
  where e.order_id = o.id order by e.seq desc limit 300`;

/** Whether an order of this id can be seen. */
export async function isThere(tx: Tx, id: string): Promise<boolean> {
  const row: unknown = await tx('orders').where({ id }).first('id');
  return row !== undefined;
}
