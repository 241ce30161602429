import path from 'node:path';
import { buildOnce, nextProgram } from '@/lib/cli/start/build';
import { Children, runProgram, TYPESCRIPT } from '@/lib/cli/start/children';
import { holdPort } from '@/lib/cli/start/ports';
import { type Cluster, reachableDataDir, startCluster } from '@/lib/cli/start/postgres';
import { makeRolesAndDatabase } from '@/db/roles';
import { keepSecrets, type Ports, productEnvironment, type Secrets } from '@/lib/cli/start/settings';

/** A running product: database, stand-ins, worker, application. */
export interface Product {
  readonly web: string;
  readonly mailbox: string;
  readonly env: Readonly<Record<string, string>>;
  readonly cluster: Cluster;
  readonly children: Children;
  /** Ends exactly what was started. */
  readonly stop: () => Promise<void>;
}

export interface ProductOptions {
  readonly root: string;
  /** The folder for secrets; shared by all products of one copy, since a build knows one of them. */
  readonly secretsHome: string;
  /** The folder for this product's database, files, mailbox and logs. */
  readonly home: string;
  readonly mode: 'production' | 'development';
  readonly demo: boolean;
  readonly throwaway?: boolean;
  readonly firstPorts?: {
    readonly web: number;
    readonly files: number;
    readonly smtp: number;
    readonly mailbox: number;
  };
  /** Told what is going on, in words for the person waiting. */
  readonly say: (line: string) => void;
}

const FIRST_PORTS = { web: 3000, files: 9000, smtp: 2525, mailbox: 8025 };

/** Starts the whole product on loopback. What was begun is ended again when a step fails. */
export async function startProduct(options: ProductOptions): Promise<Product> {
  const secrets = keepSecrets(options.secretsHome);
  const dataDir = reachableDataDir(path.join(options.home, 'database'));
  if (!dataDir.startsWith(options.home)) {
    options.say(`The database user cannot reach ${options.home}, so the data lies in ${dataDir}.`);
  }
  options.say('Starting the database');
  const cluster = await startCluster({
    dataDir,
    password: secrets.cluster,
    ...(options.throwaway === undefined ? {} : { throwaway: options.throwaway }),
  });
  const children = new Children(path.join(options.home, 'logs'));
  const stop = async () => {
    await children.end();
    await cluster.stop();
  };
  try {
    const env = await startPrograms(options, { secrets, cluster, children });
    return { web: env['APP_URL'] ?? '', mailbox: env['MAILBOX_URL'] ?? '', env, cluster, children, stop };
  } catch (error) {
    await stop();
    throw error;
  }
}

interface Begun {
  readonly secrets: Secrets;
  readonly cluster: Cluster;
  readonly children: Children;
}

async function startPrograms(options: ProductOptions, begun: Begun): Promise<Record<string, string>> {
  const { root, say } = options;
  const { secrets, cluster, children } = begun;
  const database = 'wiretag';
  await makeRolesAndDatabase(cluster.superuserUrl('postgres'), database, secrets);
  const first = options.firstPorts ?? FIRST_PORTS;
  const held = {
    web: await holdPort(first.web),
    files: await holdPort(first.files),
    smtp: await holdPort(first.smtp),
    mailbox: await holdPort(first.mailbox),
  };
  const ports: Ports = {
    database: cluster.port,
    web: held.web.port,
    files: held.files.port,
    smtp: held.smtp.port,
    mailbox: held.mailbox.port,
  };
  const env = {
    ...productEnvironment(secrets, ports, database),
    FAKES_DIR: path.join(options.home, 'fakes'),
    ...(options.mode === 'production' ? { NODE_ENV: 'production' } : {}),
  };
  const typescript = (name: string, file: string, ...args: string[]) => ({
    name,
    args: [...TYPESCRIPT, file, ...args],
    env,
    cwd: root,
  });

  say('Bringing the tables up to date');
  await runProgram(typescript('migrate', 'lib/cli/migrate.ts'));
  await Promise.all([held.files.release(), held.smtp.release(), held.mailbox.release()]);
  say('Starting the stand-ins for file storage and e-mail');
  await children.start(typescript('stand-ins', 'fake-services/start.ts'), /ready/);
  if (options.demo) {
    say('Loading the demonstration shops');
    await runProgram(typescript('demo', 'lib/cli/demo.ts'));
  }
  say('Starting the worker');
  await children.start(typescript('worker', 'lib/cli/worker.ts'), /ready/);
  await startWeb(options, env, { children, port: ports.web, release: held.web.release });
  return env;
}

async function startWeb(
  { root, mode, say }: ProductOptions,
  env: Record<string, string>,
  { children, port, release }: { children: Children; port: number; release: () => Promise<void> },
): Promise<void> {
  if (mode === 'production') {
    say('Building the application (once after each change)');
    await buildOnce(root, env);
  }
  await release();
  say('Starting the application');
  const command = mode === 'production' ? 'start' : 'dev';
  const args = [nextProgram(root), command, '-H', '127.0.0.1', '-p', String(port)];
  await children.start({ name: 'application', args, env, cwd: root }, /Ready in|✓ Ready/);
}
