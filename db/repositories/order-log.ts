import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';
import type { OrderSet } from '@/lib/domain/orders/changes';
import type { OrderEvent } from '@/lib/domain/orders/deed';
import type { Facts, Side } from '@/lib/domain/orders/facts';
import type { Did } from '@/lib/domain/orders/fold';
import { nextLeg } from '@/lib/domain/orders/legs';
import type { Stand } from '@/lib/domain/orders/stand';

interface Logged {
  readonly tx: Tx;
  readonly actor: Actor;
  readonly side: Side;
  readonly now: string;
}

/** Adds events to the order's log, numbered on; what was done goes with the first. Answers the row id of the first. */
export async function writeEvents(
  { tx, actor, side, now }: Logged,
  order: { readonly id: string; readonly logSeq: number },
  events: readonly OrderEvent[],
  did: Did = {},
): Promise<number> {
  const rows = await tx('events').insert(
    events.map(({ type, payload }, index) => ({
      ...{
        order_id: order.id,
        shop_id: actor.shopId,
        seq: order.logSeq + 1 + index,
        type,
        payload: JSON.stringify(payload),
        did: JSON.stringify(index === 0 ? did : {}),
      },
      ...{ person_id: actor.personId, author_name: actor.personName, side, occurred_at: now },
    })),
    ['id'],
  );
  return (rows[0] as { id: number }).id;
}

/** Writes the order's own columns and everything derived, once. */
export async function writeOrder(
  { tx, now }: Logged,
  before: Facts,
  after: { readonly facts: Facts; readonly stand: Stand; readonly set: OrderSet; readonly events: number },
): Promise<void> {
  const { facts, stand, set } = after;
  await tx('orders')
    .where({ id: before.id, version: before.version })
    .update({
      ...columnsOf(set),
      ...{ status: facts.status, round: facts.round, latest_rev: facts.latestRev },
      ...{
        price_punch: stand.punches.price,
        parts_punch: stand.punches.parts,
        sizes_punch: stand.punches.sizes,
      },
      ...{
        stopped: stand.stopped,
        clear: stand.clear,
        sender_step: stand.senderStep,
        partner_step: stand.partnerStep,
      },
      ...{ clock: stand.clock, version: before.version + 1, log_seq: before.logSeq + after.events },
      ...(stand.clock === before.clock ? {} : { clock_since: now }),
    });
}

/** Ends the running clock leg and begins the next when the clock changes hands. */
export async function turnClock(
  { tx, now }: Logged,
  before: Facts,
  facts: Facts,
  stand: Stand,
): Promise<void> {
  const leg = nextLeg(before, facts, stand);
  if (leg === undefined) return;
  await tx.raw(
    `with ended as (update clock_legs set ended_at = ? where order_id = ? and ended_at is null returning 1)
     insert into clock_legs (order_id, n, round, booked_to, calendar_shop_id, started_at, started_seq)
     select ?, 1 + coalesce((select max(n) from clock_legs where order_id = ?), 0), ?, ?, ?, ?, ?
     from (select count(*) from ended) as one where ?`,
    [
      ...[now, before.id, before.id, before.id, facts.round, leg?.bookedTo ?? 'sender'],
      ...[leg?.calendarShopId ?? facts.sender.shopId, now, before.logSeq + 1, leg !== null],
    ],
  );
}

function columnsOf(set: OrderSet): Record<string, unknown> {
  const columns: Record<string, unknown> = {
    promised_on: set.promisedOn,
    first_promised_on: set.firstPromisedOn,
    promise_days: set.promiseDays,
    needed_back_on: set.neededBackOn,
    notes: set.notes,
    standing_instruction: set.standingInstruction,
    sent_at: set.sentAt,
    agreed_at: set.agreedAt,
    ended_at: set.endedAt,
  };
  return Object.fromEntries(Object.entries(columns).filter(([, value]) => value !== undefined));
}
