import { copyOrders } from '@/db/bulk-orders';
import { closeDatabase } from '@/db/client';
import { findRunningCopy } from '@/lib/cli/start/run-file';
import { homeFolder, keepSecrets, productEnvironment } from '@/lib/cli/start/settings';
import { demoId } from '@/lib/demo/cast';
import { checkLogs } from '@/lib/services/log-check';

/** So many orders, about, are rebuilt from their logs afterwards. */
const SAMPLE = 500;

/** Without settings of its own the program speaks to the copy that is running from this folder. */
function takeSettings(): boolean {
  if (process.env['OWNER_DATABASE_URL'] !== undefined) return true;
  const home = homeFolder(process.cwd());
  const copy = findRunningCopy(home);
  if (!copy) return false;
  const ports = { database: copy.database, web: 0, files: 0, smtp: 0, mailbox: 0 };
  Object.assign(process.env, {
    ...productEnvironment(keepSecrets(home), ports, 'wiretag'),
    APP_URL: copy.web,
  });
  return true;
}

/** Makes the demonstration large, for measuring: `npm run demo:load -- --orders 100000`. */
async function load(words: readonly string[]): Promise<number> {
  const orders = Number(words[words.indexOf('--orders') + 1]);
  if (!words.includes('--orders') || !Number.isSafeInteger(orders) || orders < 1 || orders > 1_000_000) {
    console.error('Say how many: npm run demo:load -- --orders 100000 (at most 1000000).');
    return 2;
  }
  if (!takeSettings()) {
    console.error('Nothing is running here. Start it first: ./docker-free-start.sh');
    return 2;
  }
  const ownerUrl = process.env['OWNER_DATABASE_URL'] ?? '';
  const began = Date.now();
  await copyOrders(ownerUrl, demoId('works'), orders);
  console.log(`${orders} orders written in ${Math.round((Date.now() - began) / 1000)} s.`);
  const ticket = { personId: demoId('works-owner'), shopId: demoId('works') };
  const { checked, differences } = await checkLogs(ticket, Math.ceil(orders / SAMPLE));
  console.log(`${checked} of them rebuilt from their logs: ${differences.length} differ.`);
  for (const { orderId, about } of differences.slice(0, 10)) console.log(`  ${orderId}: ${about.join(', ')}`);
  return differences.length === 0 ? 0 : 1;
}

const code = await load(process.argv.slice(2));
await closeDatabase();
process.exit(code);
