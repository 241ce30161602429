import { readdirSync, readFileSync } from 'node:fs';
import http from 'node:http';

/** One request to repeat; made anew each time, so that no two need be alike. */
export type Ask = () => {
  readonly url: string;
  readonly method?: 'GET' | 'POST';
  readonly headers?: Readonly<Record<string, string>>;
  readonly body?: string;
};

/** What a number of requests cost. */
export interface Cost {
  /** Milliseconds of the server's processor a request. */
  readonly cpu: number;
  /** Median milliseconds from request to the end of the answer. */
  readonly p50: number;
}

const TICK_MS = 10;

/** Processor time of a process and everything it has started, in milliseconds (Linux counts in ticks of 10 ms). */
export function cpuOf(pid: number): number {
  let ticks = 0;
  for (const one of [pid, ...childrenOf(pid)]) {
    const stat = readFileSync(`/proc/${one}/stat`, 'utf8');
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    ticks += Number(fields[11]) + Number(fields[12]);
  }
  return ticks * TICK_MS;
}

function childrenOf(pid: number): number[] {
  const direct = readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .filter((name) => {
      try {
        const stat = readFileSync(`/proc/${name}/stat`, 'utf8');
        return Number(stat.slice(stat.lastIndexOf(')') + 2).split(' ')[1]) === pid;
      } catch {
        return false;
      }
    })
    .map(Number);
  return direct.flatMap((child) => [child, ...childrenOf(child)]);
}

/** Sends so many requests, so many at a time, and measures the server. @throws Error on an answer that is not 2xx. */
export async function measure(pid: number, ask: Ask, requests: number, atATime: number): Promise<Cost> {
  const agent = new http.Agent({ keepAlive: true, maxSockets: atATime });
  const times: number[] = [];
  let left = requests;
  const before = cpuOf(pid);
  const lane = async () => {
    while (left > 0) {
      left -= 1;
      const began = performance.now();
      await send(agent, ask);
      times.push(performance.now() - began);
    }
  };
  await Promise.all(Array.from({ length: atATime }, lane));
  const cpu = (cpuOf(pid) - before) / requests;
  agent.destroy();
  return { cpu, p50: median(times) };
}

function send(agent: http.Agent, ask: Ask): Promise<void> {
  const { url, method = 'GET', headers = {}, body } = ask();
  return new Promise((resolve, reject) => {
    const request = http.request(url, { agent, method, headers }, (answer) => {
      let said = '';
      answer.on('data', (chunk: Buffer) => {
        if (said.length < 500) said += chunk.toString();
      });
      answer.on('end', () => {
        const code = answer.statusCode ?? 0;
        if (code >= 200 && code < 300) resolve();
        else reject(new Error(`${method} ${url} answered ${code}: ${said}`));
      });
    });
    request.on('error', reject);
    request.end(body);
  });
}

/** The middle value. */
export function median(values: readonly number[]): number {
  const sorted = values.toSorted((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)] ?? Number.NaN;
}

/** Runs two things in turn, round by round, and answers the median of the rounds' ratios. */
export async function ratioOf(
  rounds: number,
  ours: () => Promise<number>,
  bare: () => Promise<number>,
): Promise<{ ratio: number; spread: number; ours: number; bare: number }> {
  const pairs: { ours: number; bare: number }[] = [];
  for (let round = 0; round < rounds; round += 1) {
    const first = round % 2 === 0 ? await ours() : undefined;
    const second = await bare();
    pairs.push({ ours: first ?? (await ours()), bare: second });
  }
  const ratios = pairs.map((pair) => pair.ours / pair.bare);
  const ratio = median(ratios);
  return {
    ratio,
    spread: (Math.max(...ratios) - Math.min(...ratios)) / ratio,
    ours: median(pairs.map((pair) => pair.ours)),
    bare: median(pairs.map((pair) => pair.bare)),
  };
}
