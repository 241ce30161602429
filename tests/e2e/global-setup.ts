import { rmSync } from 'node:fs';
import path from 'node:path';
import type { TestProject } from 'vitest/node';
import { reachableDataDir, removeCluster } from '@/lib/cli/start/postgres';
import { startProduct } from '@/lib/cli/start/product';
import { homeFolder } from '@/lib/cli/start/settings';

declare module 'vitest' {
  interface ProvidedContext {
    web: string;
    mailbox: string;
  }
}

/** Starts the whole product as its users get it: production build, PostgreSQL, stand-ins, worker, demonstration. */
export async function setup(project: TestProject): Promise<() => Promise<void>> {
  const root = process.cwd();
  const home = path.join(homeFolder(root), `end-to-end-${process.pid}`);
  const product = await startProduct({
    root,
    secretsHome: homeFolder(root),
    home,
    mode: 'production',
    demo: true,
    throwaway: true,
    firstPorts: { web: 3300, files: 9300, smtp: 2600, mailbox: 8300 },
    say: () => undefined,
  });
  project.provide('web', product.web);
  project.provide('mailbox', product.mailbox);
  return async () => {
    await product.stop();
    removeCluster(reachableDataDir(path.join(home, 'database')));
    rmSync(home, { recursive: true, force: true });
  };
}
