import { z } from 'zod';

const one = (value: unknown) => (Array.isArray(value) ? (value as unknown[])[0] : value);

/** What the address of the list says; anything odd falls back to the first page of open orders. */
export const workOrderFilterSchema = z.object({
  show: z.preprocess(one, z.enum(['open', 'drafts', 'ended', 'all']).catch('open')),
  find: z.preprocess(one, z.string().trim().max(80).catch('')),
  before: z.preprocess(
    one,
    z
      .string()
      .regex(/^\d{1,9}\.[0-9a-f-]{36}$/)
      .transform((text) => ({ number: Number(text.split('.')[0]), orderId: text.split('.')[1] ?? '' }))
      .pipe(z.object({ number: z.number(), orderId: z.uuid() }))
      .nullable()
      .catch(null),
  ),
});
