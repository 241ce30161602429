import { setClock } from '@/lib/adapters/clock';
import { type Cast, demoId } from '@/lib/demo/cast';
import { handed, keyedBack, moment, openOrder, play, priced, sheet } from '@/lib/demo/stage';
import { shiftDay } from '@/lib/domain/calendar/calendar';
import { findPreset } from '@/lib/domain/builds/presets';
import { createBuild } from '@/lib/services/builds';

const KINDS = [
  { to: 'grinding', kind: 'crankshaft', operation: 'something_else', base: 5 },
  { to: 'boring', kind: 'block', operation: 'hot_wash', base: 3 },
  { to: 'rods', kind: 'rods', operation: 'crack_test', base: 2 },
] as const;

/** Plays a year of finished orders, a few a month, with the waits that a real year has. */
export async function playAYear(cast: Cast, today: string, orders: number): Promise<void> {
  const works = cast['works-owner'];
  const made = findPreset('inline6');
  if (!works || !made) throw new Error('The works are missing');
  setClock(new Date(`${shiftDay(today, -360)}T08:00:00Z`));
  const build = await createBuild(
    works,
    demoId('build key stock'),
    { engine: 'Stock parts', preset: made, customerName: null, notes: '', neededOn: null },
    demoId('build stock'),
  );
  for (let index = 0; index < orders; index += 1) {
    const kind = KINDS[index % KINDS.length] ?? KINDS[0];
    const start = shiftDay(today, -350 + Math.floor((index * 310) / orders));
    // Waits that vary without chance, so that the year comes out the same each time.
    const wait = (many: number, salt: number) => (index * 7 + salt * 3) % many;
    const name = `year ${index}`;
    const at = (days: number, hour: number) => moment(start, days, hour);
    const order = await openOrder({
      name,
      cast,
      to: kind.to,
      build: { id: build.id, made },
      kind: kind.kind,
      operations: [kind.operation],
      at: at(0, 8),
    });
    const there = 1 + wait(3, 1);
    const begun = there + 1 + wait(4, 2);
    const done = begun + kind.base + wait(5, 3);
    const home = done + 1 + wait(3, 4);
    await play(order, 'sender', at(0, 9), { do: 'send' });
    await play(order, 'partner', at(0, 14), priced(order, 12_000, kind.base + 3));
    await play(order, 'sender', at(1, 9), { do: 'agree', revision: 1 });
    await play(order, 'sender', at(there, 8), handed(order, 'sent', at(there, 8)));
    await play(order, 'partner', at(there, 13), handed(order, 'checked_in', at(there, 13)));
    if (kind.operation === 'something_else') {
      const raw = {
        what: 'Seal face',
        does: 'smaller',
        low: '3.4990',
        high: '3.5000',
        where: 'maker’s sheet',
      };
      const lines = [sheet(order, 0, kind.operation, raw)];
      await play(order, 'sender', at(begun, 9), { do: 'release', lines, reason: '' });
      await play(order, 'partner', at(begun, 11), keyedBack(order, 1, lines));
    }
    const lineId = order.lineIds[0] ?? '';
    await play(order, 'partner', at(begun, 14), { do: 'start', lineId });
    await play(order, 'partner', at(done, 10), {
      do: 'report',
      unread: [{ lineId, reason: 'on the card' }],
    });
    await play(order, 'partner', at(home, 8), handed(order, 'sent_back', at(home, 8)));
    await play(order, 'sender', at(home, 14), handed(order, 'received', at(home, 14)));
    const decisions = [{ lineId, decision: 'accept' as const, reason: '', features: [] }];
    await play(order, 'sender', at(home, 15), { do: 'decide', decisions });
  }
  setClock();
}
