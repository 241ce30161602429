import { setClock } from '@/lib/adapters/clock';
import { type Cast, demoId, type Player } from '@/lib/demo/cast';
import { nextDay, weekdayOf } from '@/lib/domain/calendar/calendar';
import { CATALOGUE_VERSION } from '@/lib/domain/operations/catalogue';
import type { Command, ReleasedLine } from '@/lib/domain/orders/commands';
import { releasedLine } from '@/lib/domain/sizes/release';
import type { Made } from '@/lib/domain/builds/made';
import type { Raw } from '@/lib/domain/operations/fill';
import { addPart } from '@/lib/services/builds';
import { runOrderCommand } from '@/lib/services/order-commands';
import { createDraft } from '@/lib/services/order-drafts';
import { postReadings } from '@/lib/services/readings';
import { readingSchema } from '@/lib/schemas/readings';

/** One order of the scenario, moved on command by command at given moments. */
export interface StagedOrder {
  readonly name: string;
  readonly orderId: string;
  readonly partId: string;
  readonly stamp: string;
  readonly lineIds: readonly string[];
  readonly sender: Player;
  readonly partner: Player;
  readonly made: Made;
  readonly cast: Cast;
}

interface NewOrder {
  readonly name: string;
  readonly cast: Cast;
  readonly to: 'grinding' | 'boring' | 'rods';
  readonly build: { readonly id: string; readonly made: Made };
  readonly kind: 'crankshaft' | 'block' | 'rods' | 'pistons' | 'other part';
  readonly operations: readonly string[];
  readonly neededBackOn?: string;
  readonly at: Date;
}

/** Lets it be a moment of a working day: `days` working days from the first, at an hour. */
export function moment(first: string, days: number, hour: number, minute = 0): Date {
  let day = first;
  for (let left = days; left > 0;) {
    day = nextDay(day);
    if (weekdayOf(day) <= 5) left -= 1;
  }
  while (weekdayOf(day) > 5) day = nextDay(day);
  return new Date(`${day}T${String(hour).padStart(2, '0')}:${String(minute).padStart(2, '0')}:00Z`);
}

function player(cast: Cast, key: string): Player {
  const found = cast[key];
  if (!found) throw new Error(`Nobody is ${key}`);
  return found;
}

/** Writes a part down and opens a draft for it. */
export async function openOrder(order: NewOrder): Promise<StagedOrder> {
  const { name, cast, to, build, kind, operations, at } = order;
  setClock(at);
  const sender = player(cast, 'works-bench');
  const partner = player(cast, `${to}-bench`);
  const stamp = `H${String((Number.parseInt(demoId(name).slice(0, 4), 16) % 900) + 100)}`;
  const part = await addPart(
    sender,
    demoId(`part key ${name}`),
    { ...{ buildId: build.id, kind, makerNo: '', stamps: [stamp], pieces: 1, condition: '' } },
    demoId(`part ${name}`),
  );
  const lineIds = operations.map((operation) => demoId(`line ${name} ${operation}`));
  const draft = {
    ...{ partnerShopId: player(cast, `${to}-owner`).shopId, partIds: [part.id], operations: [...operations] },
    ...{
      neededBackOn: order.neededBackOn ?? null,
      transport: 'delivered' as const,
      acceptRule: 'own_check' as const,
    },
    ...{ notes: '', standingInstruction: 'If it will not clean up, stop and ring.', reference: '' },
  };
  const { id } = await createDraft(sender, demoId(`draft ${name}`), draft, {
    orderId: demoId(`order ${name}`),
    lineIds,
  });
  return { name, orderId: id, partId: part.id, stamp, lineIds, sender, partner, cast, made: build.made };
}

/** Does one command of the scenario at its moment; counter people price, bench people cut. */
export async function play(
  order: StagedOrder,
  side: 'sender' | 'partner',
  at: Date,
  command: Command,
): Promise<void> {
  setClock(at);
  const { cast } = order;
  const shop =
    Object.entries(cast)
      .find(([, one]) => one.personId === order[side].personId)?.[0]
      .split('-')[0] ?? '';
  const ticket = player(cast, `${shop}-owner`);
  const known = NEEDS_OWNER.has(command.do) ? ticket : order[side];
  const requestKey = demoId(`${order.name} ${command.do} ${at.toISOString()}`);
  await runOrderCommand(known, { orderId: order.orderId, expectedVersion: null, requestKey, command });
}

const NEEDS_OWNER = new Set<Command['do']>([
  'quote',
  'agree',
  'ask',
  'turn_down',
  'decline',
  'settle',
  'answer_settlement',
  'move_promise',
]);

/** A price with a promise in working days. */
export function priced(order: StagedOrder, each: number, days = 6): Command {
  return {
    ...{
      do: 'quote',
      kind: 'work',
      lines: order.lineIds.map((lineId) => ({ lineId, amountMinor: each })),
      extras: [],
      taxMinor: 0,
    },
    ...{ promisedOn: null, promiseDays: days, validUntil: null, note: '' },
  };
}

/** The whole part handed on. */
export function handed(
  order: StagedOrder,
  kind: 'sent' | 'checked_in' | 'sent_back' | 'received',
  at: Date,
  kit: readonly string[] = [],
): Command {
  const part = {
    id: demoId(`${order.name} ${kind} ${at.toISOString()}`),
    partId: order.partId,
    pieces: 1,
    stamps: [order.stamp],
    kit,
    carrier: 'our van',
    condition: '',
    replacesId: null,
  };
  return { do: 'move_parts', kind, parts: [part], occurredAt: at.toISOString() };
}

/** A filled sheet as it is released. */
export function sheet(order: StagedOrder, line: number, operation: string, raw: Raw): ReleasedLine {
  const released = releasedLine(
    order.lineIds[line] ?? '',
    { operation, raw },
    { made: order.made, unit: 'in' },
  );
  if (!released)
    throw new Error(`The sheet of ${order.name} does not work out (catalogue ${CATALOGUE_VERSION})`);
  return released;
}

/** The sizes of a rev keyed back as they are. */
export function keyedBack(order: StagedOrder, rev: number, lines: readonly ReleasedLine[]): Command {
  const sizes = lines.flatMap((line) => {
    const distinct = new Map(line.sizes.map((size) => [size.what, size]));
    return [...distinct.values()].map((size) => ({
      ...{
        id: demoId(`${order.name} keyed ${rev} ${size.what}`),
        lineId: line.lineId,
        what: size.what,
        lower: size.lower,
        upper: size.upper,
      },
      ...{ lowerText: String(size.lower), upperText: String(size.upper), unit: 'in' as const },
    }));
  });
  return { do: 'repeat_back', rev, sizes };
}

interface Taken {
  readonly line: number;
  readonly feature: string;
  readonly position: string;
  readonly text: string;
}

/** Posts readings of finished features. */
export async function measured(
  order: StagedOrder,
  side: 'sender' | 'partner',
  at: Date,
  readings: readonly Taken[],
): Promise<void> {
  setClock(at);
  const inputs = readings.map(({ line, feature, position, text }) =>
    readingSchema.parse({
      ...{
        id: demoId(`${order.name} ${side} ${line} ${feature} ${position} ${at.toISOString()}`),
        lineId: order.lineIds[line],
        feature,
        position,
      },
      ...{ unit: 'in', stage: 'finished', text, takenAt: at.toISOString() },
    }),
  );
  await postReadings(order[side], order.orderId, inputs);
}
