import { can } from '@/lib/domain/actor';
import { applyChanges, type Change } from '@/lib/domain/orders/changes';
import type { Command, CommandKind } from '@/lib/domain/orders/commands';
import type { Asking, DeedResult, Deeds, OrderEvent, Refusal } from '@/lib/domain/orders/deed';
import { CUTTING_DEEDS } from '@/lib/domain/orders/deeds/cutting';
import { PARTS_DEEDS } from '@/lib/domain/orders/deeds/parts';
import { PRICE_DEEDS } from '@/lib/domain/orders/deeds/price';
import { SIZES_DEEDS } from '@/lib/domain/orders/deeds/sizes';
import { SNAG_DEEDS } from '@/lib/domain/orders/deeds/snags';
import type { Facts } from '@/lib/domain/orders/facts';
import { piecesAway } from '@/lib/domain/orders/pieces';
import { ORDER_RULES, type OrderRule } from '@/lib/domain/orders/rules';
import { type Stand, stand } from '@/lib/domain/orders/stand';
import { fail, ok, type Result } from '@/lib/domain/result';

/** A decided command: everything to write, what follows from it, and where the order stands then. */
export interface Decision {
  readonly changes: readonly Change[];
  readonly events: readonly OrderEvent[];
  readonly facts: Facts;
  readonly stand: Stand;
}

const DEEDS: Deeds<CommandKind> = {
  ...PRICE_DEEDS,
  ...SIZES_DEEDS,
  ...PARTS_DEEDS,
  ...CUTTING_DEEDS,
  ...SNAG_DEEDS,
};

/** Decides a command, or says why not. Reads no clock and no database. */
export function decide(facts: Facts, command: Command, asking: Asking): Result<Decision, Refusal> {
  const barred = isBarred(facts, command.do, asking);
  if (barred) return fail(barred);
  const deed = DEEDS[command.do] as (facts: Facts, command: Command, asking: Asking) => DeedResult;
  const done = deed(facts, command, asking);
  if (!done.ok) return done;
  const changes = [...done.value.changes];
  let next = applyChanges(facts, changes);
  for (const follow of followUps(next, asking)) {
    changes.push(follow);
    next = applyChanges(next, [follow]);
  }
  const after = stand(next);
  next = { ...next, punches: after.punches, clock: after.clock };
  return ok({
    changes,
    events: [{ type: `order.${command.do}`, payload: done.value.note ?? {} }, ...(done.value.also ?? [])],
    facts: next,
    stand: after,
  });
}

/** What a person may do now; screens show exactly these. */
export function allowedCommands(
  facts: Facts,
  asking: Pick<Asking, 'actor' | 'side'>,
): readonly CommandKind[] {
  return (Object.keys(ORDER_RULES) as CommandKind[]).filter(
    (kind) => kind !== 'expire' && isBarred(facts, kind, asking) === null,
  );
}

function isBarred(
  facts: Facts,
  kind: CommandKind,
  { actor, side }: Pick<Asking, 'actor' | 'side'>,
): Refusal | null {
  const rule: OrderRule = ORDER_RULES[kind];
  if (rule.side !== 'either' && rule.side !== side)
    return { code: 'not_your_move', words: 'This is for the other shop to do.' };
  if (!can(actor, rule.permission))
    return { code: 'not_permitted', words: 'Your role in this shop does not allow it.' };
  if (!rule.from.includes(facts.status))
    return { code: 'wrong_status', words: `The order is ${facts.status} now, so this cannot be done.` };
  return null;
}

/** What follows by itself: a promise counted from clear to cut, and an order that ends when the last piece is home. */
function followUps(facts: Facts, asking: Asking): Change[] {
  return [...promiseFollows(facts, asking), ...endFollows(facts, asking)];
}

function promiseFollows(facts: Facts, { dayAfter }: Asking): Change[] {
  const { promiseDays, promisedOn, status } = facts;
  if (promiseDays === null || promisedOn !== null || status !== 'agreed' || !stand(facts).clear) return [];
  const day = dayAfter(promiseDays);
  return [{ row: 'order', set: { promisedOn: day, firstPromisedOn: facts.firstPromisedOn ?? day } }];
}

function endFollows(facts: Facts, { now }: Asking): Change[] {
  const away = piecesAway(facts);
  const allHome = away.partner + away.road + away.out === 0;
  if (['accepted', 'rejected'].includes(facts.status)) {
    return allHome ? [{ row: 'order', set: { status: 'closed', endedAt: now } }] : [];
  }
  if (!['declined', 'withdrawn', 'cancelled'].includes(facts.status)) return [];
  const settled = facts.status !== 'cancelled' || stand(facts).clock === 'none';
  return [{ row: 'order', set: { endedAt: allHome && settled ? now : null } }];
}
