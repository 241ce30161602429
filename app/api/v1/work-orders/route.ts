import { z } from 'zod';
import { begin } from '@/db/client';
import { loadWorkOrders } from '@/db/read-models/work-orders';
import { answerJson, route } from '@/lib/http/route';
import { workOrderFilterSchema, workOrdersAddress } from '@/lib/schemas/work-orders';

/** Work orders, narrowed and sorted like the page, a page at a time. */
export const GET = route({
  params: z.unknown(),
  handle: async ({ ticket, request }) => {
    const asked = Object.fromEntries(new URL(request.url).searchParams);
    const filter = workOrderFilterSchema.parse(asked);
    const page = await begin(ticket, (tx, actor) => loadWorkOrders(tx, actor, filter));
    const next =
      page.next === null
        ? null
        : workOrdersAddress({ ...filter, after: page.next }).replace(/^\/orders/, '/api/v1/work-orders');
    return answerJson({ orders: page.rows, next });
  },
});
