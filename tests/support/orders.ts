import { randomUUID } from 'node:crypto';
import type { Ticket } from '@/lib/domain/actor';
import { CATALOGUE_VERSION } from '@/lib/domain/operations/catalogue';
import type { Command, ReleasedLine } from '@/lib/domain/orders/commands';
import { findPreset } from '@/lib/domain/builds/presets';
import { addPart, createBuild } from '@/lib/services/builds';
import { writeMessage } from '@/lib/services/messages';
import { runOrderCommand, type OrderCommandAnswer } from '@/lib/services/order-commands';
import { createDraft } from '@/lib/services/order-drafts';
import { postReadings } from '@/lib/services/readings';
import { buildPartner, buildShop, type TestShop } from './shops';
import { inches } from './worksheet';

/** A draft order of a crankshaft between two shops, with what tests need to move it on. */
export interface TestOrder {
  readonly id: string;
  readonly partId: string;
  readonly lineIds: readonly string[];
  readonly sender: TestShop;
  readonly partner: TestShop;
  /** Does a command as a side's owner, whatever the version is. */
  readonly act: (side: 'sender' | 'partner', command: Command) => Promise<OrderCommandAnswer>;
}

/** Does a command with a key of its own. */
export function press(ticket: Ticket, orderId: string, command: Command): Promise<OrderCommandAnswer> {
  return runOrderCommand(ticket, { orderId, expectedVersion: null, requestKey: randomUUID(), command });
}

/** Makes shops, a build, a crankshaft and a draft; everything through the services. */
export async function buildDraft(
  operations: readonly string[] = ['crack_test', 'grind_rods'],
  shops?: { sender: TestShop; partner: TestShop },
): Promise<TestOrder> {
  const sender = shops?.sender ?? (await buildShop());
  const partner = shops?.partner ?? (await buildPartner(sender));
  const made = findPreset('inline6');
  if (!made) throw new Error('No inline six');
  const build = await createBuild(sender.owner, randomUUID(), {
    engine: 'Marrick 215 six',
    preset: made,
    customerName: 'A. Customer',
    notes: '',
    neededOn: null,
  });
  const part = await addPart(sender.owner, randomUUID(), {
    ...{ buildId: build.id, kind: 'crankshaft', makerNo: 'M215', stamps: ['F318'], pieces: 1, condition: '' },
  });
  const lineIds = operations.map(() => randomUUID());
  const draft = await createDraft(
    sender.owner,
    randomUUID(),
    {
      ...{
        partnerShopId: partner.shopId,
        partIds: [part.id],
        operations: [...operations],
        neededBackOn: null,
      },
      ...{
        transport: 'delivered',
        acceptRule: 'own_check',
        notes: '',
        standingInstruction: '',
        reference: '',
      },
    },
    { lineIds },
  );
  const tickets = { sender: sender.owner, partner: partner.owner };
  return {
    id: draft.id,
    partId: part.id,
    lineIds,
    sender,
    partner,
    act: (side, command) => press(tickets[side], draft.id, command),
  };
}

/** Rods of an inline six to one size, as a released line. */
export function rodSizes(lineId: string, upper = '1.8850', lower = '1.8845'): ReleasedLine {
  const limits = { target: inches(upper), lower: inches(lower), upper: inches(upper) };
  return {
    ...{
      lineId,
      source: 'measured',
      catalogueVersion: CATALOGUE_VERSION,
      inputs: {},
      steps: [],
      checks: [],
      typedReason: '',
      refused: false,
    },
    sizes: ['1', '2', '3', '4', '5', '6'].map((feature) => ({
      feature,
      what: 'Rods',
      cutting: 'smaller',
      derived: limits.upper,
      ...limits,
    })),
  };
}

/** A price with a promise in working days. */
export function price(lines: readonly string[], amountMinor = 24_000): Command {
  return {
    ...{
      do: 'quote',
      kind: 'work',
      lines: lines.map((lineId) => ({ lineId, amountMinor })),
      extras: [],
      taxMinor: 0,
    },
    ...{ promisedOn: null, promiseDays: 6, validUntil: null, note: '' },
  };
}

