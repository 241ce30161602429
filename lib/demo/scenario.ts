import { setClock } from '@/lib/adapters/clock';
import { type Cast, demoId } from '@/lib/demo/cast';
import {
  handed,
  keyedBack,
  measured,
  moment,
  openOrder,
  play,
  priced,
  sheet,
  type StagedOrder,
} from '@/lib/demo/stage';
import { shiftDay } from '@/lib/domain/calendar/calendar';
import { findPreset } from '@/lib/domain/builds/presets';
import type { Made } from '@/lib/domain/builds/made';
import type { Raw } from '@/lib/domain/operations/fill';
import type { ReleasedLine } from '@/lib/domain/orders/commands';
import { createBuild } from '@/lib/services/builds';
import { writeMessage } from '@/lib/services/messages';

interface DemoBuild {
  readonly id: string;
  readonly made: Made;
}

const ROD_BORES = '2.1172 2.1171 2.1173 2.1172 2.1170 2.1172';
const FOUND = '2.1238 2.1241 2.1236 2.1240 2.1237 2.1239';
const PLACES = ['front, in line', 'front, across', 'rear, in line', 'rear, across'];

function column(name: string, values: string, prefix = ''): Raw {
  return Object.fromEntries(
    values.split(' ').map((value, index) => [`${name}.${prefix}${index + 1}`, value]),
  );
}

function rodSheet(bores = ROD_BORES): Raw {
  return {
    ...column('bores', bores),
    ...column('found', FOUND),
    standardLow: '2.1240',
    standardHigh: '2.1250',
    undersize: '.010',
    least: '.0020',
    most: '.0030',
  };
}

