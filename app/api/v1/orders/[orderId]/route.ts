import { z } from 'zod';
import { begin } from '@/db/client';
import { loadOrder, type OrderView } from '@/db/read-models/order-page';
import { AppError } from '@/lib/errors';
import { answerJson, route } from '@/lib/http/route';

/** One order with its sizes, as far as the asker may see it; the version is its ETag. */
export const GET = route({
  params: z.object({ orderId: z.uuid() }),
  handle: async ({ ticket, params }) => {
    const view = await begin(ticket, (tx, actor) => loadOrder(tx, actor, params.orderId));
    if (!view) throw new AppError('not_found', 'There is no such order.');
    return answerJson(toAnswer(view), { version: view.facts.version });
  },
});

/** Exactly what orderAnswer says, and nothing that happens to lie beside it. */
function toAnswer({ facts, stand, side, title, engine, notes, standingInstruction, agreedMinor }: OrderView) {
  const isSender = side === 'sender';
  return {
    ...{
      id: facts.id,
      number: facts.number,
      version: facts.version,
      status: facts.status,
      round: facts.round,
    },
    ...{ side, title, engine, sender: facts.sender.name, partner: facts.partner?.name ?? null },
    ...{ currency: facts.currency, notes, standingInstruction },
    step: isSender ? stand.senderStep : stand.partnerStep,
    theirStep: isSender ? stand.partnerStep : stand.senderStep,
    ...{ clock: stand.clock, punches: stand.punches, stopped: stand.stopped, clear: stand.clear },
    ...{ neededBackOn: facts.neededBackOn, promisedOn: facts.promisedOn, agreedMinor },
    latestRev: facts.latestRev,
    lines: facts.lines.map((line) => ({
      ...{ id: line.id, operation: line.operation, title: line.title, needsSizes: line.needsSizes },
      ...{ started: line.started, clear: stand.clearLines.includes(line.id) },
    })),
    parts: facts.parts.map(({ id, kind, pieces, stamps }) => ({ id, kind, pieces, stamps })),
    sizes: facts.sizes.map(({ lineId, since, feature, what, cutting, target, lower, upper, partner }) => ({
      ...{ lineId, since, feature, what, cutting, target, lower, upper, partner },
    })),
  };
}
