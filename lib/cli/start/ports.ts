import { createServer } from 'node:net';

/** A port of loopback that nobody else can take until it is released. */
export interface HeldPort {
  readonly port: number;
  readonly release: () => Promise<void>;
}

/** Holds the first free port from `first` on. Release it just before the program that wants it starts. */
export async function holdPort(first: number): Promise<HeldPort> {
  for (let port = first; port < first + 200; port += 1) {
    const held = await tryHold(port);
    if (held) return held;
  }
  throw new Error(`No free port from ${first} to ${first + 199} on 127.0.0.1.`);
}

function tryHold(port: number): Promise<HeldPort | undefined> {
  return new Promise((resolve) => {
    const server = createServer();
    server.once('error', () => resolve(undefined));
    server.listen({ port, host: '127.0.0.1', exclusive: true }, () => {
      resolve({ port, release: () => new Promise((done) => server.close(() => done())) });
    });
  });
}
