'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { action } from '@/lib/http/action';
import { orderFormSchema, wordsSchema } from '@/lib/schemas/order-forms';
import { runOrderCommand } from '@/lib/services/order-commands';

const restampSchema = orderFormSchema.extend({
  partId: z.uuid(),
  from: z.string().trim().min(1, 'Say which stamp it has.').max(40),
  to: z.string().trim().min(1, 'Give the new stamp.').max(40),
  words: wordsSchema,
  files: z.array(z.uuid()).max(20),
});

/** Gives a piece another stamp, with a photo of it. */
export const restampAction = action(
  restampSchema,
  async ({ data, ask }) => {
    const { orderId, version, requestKey, partId, from, to, words, files } = data;
    const command = { do: 'restamp' as const, id: requestKey, partId, from, to, words };
    await runOrderCommand(ask, { orderId, expectedVersion: version, requestKey, command, files });
    revalidatePath(`/orders/${orderId}`, 'layout');
    return { done: `Written down: ${from} is ${to} now.` };
  },
  ['files'],
);

const moveSchema = orderFormSchema.extend({
  kind: z.enum(['sent', 'checked_in', 'sent_back', 'received']),
  partId: z.uuid(),
  pieces: z
    .string()
    .trim()
    .regex(/^[1-9]\d{0,2}$/, 'Count the pieces.')
    .transform(Number),
  stamps: z
    .string()
    .trim()
    .max(400)
    .transform((text) => (text === '' ? [] : text.split(/[\s,]+/))),
  kit: z.array(z.string().max(40)),
  files: z.array(z.uuid()).max(20),
  carrier: wordsSchema,
  condition: wordsSchema,
  occurredAt: z.iso.datetime(),
  replacesId: z
    .string()
    .optional()
    .transform((id) => (id === undefined || id === '' ? null : id)),
});

/** Hands a part over, checks it in, sends it back or receives it; or puts an earlier entry right. */
export const movePartAction = action(
  moveSchema,
  async ({ data, ask }) => {
    const { orderId, requestKey, kind, partId, pieces, stamps, kit, carrier, condition, replacesId } = data;
    // The entry takes the form's own key for its id: the same form sent twice asks for the same thing.
    const part = { id: requestKey, partId, pieces, stamps, kit, carrier, condition, replacesId };
    const command = { do: 'move_parts' as const, kind, parts: [part], occurredAt: data.occurredAt };
    // A counted hand-over is a fact: it is written whatever else changed on the order meanwhile.
    await runOrderCommand(ask, { orderId, expectedVersion: null, requestKey, command, files: data.files });
    revalidatePath(`/orders/${orderId}`, 'layout');
    return { done: 'Written down.' };
  },
  ['kit', 'files'],
);
