import { spawn } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import path from 'node:path';
import { removeCluster, reachableDataDir, startCluster } from '@/lib/cli/start/postgres';
import { homeFolder, keepSecrets } from '@/lib/cli/start/settings';

interface Count {
  readonly passed: number;
  readonly failed: number;
}

interface Step {
  readonly name: string;
  readonly args: readonly string[];
  /** A vitest project whose tests are counted one by one; a tool counts as one. */
  readonly project?: string;
}

const bin = (tool: string) => path.join('node_modules', '.bin', tool);
const tests = (project: string): Step => ({ name: `${project} tests`, args: [], project });

const STEPS: readonly Step[] = [
  { name: 'formatting', args: [bin('prettier'), '--check', '--log-level', 'warn', '.'] },
  { name: 'route types', args: [bin('next'), 'typegen'] },
  { name: 'types', args: [bin('tsc'), '--noEmit'] },
  { name: 'lint', args: [bin('eslint'), '--max-warnings', '0', '.'] },
  {
    name: 'import rules',
    args: [
      'node_modules/.bin/depcruise',
      '--config',
      '.dependency-cruiser.cjs',
      'app',
      'components',
      'lib',
      'db',
      'fake-services',
      'tests',
    ],
  },
  tests('unit'),
  tests('reference'),
  tests('component'),
  tests('integration'),
  tests('e2e'),
];

/** Runs every check and test in order and prints the closing line. Answers the exit code. */
export async function runAllTests(root: string, say: (line: string) => void): Promise<number> {
  const home = homeFolder(root);
  const dataDir = reachableDataDir(path.join(home, 'test-database'));
  removeCluster(dataDir);
  const secrets = keepSecrets(home);
  const cluster = await startCluster({ dataDir, password: secrets.cluster, throwaway: true });
  const env = { TEST_CLUSTER_URL: cluster.superuserUrl('postgres'), NEXT_TELEMETRY_DISABLED: '1' };
  let total: Count = { passed: 0, failed: 0 };
  try {
    for (const step of STEPS) {
      const began = Date.now();
      const count =
        step.project === undefined ? await runTool(root, step, env) : await runTests(root, step.project, env);
      say(
        `-- ${step.name}: ${count.passed} passed, ${count.failed} failed (${Math.round((Date.now() - began) / 1000)} s)`,
      );
      total = { passed: total.passed + count.passed, failed: total.failed + count.failed };
    }
  } finally {
    await cluster.stop();
    removeCluster(dataDir);
  }
  say(`${total.passed} passed, ${total.failed} failed`);
  return total.failed === 0 ? 0 : 1;
}

async function runTool(root: string, step: Step, env: Record<string, string>): Promise<Count> {
  const code = await run(root, step.args, env);
  return code === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
}

async function runTests(root: string, project: string, env: Record<string, string>): Promise<Count> {
  const folder = path.join(root, 'reports');
  mkdirSync(folder, { recursive: true });
  const report = path.join(folder, `${project}.json`);
  rmSync(report, { force: true });
  const reporters = ['--reporter=dot', '--reporter=json', `--outputFile.json=${report}`];
  const code = await run(root, [bin('vitest'), 'run', '--project', project, ...reporters], env);
  const count = readCount(report);
  // A run that broke off, or that found no test, is a failure whatever it counted.
  if (code !== 0 && count.failed === 0) return { ...count, failed: 1 };
  if (count.passed + count.failed === 0) return { passed: 0, failed: 1 };
  return count;
}

function readCount(report: string): Count {
  try {
    const { numPassedTests, numFailedTests } = JSON.parse(readFileSync(report, 'utf8')) as {
      numPassedTests: number;
      numFailedTests: number;
    };
    return { passed: numPassedTests, failed: numFailedTests };
  } catch {
    return { passed: 0, failed: 0 };
  }
}

function run(root: string, args: readonly string[], env: Record<string, string>): Promise<number> {
  return new Promise((resolve) => {
    const [program = '', ...rest] = args;
    const child = spawn(program, rest, { cwd: root, env: { ...process.env, ...env }, stdio: 'inherit' });
    child.once('error', () => resolve(1));
    child.once('exit', (code) => resolve(code ?? 1));
  });
}