/** Plays the present: builds, and an order in every status, ending around `today`. */
export async function playThePresent(cast: Cast, today: string): Promise<void> {
  const start = shiftDay(today, -21);
  setClock(moment(start, 0, 8));
  const works = cast['works-owner'];
  if (!works) throw new Error('The works are missing');
  const six = await openBuild(works, 'six', 'Marlow 262 six', 'inline6', 'R. Pennant');
  const eight = await openBuild(works, 'eight', 'Aldous 324 V8', 'v8', 'Quarry Boats');
  const four = await openBuild(works, 'four', 'Fenner 98 four', 'inline4', 'S. Oake');
  const at = (days: number, hour: number, minute = 0) => moment(start, days, hour, minute);
  const needed = shiftDay(today, 10);

  await openOrder({
    name: 'a draft',
    cast,
    to: 'grinding',
    build: four,
    kind: 'crankshaft',
    operations: ['polish'],
    at: at(13, 9),
  });

  const sent = await openOrder({
    name: 'sent',
    cast,
    to: 'boring',
    build: four,
    kind: 'block',
    operations: ['hot_wash', 'bore'],
    neededBackOn: needed,
    at: at(12, 9),
  });
  await play(sent, cast, 'sender', at(12, 10), { do: 'send' });

  const quoted = await openOrder({
    name: 'quoted',
    cast,
    to: 'boring',
    build: eight,
    kind: 'block',
    operations: ['bore_hone'],
    neededBackOn: needed,
    at: at(10, 9),
  });
  await play(quoted, cast, 'sender', at(10, 10), { do: 'send' });
  await play(quoted, cast, 'partner', at(12, 11), priced(quoted, 31_000, 8));

  const waiting = await openOrder({
    name: 'waits for sizes',
    cast,
    to: 'grinding',
    build: six,
    kind: 'crankshaft',
    operations: ['crack_test', 'grind_rods', 'grind_mains'],
    neededBackOn: shiftDay(today, 6),
    at: at(7, 9),
  });
  await agreedAndThere(waiting, cast, at);
  await play(waiting, cast, 'partner', at(9, 13), { do: 'start', lineId: waiting.lineIds[0] ?? '' });

  const cutting = await openOrder({
    name: 'being cut',
    cast,
    to: 'grinding',
    build: six,
    kind: 'crankshaft',
    operations: ['grind_rods'],
    neededBackOn: shiftDay(today, 4),
    at: at(7, 9),
  });
  await agreedAndThere(cutting, cast, at);
  const first = await releasedAndKeyed(
    cutting,
    cast,
    at,
    rodSheet('2.1172 2.1171 2.1173 2.1172 2.1166 2.1172'),
  );
  await writeMessage(cutting.partner, cutting.orderId, {
    id: demoId('message 1'),
    kind: 'message',
    body: 'Number 4 main has a score I can feel. It cleans up at .010 but only just.',
  });
  await writeMessage(cutting.sender, cutting.orderId, {
    id: demoId('message 2'),
    kind: 'message',
    body: 'Go ahead at .010. If it is not clean, stop and tell us here.',
  });
  await play(cutting, cast, 'partner', at(10, 10), { do: 'start', lineId: cutting.lineIds[0] ?? '' });
  const second = [sheet(cutting, 0, 'grind_rods', rodSheet())];
  await play(cutting, cast, 'sender', at(10, 11), {
    do: 'release',
    lines: second,
    reason: 'The cap bolts on rod 5 were pulled dry.',
  });
  const nothingCut = first.flatMap((line) =>
    line.sizes.map(({ feature }) => ({ lineId: line.lineId, feature, size: null, text: '' })),
  );
  await play(cutting, cast, 'partner', at(10, 12), { do: 'answer_stop', cut: nothingCut });
  await play(cutting, cast, 'partner', at(10, 13), keyedBack(cutting, 2, second));
  await measured(
    cutting,
    'partner',
    at(12, 9),
    rodReadings(['2.1149', '2.1148', '2.1150', '2.1152', '2.1147']),
  );
  await measured(
    cutting,
    'sender',
    at(12, 10),
    rodReadings(['2.1148', '2.1147', '2.1149']).filter(({ position }) => position === 'front, in line'),
  );

  const snag = await openOrder({
    name: 'snag',
    cast,
    to: 'grinding',
    build: six,
    kind: 'crankshaft',
    operations: ['grind_rods'],
    neededBackOn: shiftDay(today, 7),
    at: at(7, 9),
  });
  await agreedAndThere(snag, cast, at);
  await releasedAndKeyed(snag, cast, at, rodSheet());
  await play(snag, cast, 'partner', at(11, 9), { do: 'start', lineId: snag.lineIds[0] ?? '' });
  await play(snag, cast, 'partner', at(12, 14), {
    do: 'raise_snag',
    id: demoId('snag'),
    lineId: null,
    kind: 'will not clean up',
    words: 'Journal 3 is pitted below .010',
    proposal: 'All six to .020',
    priceMinor: 4500,
    days: 1,
  });

  const reported = await openOrder({
    name: 'reported',
    cast,
    to: 'boring',
    build: eight,
    kind: 'block',
    operations: ['hone'],
    at: at(3, 9),
  });
  await finishedBlock(reported, cast, at, 11);
  await play(reported, cast, 'partner', at(12, 15), handed(reported, 'sent_back', at(12, 15)));

  const rework = await openOrder({
    name: 'second round',
    cast,
    to: 'grinding',
    build: six,
    kind: 'crankshaft',
    operations: ['grind_rods'],
    at: at(2, 9),
  });
  await agreedAndThere(rework, cast, at);
  await releasedAndKeyed(rework, cast, at, rodSheet());
  await play(rework, cast, 'partner', at(10, 9), { do: 'start', lineId: rework.lineIds[0] ?? '' });
  await measured(
    rework,
    'partner',
    at(10, 15),
    rodReadings(['2.1149', '2.1148', '2.1150', '2.1152', '2.1149', '2.1148']),
  );
  await play(rework, cast, 'partner', at(10, 16), { do: 'report', unread: [] });
  await play(rework, cast, 'partner', at(11, 8), handed(rework, 'sent_back', at(11, 8)));
  await play(rework, cast, 'sender', at(11, 12), handed(rework, 'received', at(11, 12)));
  await play(rework, cast, 'sender', at(11, 14), {
    do: 'decide',
    decisions: [
      {
        lineId: rework.lineIds[0] ?? '',
        decision: 'send_back',
        reason: 'Journal 4 still has two tenths to come off.',
        features: ['4'],
      },
    ],
  });

  const held = await openOrder({
    name: 'held',
    cast,
    to: 'rods',
    build: four,
    kind: 'rods',
    operations: ['something_else'],
    at: at(8, 9),
  });
  await play(held, cast, 'sender', at(8, 10), { do: 'send' });
  await play(held, cast, 'partner', at(9, 10), {
    do: 'hold',
    id: demoId('hold'),
    lineId: null,
    reason: 'decision',
    words: 'New bolts or the old ones?',
    waitsFor: 'sender',
  });

  const declined = await openOrder({
    name: 'declined',
    cast,
    to: 'rods',
    build: four,
    kind: 'rods',
    operations: ['crack_test'],
    at: at(4, 9),
  });
  await play(declined, cast, 'sender', at(4, 10), { do: 'send' });
  await play(declined, cast, 'partner', at(5, 10), {
    do: 'decline',
    reason: 'No magnetic bench until January.',
  });

  const withdrawn = await openOrder({
    name: 'withdrawn',
    cast,
    to: 'rods',
    build: four,
    kind: 'other part',
    operations: ['hot_wash'],
    at: at(4, 9),
  });
  await play(withdrawn, cast, 'sender', at(4, 10), { do: 'send' });
  await play(withdrawn, cast, 'sender', at(4, 15), { do: 'withdraw', reason: 'Washed here after all.' });

  const cancelled = await openOrder({
    name: 'cancelled',
    cast,
    to: 'grinding',
    build: six,
    kind: 'crankshaft',
    operations: ['grind_rods'],
    at: at(3, 9),
  });
  await agreedAndThere(cancelled, cast, at);
  await play(cancelled, cast, 'sender', at(10, 9), { do: 'cancel', reason: 'The customer sold the engine.' });
  await play(cancelled, cast, 'partner', at(10, 14), {
    do: 'settle',
    totalMinor: 9000,
    note: 'Wash and crack test',
  });
  setClock();
}

