import { z } from 'zod';
import { parseMoney } from '@/lib/domain/quantity/money';
import { daySchema } from '@/lib/schemas/build';

/** What every form of an order carries. */
export const orderFormSchema = z.object({
  orderId: z.uuid(),
  version: z.coerce.number().int(),
  requestKey: z.uuid(),
});

/** An amount as typed; empty is nothing. */
export const amountSchema = z.string().transform((text, context) => {
  if (text.trim() === '') return 0;
  const amount = parseMoney(text);
  if (amount.ok) return amount.value;
  context.addIssue({ code: 'custom', message: 'Write the amount as 480 or 480.00.' });
  return z.NEVER;
});

export const wordsSchema = z.string().trim().max(2000, 'Use at most 2000 letters.');
export const reasonSchema = wordsSchema.min(1, 'Say why.');

const wholeDays = z
  .string()
  .trim()
  .regex(/^\d{0,3}$/, 'Give whole working days.')
  .transform((text) => (text === '' || Number(text) === 0 ? null : Number(text)));

/** A price: amounts come as amount:LINE, one a line. */
export const quoteSchema = z
  .looseObject({
    ...orderFormSchema.shape,
    kind: z.enum(['work', 'inspection']),
    extrasWords: wordsSchema,
    extras: amountSchema,
    tax: amountSchema,
    promisedOn: daySchema,
    promiseDays: wholeDays,
    validUntil: daySchema,
    note: wordsSchema,
  })
  .transform((form, context) => {
    const lines = Object.entries(form).flatMap(([name, text]) => {
      if (!name.startsWith('amount:') || typeof text !== 'string') return [];
      const amount = amountSchema.safeParse(text);
      if (amount.success) return [{ lineId: name.slice(7), amountMinor: amount.data }];
      context.addIssue({ code: 'custom', path: [name], message: 'Write the amount as 480 or 480.00.' });
      return [];
    });
    const extras = form.extras > 0 ? [{ words: form.extrasWords || 'Extras', amountMinor: form.extras }] : [];
    return { ...form, lines, extras };
  });

export const snagSchema = orderFormSchema.extend({
  lineId: z
    .string()
    .transform((id) => id || null)
    .pipe(z.uuid().nullable()),
  kind: z.enum(['crack', 'will not clean up', 'wrong part', 'mixed pieces', 'damage', 'other']),
  words: wordsSchema.min(1, 'Say what you met.'),
  proposal: wordsSchema.min(1, 'Say what you propose.'),
  price: amountSchema,
  days: wholeDays,
  files: z.array(z.uuid()).max(20),
});

export const holdSchema = orderFormSchema.extend({
  reason: z.enum(['sizes', 'parts', 'decision', 'machine', 'other']),
  waitsFor: z.enum(['sender', 'partner']),
  words: wordsSchema.min(1, 'Say what it waits for.'),
});

/** How far a thread has been read: the number of its last entry in view. */
export const seenSchema = z.strictObject({ seq: z.int().min(0).max(1_000_000) });
