import { handed, keyedBack, play, priced, sheet, type StagedOrder } from '@/lib/demo/stage';
import type { Raw } from '@/lib/domain/operations/fill';
import type { ReleasedLine } from '@/lib/domain/orders/commands';

const ROD_BORES = '2.1172 2.1171 2.1173 2.1172 2.1170 2.1172';
const FOUND = '2.1238 2.1241 2.1236 2.1240 2.1237 2.1239';
const PLACES = ['front, in line', 'front, across', 'rear, in line', 'rear, across'];

function column(name: string, values: string, prefix = ''): Raw {
  return Object.fromEntries(
    values.split(' ').map((value, index) => [`${name}.${prefix}${index + 1}`, value]),
  );
}

/** A rod sheet of the demonstration's six. */
export function rodSheet(bores = ROD_BORES): Raw {
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

/** A moment by working day and hour of the scenario. */
export type At = (days: number, hour: number, minute?: number) => Date;

/** Sent, priced, agreed, on the van, checked in. */
export async function agreedAndThere(order: StagedOrder, at: At): Promise<void> {
  await play(order, 'sender', at(7, 10), { do: 'send' });
  await play(order, 'partner', at(8, 9), priced(order, 24_000));
  await play(order, 'sender', at(8, 11), { do: 'agree', revision: 1 });
  await play(order, 'sender', at(8, 15), handed(order, 'sent', at(8, 15)));
  await play(order, 'partner', at(9, 9), handed(order, 'checked_in', at(9, 9)));
}

/** Rods released and repeated back. */
export async function releasedAndKeyed(order: StagedOrder, at: At, raw: Raw): Promise<ReleasedLine[]> {
  const lines = [sheet(order, 0, 'grind_rods', raw)];
  await play(order, 'sender', at(9, 14), { do: 'release', lines, reason: '' });
  await play(order, 'partner', at(10, 8), keyedBack(order, 1, lines));
  return lines;
}

/** Four places of each journal; the first is the largest. */
export function rodReadings(sizes: readonly string[]) {
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

/** A block honed, and reported on a day. */
export async function finishedBlock(order: StagedOrder, at: At, day: number): Promise<void> {
  const raw = {
    ...column('pistons', '3.9778 3.9780 3.9779 3.9778 3.9780 3.9779 3.9778 3.9780'),
    least: '.0020',
    most: '.0030',
  };
  await play(order, 'sender', at(3, 10), { do: 'send' });
  await play(order, 'partner', at(4, 9), priced(order, 42_000, 7));
  await play(order, 'sender', at(4, 11), { do: 'agree', revision: 1 });
  await play(order, 'sender', at(5, 8), handed(order, 'sent', at(5, 8)));
  await play(
    order,
    'partner',
    at(5, 14),
    handed(order, 'checked_in', at(5, 14), ['pistons', 'torque plate gasket']),
  );
  const lines = [sheet(order, 0, 'hone', raw)];
  await play(order, 'sender', at(6, 10), { do: 'release', lines, reason: '' });
  await play(order, 'partner', at(6, 13), keyedBack(order, 1, lines));
  await play(order, 'partner', at(day, 9), { do: 'start', lineId: order.lineIds[0] ?? '' });
  await play(order, 'partner', at(day, 15), {
    do: 'report',
    unread: [{ lineId: order.lineIds[0] ?? '', reason: 'Readings follow with the block, on its card.' }],
  });
}
