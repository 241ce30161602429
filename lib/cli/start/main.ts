import { rmSync } from 'node:fs';
import path from 'node:path';
import { removeCluster, reachableDataDir } from '@/lib/cli/start/postgres';
import { type Product, startProduct } from '@/lib/cli/start/product';
import { findRunningCopy, leaveWord, takeWordBack } from '@/lib/cli/start/run-file';
import { homeFolder } from '@/lib/cli/start/settings';
import { runAllTests } from '@/lib/cli/start/tests';
import { DEMO_PASSWORD, DEMO_SIGN_INS } from '@/lib/demo/sign-ins';

const root = process.cwd();
const words = process.argv.slice(2);
const say = (line: string) => console.log(line);

const unknown = words.filter((word) => !['test', '--fresh', '--dev'].includes(word));
if (unknown.length > 0) {
  say(`I do not know "${unknown.join(' ')}". Use: ./docker-free-start.sh [test] [--fresh] [--dev]`);
  process.exit(2);
}
if (words.includes('test')) process.exit(await runAllTests(root, say));
await runProduct();

async function runProduct(): Promise<void> {
  const home = homeFolder(root);
  const already = findRunningCopy(home);
  if (already) {
    say(
      `Wiretag is running already: ${already.web} (mailbox ${already.mailbox}). Ctrl-C in its own window ends it.`,
    );
    process.exit(0);
  }
  if (words.includes('--fresh')) forget(home);
  let product: Product | undefined;
  let ending = false;
  const end = async (code: number) => {
    if (ending) return;
    ending = true;
    say('Ending what was started');
    await product?.stop();
    takeWordBack(home);
    process.exit(code);
  };
  process.on('SIGINT', () => void end(0));
  process.on('SIGTERM', () => void end(0));
  try {
    const mode = words.includes('--dev') ? 'development' : 'production';
    product = await startProduct({ root, secretsHome: home, home, mode, demo: true, say });
    product.children.onLeave = (name, code) => {
      say(`The ${name} has stopped by itself (${String(code)}); see ${path.join(home, 'logs')}.`);
      void end(1);
    };
    leaveWord(home, {
      ...{ pid: process.pid, web: product.web, mailbox: product.mailbox },
      database: product.cluster.port,
    });
    welcome(product);
  } catch (error) {
    say(`It did not start: ${error instanceof Error ? error.message : String(error)}`);
    await end(1);
  }
}

function forget(home: string): void {
  removeCluster(reachableDataDir(path.join(home, 'database')));
  rmSync(path.join(home, 'fakes'), { recursive: true, force: true });
  rmSync(path.join(home, 'logs'), { recursive: true, force: true });
}

function welcome(product: Product): void {
  say('');
  say(`Wiretag   ${product.web}`);
  say(`Mailbox   ${product.mailbox}`);
  say('');
  say(`Sign-ins (password for all: ${DEMO_PASSWORD})`);
  for (const { shop, role, name, email } of DEMO_SIGN_INS) {
    say(`  ${shop.padEnd(28)} ${role.padEnd(8)} ${name.padEnd(22)} ${email}`);
  }
  say('');
  say('Ctrl-C ends it.');
}
