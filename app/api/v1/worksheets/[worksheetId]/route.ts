import { z } from 'zod';
import { answerJson, route } from '@/lib/http/route';
import { keepWorksheet } from '@/lib/services/worksheets';

const rawSchema = z
  .record(z.string().max(80), z.string().max(200))
  .refine((raw) => Object.keys(raw).length <= 500, 'This is too much for one sheet.');

/** Keeps what was typed on a sheet. */
export const PUT = route({
  params: z.object({ worksheetId: z.uuid() }),
  body: z.strictObject({ raw: rawSchema }),
  ifMatch: true,
  handle: async ({ ticket, params, body, version }) => {
    const saved = await keepWorksheet(ticket, params.worksheetId, version, body.raw);
    return answerJson(saved, saved);
  },
});
