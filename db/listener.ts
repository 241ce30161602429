import 'server-only';
import pg from 'pg';
import { settings } from '@/lib/config/env';
import { AppError } from '@/lib/errors';

type Listener = () => void;

interface Hub {
  isLeaving: boolean;
  client: pg.Client | null;
  readonly listeners: Map<string, Set<Listener>>;
  readonly enders: Set<Listener>;
}

// One a process, also when the bundler loads this module twice.
const store = globalThis as typeof globalThis & { wiretagFeed?: Hub };
const hub: Hub = (store.wiretagFeed ??= {
  isLeaving: false,
  client: null,
  listeners: new Map(),
  enders: new Set(),
});

/** Calls `heard` whenever something has happened in the shop, over one LISTEN connection for the whole process. */
export async function listenTo(shopId: string, heard: Listener, ended: Listener): Promise<() => void> {
  if (hub.isLeaving) throw new AppError('unavailable', 'This server is about to leave. Ask again.');
  const own = hub.listeners.get(shopId) ?? new Set<Listener>();
  own.add(heard);
  hub.listeners.set(shopId, own);
  hub.enders.add(ended);
  await connect();
  return () => {
    own.delete(heard);
    hub.enders.delete(ended);
  };
}

/** Ends every stream, so that the server can drain. */
function endAllStreams(): void {
  hub.isLeaving = true;
  for (const ended of [...hub.enders]) ended();
  void hub.client?.end();
  hub.client = null;
}

/** Ends the streams when this process is asked to leave. */
export function endStreamsOnLeave(): void {
  process.once('SIGTERM', endAllStreams);
  process.once('SIGINT', endAllStreams);
}

async function connect(): Promise<void> {
  if (hub.client) return;
  const client = new pg.Client({ connectionString: settings().DATABASE_URL });
  hub.client = client;
  client.on('notification', ({ payload }) => {
    for (const heard of hub.listeners.get(payload ?? '') ?? []) heard();
  });
  // When the line breaks, streams end: browsers come back by themselves with the last number they saw.
  client.on('error', () => breakLine(client));
  client.on('end', () => breakLine(client));
  try {
    await client.connect();
    await client.query('listen feed');
  } catch (error) {
    hub.client = null;
    throw error;
  }
}

function breakLine(client: pg.Client): void {
  if (hub.client !== client) return;
  hub.client = null;
  for (const ended of [...hub.enders]) ended();
}
