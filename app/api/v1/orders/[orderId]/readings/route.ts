import { z } from 'zod';
import { begin } from '@/db/client';
import { loadReadings } from '@/db/read-models/order-readings';
import { AppError } from '@/lib/errors';
import { answerJson, route } from '@/lib/http/route';
import { readingsSchema } from '@/lib/schemas/readings';
import { postReadings } from '@/lib/services/readings';

const params = z.object({ orderId: z.uuid() });

/** Readings of an order that stand. */
export const GET = route({
  params,
  handle: async ({ ticket, params: { orderId } }) => {
    const readings = await begin(ticket, (tx) => loadReadings(tx, orderId));
    if (!readings) throw new AppError('not_found', 'There is no such order.');
    return answerJson(readings);
  },
});

/** Keeps a batch of readings, each once by its own id. */
export const POST = route({
  params,
  body: readingsSchema,
  handle: async ({ ticket, params: { orderId }, body }) =>
    answerJson(await postReadings(ticket, orderId, body.readings, body.marks), { status: 201 }),
});
