import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';

/** What a running copy says of itself to a second start. */
export interface RunningCopy {
  readonly pid: number;
  readonly web: string;
  readonly mailbox: string;
  /** Port of its PostgreSQL. */
  readonly database: number;
}

/** The copy that is running from this folder already, if any. */
export function findRunningCopy(home: string): RunningCopy | undefined {
  const file = runFile(home);
  if (!existsSync(file)) return undefined;
  const copy = JSON.parse(readFileSync(file, 'utf8')) as RunningCopy;
  if (isStart(copy.pid)) return copy;
  rmSync(file, { force: true });
  return undefined;
}

/** Leaves word that this copy is running. */
export function leaveWord(home: string, copy: RunningCopy): void {
  writeFileSync(runFile(home), JSON.stringify(copy));
}

/** Takes the word back. */
export function takeWordBack(home: string): void {
  rmSync(runFile(home), { force: true });
}

function runFile(home: string): string {
  return path.join(home, 'running.json');
}

function isStart(pid: number): boolean {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes('lib/cli/start/main.ts');
  } catch {
    return false;
  }
}
