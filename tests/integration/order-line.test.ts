import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { runOrderCommand } from '@/lib/services/order-commands';
import { readingsSchema } from '@/lib/schemas/readings';
import { postReadings } from '@/lib/services/readings';
import { checkLogs } from '@/lib/services/log-check';
import { readAsSuperuser, ownDatabase } from '../support/database';
import {
  buildDraft,
  fullOrder,
  handOver,
  keyBack,
  makeClear,
  press,
  price,
  rodSizes,
  type TestOrder,
} from '../support/orders';
import { buildShop } from '../support/shops';
import { inches } from '../support/worksheet';

const database = ownDatabase();

interface OrderState {
  status: string;
  price_punch: string;
  parts_punch: string;
  sizes_punch: string;
  clear: boolean;
  stopped: boolean;
  clock: string;
  sender_step: string | null;
  partner_step: string | null;
}

async function stateOf(order: TestOrder): Promise<OrderState> {
  const [row] = await readAsSuperuser<OrderState>(
    database.superuserUrl(),
    'select * from orders where id = $1',
    [order.id],
  );
  if (!row) throw new Error('The order is gone');
  return row;
}

describe('a whole work order', () => {
  it('goes from draft to closed, with whose move it is at every step', async () => {
    const order = await buildDraft();
    const [crack = '', rods = ''] = order.lineIds;
    expect(await stateOf(order)).toMatchObject({
      status: 'draft',
      clock: 'none',
      sender_step: 'Finish and send',
    });
    await order.act('sender', { do: 'send' });
    expect(await stateOf(order)).toMatchObject({
      status: 'sent',
      clock: 'partner',
      partner_step: 'Name a price',
    });
    await order.act('partner', price(order.lineIds));
    expect(await stateOf(order)).toMatchObject({
      status: 'quoted',
      clock: 'sender',
      sender_step: 'Answer the price',
    });
    await order.act('sender', { do: 'agree', revision: 1 });
    expect(await stateOf(order)).toMatchObject({
      status: 'agreed',
      price_punch: 'met',
      clock: 'sender',
      sender_step: 'Send the parts',
    });
    await order.act('sender', handOver('sent', order.partId));
    expect(await stateOf(order)).toMatchObject({
      sender_step: 'Work out the sizes',
      partner_step: 'Check in the parts',
    });
    await order.act('partner', handOver('checked_in', order.partId));
    expect(await stateOf(order)).toMatchObject({ parts_punch: 'met', sizes_punch: 'unmet', clear: false });
    // A crack test takes off no sized metal: it need not wait for the sizes.
    await order.act('partner', { do: 'start', lineId: crack });
    expect(await stateOf(order)).toMatchObject({ status: 'cutting' });
    await order.act('sender', { do: 'release', lines: [rodSizes(rods)], reason: '' });
    expect(await stateOf(order)).toMatchObject({ clock: 'partner', partner_step: 'Repeat the sizes back' });
    await order.act('partner', keyBack(rods, 1));
    expect(await stateOf(order)).toMatchObject({ sizes_punch: 'met', clear: true });
    await order.act('partner', { do: 'start', lineId: rods });
    await order.act('partner', {
      do: 'report',
      unread: [{ lineId: rods, reason: 'readings follow on paper' }],
    });
    expect(await stateOf(order)).toMatchObject({
      status: 'reported',
      clock: 'partner',
      partner_step: 'Send the parts back',
    });
    await order.act('partner', handOver('sent_back', order.partId));
    expect(await stateOf(order)).toMatchObject({ clock: 'road', sender_step: 'Receive the parts' });
    await order.act('sender', handOver('received', order.partId));
    expect(await stateOf(order)).toMatchObject({ clock: 'sender', sender_step: 'Check and decide' });
    const decisions = order.lineIds.map((lineId) => ({
      lineId,
      decision: 'accept' as const,
      reason: '',
      features: [],
    }));
    await order.act('sender', { do: 'decide', decisions });
    expect(await stateOf(order)).toMatchObject({
      status: 'closed',
      clock: 'none',
      sender_step: null,
      partner_step: null,
    });
  });

  it('keeps a log without gaps, clock legs without gaps, and one row a side', async () => {
    const order = await buildDraft();
    await makeClear(order);
    const url = database.superuserUrl();
    const events = await readAsSuperuser<{ seq: number }>(
      url,
      'select seq from events where order_id = $1 order by seq',
      [order.id],
    );
    expect(events.map(({ seq }) => seq)).toEqual(events.map((_event, index) => index + 1));
    const legs = await readAsSuperuser<{ started_at: Date; ended_at: Date | null }>(
      url,
      'select * from clock_legs where order_id = $1 order by n',
      [order.id],
    );
    expect(legs.length).toBeGreaterThan(2);
    expect(legs.slice(1).map((leg) => leg.started_at)).toEqual(legs.slice(0, -1).map((leg) => leg.ended_at));
    expect(
      await readAsSuperuser(url, 'select 1 from order_sides where order_id = $1', [order.id]),
    ).toHaveLength(2);
    const feed = await readAsSuperuser<{ seq: number }>(
      url,
      'select seq from feed where shop_id = $1 order by seq',
      [order.partner.shopId],
    );
    expect(feed.map(({ seq }) => seq)).toEqual(feed.map((_row, index) => index + 1));
  });
});

