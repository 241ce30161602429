import 'server-only';
import { begin, type Tx } from '@/db/client';
import { loadCalendars } from '@/db/read-models/calendars';
import { type FileOwner, hangFiles } from '@/db/repositories/files';
import { once } from '@/db/repositories/idempotency';
import { putTask, tellShop } from '@/db/repositories/notices';
import { findFacts, lockOrder } from '@/db/repositories/order-facts';
import { turnClock, writeEvents, writeOrder } from '@/db/repositories/order-log';
import { writeChanges } from '@/db/repositories/order-rows';
import { now } from '@/lib/adapters/clock';
import { newId } from '@/lib/adapters/ids';
import type { Actor, Permission, Ticket } from '@/lib/domain/actor';
import { type Calendar, dayAt, workingDayAfter } from '@/lib/domain/calendar/calendar';
import type { Command } from '@/lib/domain/orders/commands';
import { decide, type Decision } from '@/lib/domain/orders/decide';
import type { Facts, Side } from '@/lib/domain/orders/facts';
import { didOf } from '@/lib/domain/orders/fold';
import { ORDER_RULES } from '@/lib/domain/orders/rules';
import { AppError, type ErrorCode } from '@/lib/errors';
import { writeToInvited } from '@/lib/services/invitations';

/** One press of one button on one order. */
export interface OrderCommandInput {
  readonly orderId: string;
  /** The version the person saw; null where nothing seen can be stale, as for a counted hand-over. */
  readonly expectedVersion: number | null;
  readonly requestKey: string;
  readonly command: Command;
  /** Files that go with a hand-over, a snag or a restamped piece. */
  readonly files?: readonly string[];
}

/** What a command answers: enough to show the order again. */
export interface OrderCommandAnswer {
  readonly orderId: string;
  readonly version: number;
  readonly status: Facts['status'];
  /** For repeating back: whether all was equal, and what was keyed beside what was asked. */
  readonly matches?: boolean;
  readonly said?: readonly RepeatedSize[];
}

/** One size as it was keyed, beside the limits that were released. */
export interface RepeatedSize {
  readonly what: string;
  readonly keyed: readonly [lower: string, upper: string];
  readonly asked: readonly [lower: number, upper: number];
  readonly matches: boolean;
}

/**
 * Does one command: lock, compare the version, load the facts, decide, write state, log, clock and notices in one
 * transaction.
 * @throws AppError not_found outside one's orders, stale when somebody changed it first, forbidden, conflict.
 */
export async function runOrderCommand(ticket: Ticket, input: OrderCommandInput): Promise<OrderCommandAnswer> {
  return begin(ticket, (tx, actor) => commandIn(tx, actor, input));
}

/** The same inside a transaction that is open already. */
export async function commandIn(tx: Tx, actor: Actor, input: OrderCommandInput): Promise<OrderCommandAnswer> {
  const asked = {
    key: input.requestKey,
    route: `order.${input.command.do}`,
    input: [input.orderId, input.command],
  };
  return once(tx, actor, asked, async () => {
    const facts = await takeFacts(tx, input.orderId);
    if (input.expectedVersion !== null && input.expectedVersion !== facts.version) {
      throw new AppError(
        'stale',
        'The order was changed in the meantime. Look at what stands now, then press again.',
        {
          current: { version: facts.version, status: facts.status },
        },
      );
    }
    const answer = await carryOut(tx, actor, facts, input.command);
    const owner = fileOwner(facts.id, input.command);
    if (owner) await hangFiles(tx, actor, input.files ?? [], owner);
    return answer;
  });
}

/** The row that a command's files hang on. */
function fileOwner(orderId: string, command: Command): FileOwner | undefined {
  if (command.do === 'move_parts') {
    const moveId = command.parts[0]?.id;
    return moveId === undefined ? undefined : { orderId, moveId };
  }
  if (command.do === 'raise_snag') return { orderId, snagId: command.id };
  return command.do === 'restamp' ? { orderId, restampId: command.id } : undefined;
}

async function takeFacts(tx: Tx, orderId: string): Promise<Facts> {
  const facts = (await lockOrder(tx, orderId)) ? await findFacts(tx, orderId) : undefined;
  if (!facts) throw new AppError('not_found', 'There is no such order.');
  return facts;
}

const REFUSAL_CODES = {
  not_your_move: 'forbidden',
  not_permitted: 'forbidden',
  wrong_status: 'conflict',
  refused: 'invalid',
} as const satisfies Record<string, ErrorCode>;

