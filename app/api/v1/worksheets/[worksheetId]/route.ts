import { z } from 'zod';
import { answerJson, route } from '@/lib/http/route';
import { worksheetSchema } from '@/lib/schemas/worksheet';
import { keepWorksheet } from '@/lib/services/worksheets';

/** Keeps what was typed on a sheet. */
export const PUT = route({
  params: z.object({ worksheetId: z.uuid() }),
  body: worksheetSchema,
  ifMatch: true,
  handle: async ({ ticket, params, body, version }) => {
    const saved = await keepWorksheet(ticket, params.worksheetId, version, body.raw);
    return answerJson(saved, saved);
  },
});
