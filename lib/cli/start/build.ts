import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { runProgram } from '@/lib/cli/start/children';

const BUILT_FROM = [
  'app',
  'components',
  'lib',
  'db',
  'public',
  'package-lock.json',
  'next.config.mjs',
  'postcss.config.mjs',
  'tsconfig.json',
  'proxy.ts',
  'instrumentation.ts',
];

/** Builds the application for production, unless what it is built from is as it was at the last build. */
export async function buildOnce(root: string, env: Record<string, string>): Promise<'built' | 'unchanged'> {
  const mark = path.join(root, '.next', 'built-from');
  const now = fingerprint(root, env['NEXT_SERVER_ACTIONS_ENCRYPTION_KEY'] ?? '');
  if (existsSync(mark) && readFileSync(mark, 'utf8') === now) return 'unchanged';
  await runProgram({ name: 'build', args: [nextProgram(root), 'build'], env, cwd: root });
  writeFileSync(mark, now);
  return 'built';
}

/** The path of Next.js's own program. */
export function nextProgram(root: string): string {
  return path.join(root, 'node_modules', 'next', 'dist', 'bin', 'next');
}

function fingerprint(root: string, salt: string): string {
  const hash = createHash('sha256').update(salt);
  for (const name of BUILT_FROM) addTo(hash, path.join(root, name));
  return hash.digest('hex');
}

function addTo(hash: ReturnType<typeof createHash>, file: string): void {
  if (!existsSync(file)) return;
  if (statSync(file).isDirectory()) {
    for (const name of readdirSync(file).sort()) addTo(hash, path.join(file, name));
    return;
  }
  hash.update(file).update(readFileSync(file));
}