async function carryOut(tx: Tx, actor: Actor, facts: Facts, command: Command): Promise<OrderCommandAnswer> {
  const side = sideOf(facts, actor);
  const moment = now();
  const calendar = await partnerCalendar(tx, facts);
  const decided = decide(facts, command, {
    actor,
    side,
    now: moment.toISOString(),
    today: dayAt(moment, calendar.timeZone),
    dayAfter: (days) => workingDayAfter(calendar, moment, days),
  });
  if (!decided.ok) throw new AppError(REFUSAL_CODES[decided.problem.code], decided.problem.words);
  await write(tx, { actor, side, facts, command, now: moment.toISOString() }, decided.value);
  const { matches, said } = decided.value.events[0]?.payload ?? {};
  return {
    orderId: facts.id,
    version: facts.version + 1,
    status: decided.value.facts.status,
    ...(typeof matches === 'boolean' ? { matches, said: said as readonly RepeatedSize[] } : {}),
  };
}

interface Doing {
  readonly actor: Actor;
  readonly side: Side;
  readonly facts: Facts;
  readonly command: Command;
  readonly now: string;
}

async function write(tx: Tx, doing: Doing, decision: Decision): Promise<void> {
  const { actor, side, facts } = doing;
  const logged = { tx, actor, side, now: doing.now };
  const writing = {
    tx,
    actor,
    orderId: facts.id,
    round: facts.round,
    unit: facts.sender.unit,
    currency: facts.currency,
    now: doing.now,
    newId,
  };
  // A partner may write rows only once the order has its second side: sending writes the order first.
  const set = await writeChanges(writing, decision.changes);
  await writeOrder(logged, facts, {
    facts: decision.facts,
    stand: decision.stand,
    set,
    events: decision.events.length,
  });
  const did = didOf(doing.command.do === 'send' ? facts : undefined, decision.changes);
  await writeEvents(logged, facts, decision.events, did);
  await turnClock(logged, facts, decision.facts, decision.stand);
  await tell(tx, doing, decision);
  const { partner, id, number, neededBackOn } = decision.facts;
  if (doing.command.do === 'send' && partner) {
    await writeToInvited(tx, actor, partner.shopId, { id, number, neededBackOn });
  }
}

/** The side that has a new step is told; a quote's last day sends a task. */
async function tell(tx: Tx, { side, facts, command }: Doing, decision: Decision): Promise<void> {
  const isSender = side === 'sender';
  const other = isSender ? facts.partner : facts.sender;
  const step = isSender ? decision.stand.partnerStep : decision.stand.senderStep;
  if (other && (step !== null || ALWAYS_TOLD.has(command.do))) {
    const about = {
      shopId: other.shopId,
      orderId: facts.id,
      seq: facts.logSeq + 1,
      kind: `order.${command.do}`,
      step,
    };
    await tellShop(tx, about, permissionFor(step));
  }
  if (command.do === 'quote' && command.validUntil !== null)
    await letItExpire(tx, decision.facts, command.validUntil);
}

async function letItExpire(tx: Tx, facts: Facts, validUntil: string): Promise<void> {
  const revision = facts.quotes.at(-1)?.revision ?? 0;
  const ref = { orderId: facts.id, revision, shopId: facts.partner?.shopId };
  await putTask(tx, 'expire_quote', ref, {
    key: `quote-${facts.id}-${revision}`,
    runAt: `${validUntil}T23:59:59Z`,
  });
}

const ALWAYS_TOLD = new Set<Command['do']>([
  'release',
  'decline',
  'withdraw',
  'cancel',
  'hold',
  'raise_snag',
  'move_promise',
  'repeat_back',
  'decide',
]);

function permissionFor(step: string | null): Permission {
  const rule = Object.values(ORDER_RULES).find((one) => step?.startsWith(one.label));
  return rule?.permission ?? 'message';
}

function sideOf(facts: Facts, actor: Actor): Side {
  return facts.sender.shopId === actor.shopId ? 'sender' : 'partner';
}

async function partnerCalendar(tx: Tx, facts: Facts): Promise<Calendar> {
  const shop = facts.partner ?? facts.sender;
  const calendars = await loadCalendars(tx, [shop.shopId]);
  return calendars.get(shop.shopId) ?? { timeZone: shop.timeZone, hours: [], closedDays: [] };
}
