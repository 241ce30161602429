import { closeDatabase } from '@/db/client';
import { bringInTheCast } from '@/lib/demo/cast';
import { playThePresent } from '@/lib/demo/scenario';
import { playAYear } from '@/lib/demo/year';

/** Loads the demonstration once; a second run finds it there and leaves it alone. */
const cast = await bringInTheCast();
if (cast) {
  const today = new Date().toISOString().slice(0, 10);
  await playAYear(cast, today, 36);
  await playThePresent(cast, today);
  console.log('The demonstration is loaded.');
} else {
  console.log('The demonstration is there already.');
}
await closeDatabase();