/** One part handed on whole. */
export function handOver(
  kind: 'sent' | 'checked_in' | 'sent_back' | 'received',
  partId: string,
  stamps: readonly string[] = ['F318'],
): Command {
  const part = {
    id: randomUUID(),
    partId,
    pieces: stamps.length,
    stamps,
    kit: [],
    carrier: 'our van',
    condition: '',
    replacesId: null,
  };
  return { do: 'move_parts', kind, parts: [part], occurredAt: new Date().toISOString() };
}

/** Repeats the rods back. */
export function keyBack(lineId: string, rev: number, upper = '1.8850', lower = '1.8845'): Command {
  const keyed = {
    lower: inches(lower),
    upper: inches(upper),
    lowerText: lower,
    upperText: upper,
    unit: 'in' as const,
  };
  return { do: 'repeat_back', rev, sizes: [{ id: randomUUID(), lineId, what: 'Rods', ...keyed }] };
}

/** Brings a draft of crack test and rods to where both lines are clear to cut. */
export async function makeClear(order: TestOrder): Promise<void> {
  const rods = order.lineIds[1] ?? '';
  await order.act('sender', { do: 'send' });
  await order.act('partner', price(order.lineIds));
  await order.act('sender', { do: 'agree', revision: 1 });
  await order.act('sender', handOver('sent', order.partId));
  await order.act('partner', handOver('checked_in', order.partId));
  await order.act('sender', { do: 'release', lines: [rodSizes(rods)], reason: '' });
  await order.act('partner', keyBack(rods, 1));
}

/** A finished order with a snag, a hold, a reading, a message and a decision: a row in every table of an order. */
export async function fullOrder(shops?: { sender: TestShop; partner: TestShop }): Promise<TestOrder> {
  const order = await buildDraft(undefined, shops);
  const [crack = '', rods = ''] = order.lineIds;
  await makeClear(order);
  const snagId = randomUUID();
  await order.act('partner', {
    ...{ do: 'raise_snag', id: snagId, lineId: rods, kind: 'crack', words: 'a check by the fillet' },
    ...{ proposal: 'grind it out', priceMinor: 0, days: 0 },
  });
  await order.act('sender', { do: 'approve_snag', snagId, words: 'go on', newSizes: false });
  const holdId = randomUUID();
  await order.act('sender', {
    ...{ do: 'hold', id: holdId, lineId: null, reason: 'other', words: 'wait', waitsFor: 'sender' },
  });
  await order.act('sender', { do: 'lift_hold', holdId });
  for (const [from, to] of [
    ['F318', 'F319'],
    ['F319', 'F318'],
  ] as const)
    await order.act('partner', {
      do: 'restamp',
      id: randomUUID(),
      partId: order.partId,
      from,
      to,
      words: '',
    });
  await order.act('partner', { do: 'start', lineId: crack });
  await order.act('partner', { do: 'start', lineId: rods });
  await postReadings(order.partner.owner, order.id, [
    {
      ...{ id: randomUUID(), lineId: rods, feature: '1', position: 'A', stage: 'finished', unit: 'in' },
      ...{ typedText: '1.8848', comparator: null, size: inches('1.8848'), instrument: '' },
      ...{ partMc: null, temperatureText: '' },
      ...{ takenAt: new Date().toISOString(), replacesId: null },
    },
  ]);
  await writeMessage(order.partner.owner, order.id, { id: randomUUID(), kind: 'message', body: 'on it' });
  await order.act('partner', { do: 'report', unread: [{ lineId: rods, reason: 'on paper' }] });
  await order.act('partner', handOver('sent_back', order.partId));
  await order.act('sender', handOver('received', order.partId));
  await order.act('sender', {
    do: 'decide',
    decisions: order.lineIds.map((lineId) => ({ lineId, decision: 'accept', reason: '', features: [] })),
  });
  return order;
}
