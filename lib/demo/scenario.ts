import { setClock } from '@/lib/adapters/clock';
import { openBuild } from '@/lib/demo/builds';
import { type Cast, demoId } from '@/lib/demo/cast';
import { handed, keyedBack, measured, moment, openOrder, play, priced, sheet } from '@/lib/demo/stage';
import { playTheEnded } from '@/lib/demo/ended';
import { agreedAndThere, finishedBlock, releasedAndKeyed, rodReadings, rodSheet } from '@/lib/demo/steps';
import { shiftDay } from '@/lib/domain/calendar/calendar';
import { writeMessage } from '@/lib/services/messages';

/** Plays the present: builds, and an order in every status, ending around `today`. */
export async function playThePresent(cast: Cast, today: string): Promise<void> {
  const start = shiftDay(today, -21);
  setClock(moment(start, 0, 8));
  const works = cast['works-owner'];
  if (!works) throw new Error('The works are missing');
  const six = await openBuild({
    works,
    key: 'six',
    engine: 'Marlow 262 six',
    preset: 'inline6',
    customerName: 'R. Pennant',
  });
  const eight = await openBuild({
    works,
    key: 'eight',
    engine: 'Aldous 324 V8',
    preset: 'v8',
    customerName: 'Quarry Boats',
  });
  const four = await openBuild({
    works,
    key: 'four',
    engine: 'Fenner 98 four',
    preset: 'inline4',
    customerName: 'S. Oake',
  });
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
  await play(sent, 'sender', at(12, 10), { do: 'send' });

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
  await play(quoted, 'sender', at(10, 10), { do: 'send' });
  await play(quoted, 'partner', at(12, 11), priced(quoted, 31_000, 8));

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
  await agreedAndThere(waiting, at);
  await play(waiting, 'partner', at(9, 13), { do: 'start', lineId: waiting.lineIds[0] ?? '' });

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
  await agreedAndThere(cutting, at);
  const first = await releasedAndKeyed(cutting, at, rodSheet('2.1172 2.1171 2.1173 2.1172 2.1166 2.1172'));
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
  await play(cutting, 'partner', at(10, 10), { do: 'start', lineId: cutting.lineIds[0] ?? '' });
  const second = [sheet(cutting, 0, 'grind_rods', rodSheet())];
  await play(cutting, 'sender', at(10, 11), {
    do: 'release',
    lines: second,
    reason: 'The cap bolts on rod 5 were pulled dry.',
  });
  const nothingCut = first.flatMap((line) =>
    line.sizes.map(({ feature }) => ({ lineId: line.lineId, feature, size: null, text: '' })),
  );
  await play(cutting, 'partner', at(10, 12), { do: 'answer_stop', cut: nothingCut });
  await play(cutting, 'partner', at(10, 13), keyedBack(cutting, 2, second));
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
  await agreedAndThere(snag, at);
  await releasedAndKeyed(snag, at, rodSheet());
  await play(snag, 'partner', at(11, 9), { do: 'start', lineId: snag.lineIds[0] ?? '' });
  await play(snag, 'partner', at(12, 14), {
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
  await finishedBlock(reported, at, 11);
  await play(reported, 'partner', at(12, 15), handed(reported, 'sent_back', at(12, 15)));

  const rework = await openOrder({
    name: 'second round',
    cast,
    to: 'grinding',
    build: six,
    kind: 'crankshaft',
    operations: ['grind_rods'],
    at: at(2, 9),
  });
  await agreedAndThere(rework, at);
  await releasedAndKeyed(rework, at, rodSheet());
  await play(rework, 'partner', at(10, 9), { do: 'start', lineId: rework.lineIds[0] ?? '' });
  await measured(
    rework,
    'partner',
    at(10, 15),
    rodReadings(['2.1149', '2.1148', '2.1150', '2.1152', '2.1149', '2.1148']),
  );
  await play(rework, 'partner', at(10, 16), { do: 'report', unread: [] });
  await play(rework, 'partner', at(11, 8), handed(rework, 'sent_back', at(11, 8)));
  await play(rework, 'sender', at(11, 12), handed(rework, 'received', at(11, 12)));
  await play(rework, 'sender', at(11, 14), {
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
  await play(held, 'sender', at(8, 10), { do: 'send' });
  await play(held, 'partner', at(9, 10), {
    do: 'hold',
    id: demoId('hold'),
    lineId: null,
    reason: 'decision',
    words: 'New bolts or the old ones?',
    waitsFor: 'sender',
  });

  await playTheEnded(cast, { six, four }, at);
  setClock();
}
