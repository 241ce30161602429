import type { DemoBuild } from '@/lib/demo/builds';
import type { Cast } from '@/lib/demo/cast';
import { openOrder, play } from '@/lib/demo/stage';
import { agreedAndThere, type At } from '@/lib/demo/steps';

/** Orders that ended early: declined, withdrawn, cancelled and settled. */
export async function playTheEnded(
  cast: Cast,
  { six, four }: { six: DemoBuild; four: DemoBuild },
  at: At,
): Promise<void> {
  const declined = await openOrder({
    name: 'declined',
    cast,
    to: 'rods',
    build: four,
    kind: 'rods',
    operations: ['crack_test'],
    at: at(4, 9),
  });
  await play(declined, 'sender', at(4, 10), { do: 'send' });
  await play(declined, 'partner', at(5, 10), {
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
  await play(withdrawn, 'sender', at(4, 10), { do: 'send' });
  await play(withdrawn, 'sender', at(4, 15), { do: 'withdraw', reason: 'Washed here after all.' });

  const cancelled = await openOrder({
    name: 'cancelled',
    cast,
    to: 'grinding',
    build: six,
    kind: 'crankshaft',
    operations: ['grind_rods'],
    at: at(3, 9),
  });
  await agreedAndThere(cancelled, at);
  await play(cancelled, 'sender', at(10, 9), { do: 'cancel', reason: 'The customer sold the engine.' });
  await play(cancelled, 'partner', at(10, 14), {
    do: 'settle',
    totalMinor: 9000,
    note: 'Wash and crack test',
  });
}
