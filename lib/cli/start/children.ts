import { type ChildProcess, spawn } from 'node:child_process';
import { createWriteStream, mkdirSync } from 'node:fs';
import path from 'node:path';

/** A program to run, with its own environment on top of ours. */
export interface Program {
  readonly name: string;
  readonly args: readonly string[];
  readonly env: Readonly<Record<string, string>>;
  readonly cwd: string;
}

/** Arguments that let Node run one of our TypeScript programs. */
export const TYPESCRIPT = ['--conditions=react-server', '--import', 'tsx'] as const;

/** The programs that one start has begun. Ends exactly those, last one first. */
export class Children {
  readonly #running: { name: string; child: ChildProcess }[] = [];
  readonly #logs: string;
  /** Told the name of a program that left by itself. */
  onLeave: (name: string, code: number | null) => void = () => undefined;
  #ending = false;

  constructor(logs: string) {
    this.#logs = logs;
    mkdirSync(logs, { recursive: true });
  }

  /** Starts a program that goes on running and waits until it has printed `ready`. */
  start(program: Program, ready: RegExp): Promise<void> {
    const log = createWriteStream(path.join(this.#logs, `${program.name}.log`));
    const child = spawn(process.execPath, program.args, {
      cwd: program.cwd,
      env: { ...process.env, ...program.env },
      // A group of its own: Ctrl-C reaches only us, and we end the programs in order.
      detached: true,
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    this.#running.push({ name: program.name, child });
    child.once('exit', (code) => {
      if (!this.#ending) this.onLeave(program.name, code);
    });
    return new Promise((resolve, reject) => {
      let said = '';
      const listen = (chunk: Buffer) => {
        log.write(chunk);
        if (said.length > 20_000) return;
        said += chunk.toString();
        if (ready.test(said)) resolve();
      };
      child.stdout.on('data', listen);
      child.stderr.on('data', listen);
      child.once('exit', (code) => {
        reject(new Error(`${program.name} ended with ${String(code)}:\n${said.slice(-2000)}`));
      });
    });
  }

  /** The process of a program that is running. */
  pidOf(name: string): number | undefined {
    return this.#running.find((one) => one.name === name)?.child.pid;
  }

  /** Runs a program to its end; its words are shown only when it fails. */
  run(program: Program): Promise<string> {
    return runProgram(program);
  }

  /** Ends all programs, last one first, each with SIGTERM and after ten seconds by force. */
  async end(): Promise<void> {
    this.#ending = true;
    for (const { child } of this.#running.reverse()) await endChild(child);
    this.#running.length = 0;
  }
}

/** Runs a program to its end. @throws Error holding the last of what it printed when it fails. */
export function runProgram(program: Program): Promise<string> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, program.args, {
      cwd: program.cwd,
      env: { ...process.env, ...program.env },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    let said = '';
    const listen = (chunk: Buffer) => {
      said = (said + chunk.toString()).slice(-20_000);
    };
    child.stdout.on('data', listen);
    child.stderr.on('data', listen);
    child.once('error', reject);
    child.once('exit', (code) => {
      if (code === 0) resolve(said);
      else reject(new Error(`${program.name} failed:\n${said}`));
    });
  });
}

async function endChild(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const left = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  child.kill('SIGTERM');
  const force = setTimeout(() => child.kill('SIGKILL'), 10_000);
  await left;
  clearTimeout(force);
}
