import { mkdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { reachableDataDir, removeCluster } from '@/lib/cli/start/postgres';
import { startProduct } from '@/lib/cli/start/product';
import { homeFolder } from '@/lib/cli/start/settings';
import { demoId } from '@/lib/demo/cast';
import { DEMO_PASSWORD } from '@/lib/demo/sign-ins';
import { launchBrowser, PHONE, signIn, takeSeat } from '../support/browser';

/** Takes the README's pictures from the running product, with the demonstration in it. */
const root = process.cwd();
const home = path.join(homeFolder(root), 'pictures');
const folder = path.join(root, 'tests', 'e2e', 'pictures');
mkdirSync(folder, { recursive: true });

const product = await startProduct({
  ...{ root, secretsHome: homeFolder(root), home, mode: 'production', demo: true, throwaway: true },
  firstPorts: { web: 3400, files: 9400, smtp: 2800, mailbox: 8400 },
  say: (line) => console.log(line),
});
const browser = await launchBrowser();
const order = demoId('order being cut');
const shots = [
  { name: 'bench', email: 'owner@works.example', at: '/bench' },
  { name: 'readings', email: 'owner@works.example', at: `/orders/${order}/readings` },
  { name: 'sizes', email: 'owner@works.example', at: `/orders/${order}/sizes` },
  { name: 'turnaround', email: 'owner@works.example', at: '/turnaround' },
  { name: 'phone', email: 'bench@grinding.example', at: '/bench', viewport: PHONE, night: true },
] as const;
for (const shot of shots) {
  const viewport = 'viewport' in shot ? shot.viewport : { width: 1280, height: 860 };
  const { context, page } = await takeSeat(browser, { origin: product.web, viewport });
  await signIn(page, shot.email, DEMO_PASSWORD);
  if ('night' in shot) await context.addCookies([{ name: 'shift', value: 'night', url: product.web }]);
  await page.goto(shot.at);
  await page.evaluate(() => document.fonts.ready.then(() => undefined));
  await page.screenshot({ path: path.join(folder, `${shot.name}.png`) });
  await context.close();
}
await browser.close();
await product.stop();
removeCluster(reachableDataDir(path.join(home, 'database')));
rmSync(home, { recursive: true, force: true });