describe('readings', () => {
  it('keep the part’s temperature as typed and as read, the instrument, and a gauge that had moved, each once', async () => {
    const order = await buildDraft();
    await makeClear(order);
    const rods = order.lineIds[1] ?? '';
    const reading = {
      ...{ id: randomUUID(), lineId: rods, feature: '1', position: 'A', unit: 'in', stage: 'finished' },
      ...{ text: '2 tenths', setToText: '1.8850', side: 'smaller', instrument: 'bench comparator' },
      ...{ temperature: '70', takenAt: new Date().toISOString() },
    };
    const batch = (more: object) =>
      readingsSchema.safeParse({
        readings: [reading],
        afterwards: { side: 'bigger', text: '1 tenth' },
        ...more,
      });
    const parsed = batch({}).data;
    if (!parsed) throw new Error('The batch was refused');
    const post = () => postReadings(order.partner.owner, order.id, parsed.readings, parsed.marks);
    expect(await post()).toEqual({ kept: [reading.id] });
    expect(await post()).toEqual({ kept: [] });
    expect(
      await readAsSuperuser(
        database.superuserUrl(),
        'select part_temperature_text, part_mc, instrument_words, marks, size_nm from readings where order_id = $1',
        [order.id],
      ),
    ).toEqual([
      {
        ...{ part_temperature_text: '70', part_mc: 21_111, instrument_words: 'bench comparator' },
        ...{ marks: ['gauge 1 tenth bigger afterwards'], size_nm: inches('1.8848') },
      },
    ]);
    const refused = (more: object) => batch(more).error?.issues.map(({ path }) => path.join('.'));
    expect(refused({ readings: [{ ...reading, temperature: 'warm' }] })).toEqual(['readings.0.temperature']);
    expect(refused({ afterwards: { side: 'smaller', text: '' } })).toEqual(['afterwards.text']);
    expect(refused({ readings: [{ ...reading, text: '-2 tenths' }] })).toEqual(['readings.0.text']);
  });
});

describe('the log alone', () => {
  it('rebuilds status, punches, whose move, clock and legs of every order, and a row changed by hand is found', async () => {
    const shops = await buildDraft();
    await makeClear(shops);
    const whole = await fullOrder(shops);
    const ended = await buildDraft(undefined, shops);
    await ended.act('sender', { do: 'send' });
    await ended.act('partner', { do: 'decline', reason: 'no room' });
    const stopped = await buildDraft(undefined, shops);
    await makeClear(stopped);
    const rods = stopped.lineIds[1] ?? '';
    await stopped.act('partner', { do: 'start', lineId: rods });
    const lines = [rodSizes(rods, '1.8847', '1.8842')];
    await stopped.act('sender', { do: 'release', lines, reason: 'measured again' });
    expect(await checkLogs(shops.sender.owner)).toEqual({ checked: 4, older: 0, differences: [] });
    expect(await checkLogs(shops.partner.owner)).toEqual({ checked: 0, older: 0, differences: [] });
    await readAsSuperuser(database.superuserUrl(), `update orders set clock = 'road' where id = $1`, [
      whole.id,
    ]);
    expect(await checkLogs(shops.sender.owner)).toEqual({
      checked: 4,
      older: 0,
      differences: [{ orderId: whole.id, about: ['clock'] }],
    });
  });
});

