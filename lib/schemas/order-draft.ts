import { z } from 'zod';
import { findOperation } from '@/lib/domain/operations/catalogue';
import { daySchema } from '@/lib/schemas/build';

const optionalId = z
  .string()
  .transform((text) => (text === '' ? null : text))
  .pipe(z.uuid('Choose again.').nullable());

/** A work order that is not sent yet, as it is kept while one types: anything may still be missing. */
export const draftSchema = z.object({
  partnerShopId: optionalId,
  partIds: z.array(z.uuid()).max(30),
  operations: z.array(z.string().refine((key) => findOperation(key) !== undefined, 'Choose again.')).max(30),
  neededBackOn: daySchema,
  transport: z.enum(['delivered', 'fetched'], 'Say how the parts travel.'),
  acceptRule: z.enum(['readings', 'own_check'], 'Say how the work is accepted.'),
  notes: z.string().trim().max(4000, 'Use at most 4000 letters.'),
  standingInstruction: z.string().trim().max(1000, 'Use at most 1000 letters.'),
  reference: z.string().trim().max(60, 'Use at most 60 letters.'),
});

export type DraftInput = z.infer<typeof draftSchema>;

/** The same when one goes on from the form: a part and an operation must be named. */
export const finishedDraftSchema = draftSchema.extend({
  partIds: draftSchema.shape.partIds.min(1, 'Choose at least one part.'),
  operations: draftSchema.shape.operations.min(1, 'Choose at least one operation.'),
});