function openBuild(
  works: { personId: string; shopId: string },
  key: string,
  engine: string,
  preset: string,
  customerName: string,
): Promise<DemoBuild> {
  const made = findPreset(preset);
  if (!made) throw new Error(`No preset ${preset}`);
  const input = { engine, preset: made, customerName, notes: '', neededOn: null };
  return createBuild(works, demoId(`build key ${key}`), input, demoId(`build ${key}`)).then(({ id }) => ({
    id,
    made,
  }));
}

type At = (days: number, hour: number, minute?: number) => Date;

async function agreedAndThere(order: StagedOrder, cast: Cast, at: At): Promise<void> {
  await play(order, cast, 'sender', at(7, 10), { do: 'send' });
  await play(order, cast, 'partner', at(8, 9), priced(order, 24_000));
  await play(order, cast, 'sender', at(8, 11), { do: 'agree', revision: 1 });
  await play(order, cast, 'sender', at(8, 15), handed(order, 'sent', at(8, 15)));
  await play(order, cast, 'partner', at(9, 9), handed(order, 'checked_in', at(9, 9)));
}

async function releasedAndKeyed(order: StagedOrder, cast: Cast, at: At, raw: Raw): Promise<ReleasedLine[]> {
  const lines = [sheet(order, 0, 'grind_rods', raw)];
  await play(order, cast, 'sender', at(9, 14), { do: 'release', lines, reason: '' });
  await play(order, cast, 'partner', at(10, 8), keyedBack(order, 1, lines));
  return lines;
}

/** Four places of each journal; the first is the largest. */
function rodReadings(sizes: readonly string[]) {
  return sizes.flatMap((size, index) =>
    PLACES.map((position, place) => ({
      line: 0,
      feature: String(index + 1),
      position,
      text: place === 0 ? size : lessTenth(size),
    })),
  );
}

function lessTenth(size: string): string {
  return (Number(size.replace('.', '')) - 1).toString().replace(/(\d{4})$/, '.$1');
}

async function finishedBlock(order: StagedOrder, cast: Cast, at: At, day: number): Promise<void> {
  const raw = {
    ...column('pistons', '3.9778 3.9780 3.9779 3.9778 3.9780 3.9779 3.9778 3.9780'),
    least: '.0020',
    most: '.0030',
  };
  await play(order, cast, 'sender', at(3, 10), { do: 'send' });
  await play(order, cast, 'partner', at(4, 9), priced(order, 42_000, 7));
  await play(order, cast, 'sender', at(4, 11), { do: 'agree', revision: 1 });
  await play(order, cast, 'sender', at(5, 8), handed(order, 'sent', at(5, 8)));
  await play(
    order,
    cast,
    'partner',
    at(5, 14),
    handed(order, 'checked_in', at(5, 14), ['pistons', 'torque plate gasket']),
  );
  const lines = [sheet(order, 0, 'hone', raw)];
  await play(order, cast, 'sender', at(6, 10), { do: 'release', lines, reason: '' });
  await play(order, cast, 'partner', at(6, 13), keyedBack(order, 1, lines));
  await play(order, cast, 'partner', at(day, 9), { do: 'start', lineId: order.lineIds[0] ?? '' });
  await play(order, cast, 'partner', at(day, 15), {
    do: 'report',
    unread: [{ lineId: order.lineIds[0] ?? '', reason: 'Readings follow with the block, on its card.' }],
  });
}