describe('sizes changed while cutting', () => {
  let order: TestOrder;
  let rods: string;
  beforeAll(async () => {
    order = await buildDraft();
    rods = order.lineIds[1] ?? '';
    await makeClear(order);
    await order.act('partner', { do: 'start', lineId: rods });
  });

  // Job 11 of tests/reference/data/jobs.md.
  it('stops the line, refuses the old number, and goes on with the new one', async () => {
    await order.act('sender', {
      do: 'release',
      lines: [rodSizes(rods, '1.8847', '1.8842')],
      reason: 'rod 4 measured loose',
    });
    expect(await stateOf(order)).toMatchObject({
      stopped: true,
      sizes_punch: 'unmet',
      clear: false,
      partner_step: 'Say what is already cut',
    });
    const unit = 2540;
    const cut = ['1', '2', '3', '4', '5', '6'].map((feature) => ({
      lineId: rods,
      feature,
      size: null,
      text: '',
    }));
    await expect(order.act('partner', { do: 'answer_stop', cut: cut.slice(1) })).rejects.toMatchObject({
      code: 'invalid',
    });
    await order.act('partner', {
      do: 'answer_stop',
      cut: cut.map((said) =>
        said.feature === '3' ? { ...said, size: (18_856 * unit) as never, text: '1.8856' } : said,
      ),
    });
    const refused = await order.act('partner', keyBack(rods, 2, '1.8850', '1.8845'));
    expect(refused.matches).toBe(false);
    expect(await stateOf(order)).toMatchObject({ sizes_punch: 'unmet' });
    await expect(order.act('partner', keyBack(rods, 1))).rejects.toThrow('Rev 2 has replaced rev 1');
    const equal = await order.act('partner', keyBack(rods, 2, '1.8847', '1.8842'));
    expect(equal.matches).toBe(true);
    expect(await stateOf(order)).toMatchObject({ sizes_punch: 'met', stopped: false, clear: true });
  });

  it('keeps rev 1 as it was', async () => {
    const rows = await readAsSuperuser<{ rev: number; upper_nm: string }>(
      database.superuserUrl(),
      'select distinct rev, upper_nm from rev_sizes where order_id = $1 order by rev',
      [order.id],
    );
    expect(rows.map(({ rev, upper_nm }) => [rev, Number(upper_nm)])).toEqual([
      [1, 47_879_000],
      [2, 47_871_380],
    ]);
    await expect(
      readAsSuperuser(database.superuserUrl(), 'delete from revs where order_id = $1', [order.id]),
    ).rejects.toThrow('append-only');
  });
});

describe('who may do what', () => {
  it('shows a partner nothing of a draft, and a stranger nothing at all', async () => {
    const order = await buildDraft();
    const stranger = await buildShop('Strangers');
    await expect(press(order.partner.owner, order.id, price(order.lineIds))).rejects.toMatchObject({
      code: 'not_found',
    });
    await expect(press(stranger.owner, order.id, { do: 'send' })).rejects.toMatchObject({
      code: 'not_found',
    });
  });

  it('does one press once, however often it is sent', async () => {
    const order = await buildDraft();
    const input = {
      orderId: order.id,
      expectedVersion: 1,
      requestKey: randomUUID(),
      command: { do: 'send' as const },
    };
    const first = await runOrderCommand(order.sender.owner, input);
    expect(await runOrderCommand(order.sender.owner, input)).toEqual(first);
    expect(
      await readAsSuperuser(database.superuserUrl(), 'select 1 from events where order_id = $1', [order.id]),
    ).toHaveLength(1);
  });

  it('refuses a version that is no longer the one seen', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    const stale = {
      orderId: order.id,
      expectedVersion: 1,
      requestKey: randomUUID(),
      command: price(order.lineIds),
    };
    await expect(runOrderCommand(order.partner.owner, stale)).rejects.toMatchObject({
      code: 'stale',
      current: { version: 2 },
    });
  });

  it('lets one of fifty win who agree and decline at the same moment', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    await order.act('partner', price(order.lineIds));
    const presses = Array.from({ length: 50 }, (_press, index) =>
      index % 2 === 0
        ? order.act('sender', { do: 'agree', revision: 1 })
        : order.act('partner', { do: 'decline', reason: 'no room' }),
    );
    const outcomes = await Promise.allSettled(presses);
    expect(outcomes.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
  });
});
