import { begin } from '@/db/client';
import { listenTo } from '@/db/listener';
import { loadFeed } from '@/db/read-models/feed';
import { type BrowserTicket, requireTicket } from '@/lib/auth/ticket';
import { toProblemResponse } from '@/lib/http/problem';

export const dynamic = 'force-dynamic';

/** Server-sent events of the shop, in commit order, resumable by Last-Event-ID. Frames hold ids, never content. */
export async function GET(request: Request): Promise<Response> {
  try {
    const ticket = await requireTicket();
    const asked = Number(request.headers.get('last-event-id') ?? Number.NaN);
    const from = Number.isSafeInteger(asked) && asked >= 0 ? asked : null;
    const first = await begin(ticket, async (tx, actor) => ({
      shopId: actor.shopId,
      ...(await loadFeed(tx, actor, from)),
    }));
    const stream = streamOf({
      ticket,
      shopId: first.shopId,
      last: from ?? first.last,
      signal: request.signal,
    });
    return new Response(stream, {
      headers: {
        'content-type': 'text/event-stream; charset=utf-8',
        'cache-control': 'no-store',
        'x-accel-buffering': 'no',
        // The line closes with the stream, so that a leaving server need not wait for it.
        connection: 'close',
      },
    });
  } catch (error) {
    return toProblemResponse(error);
  }
}

interface StreamOptions {
  readonly ticket: BrowserTicket;
  readonly shopId: string;
  readonly last: number;
  readonly signal: AbortSignal;
}

function streamOf({ ticket, shopId, last: first, signal }: StreamOptions): ReadableStream<Uint8Array> {
  const encoder = new TextEncoder();
  let last = first;
  let busy = Promise.resolve();
  let leave: () => void = () => undefined;
  return new ReadableStream({
    async start(controller) {
      const say = (text: string) => controller.enqueue(encoder.encode(text));
      const end = () => {
        leave();
        try {
          controller.close();
        } catch {
          // The browser has left first.
        }
      };
      const send = () => {
        busy = busy.then(async () => {
          const news = await begin(ticket, (tx, actor) => loadFeed(tx, actor, last));
          for (const { seq, orderId, kind } of news.rows) {
            say(`id: ${seq}\nevent: happened\ndata: ${JSON.stringify({ orderId, kind })}\n\n`);
          }
          last = Math.max(last, news.last);
        }, end);
        // A sign-in that has ended, or a database that is away, ends the stream; the browser comes back by itself.
        busy = busy.catch(end);
      };
      const stop = await listenTo(shopId, send, end);
      const beat = setInterval(() => say(': still here\n\n'), 15_000);
      leave = () => {
        clearInterval(beat);
        stop();
        leave = () => undefined;
      };
      signal.addEventListener('abort', end);
      say(`retry: 2000\nid: ${last}\n\n`);
      send();
    },
    cancel: () => leave(),
  });
}
