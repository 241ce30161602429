import { z } from 'zod';
import { findPreset } from '@/lib/domain/builds/presets';

/** Kinds of part that the operations know, in the trade's words. */
export const PART_KINDS = [
  'crankshaft',
  'block',
  'rods',
  'pistons',
  'head',
  'flywheel',
  'other part',
] as const;

/** A day as typed into a date field; empty is no day. */
export const daySchema = z
  .string()
  .trim()
  .transform((text, context) => {
    if (text === '') return null;
    const day = new Date(`${text}T00:00:00Z`);
    if (
      /^\d{4}-\d{2}-\d{2}$/.test(text) &&
      !Number.isNaN(day.getTime()) &&
      day.toISOString().startsWith(text)
    )
      return text;
    context.addIssue({ code: 'custom', message: 'Give the day as year, month, day.' });
    return z.NEVER;
  });

/** A new build, as its form sends it. */
export const buildSchema = z.object({
  engine: z.string().trim().min(1, 'Name the engine.').max(120, 'Use at most 120 letters.'),
  preset: z.string().transform((key, context) => {
    const made = findPreset(key);
    if (made) return made;
    context.addIssue({ code: 'custom', message: 'Choose how the engine is made.' });
    return z.NEVER;
  }),
  customerName: z
    .string()
    .trim()
    .max(120, 'Use at most 120 letters.')
    .transform((name) => name || null),
  notes: z.string().trim().max(4000, 'Use at most 4000 letters.'),
  neededOn: daySchema,
});

/** A new part, as its form sends it. Stamps are written with spaces between them. */
export const partSchema = z
  .object({
    kind: z.enum(PART_KINDS, 'Choose what it is.'),
    makerNo: z.string().trim().max(60, 'Use at most 60 letters.'),
    stamps: z
      .string()
      .trim()
      .max(400, 'Use at most 400 letters.')
      .transform((text) => (text === '' ? [] : text.split(/[\s,]+/))),
    pieces: z
      .string()
      .trim()
      .regex(/^[1-9]\d{0,2}$/, 'Say how many pieces: 1 to 999.')
      .transform(Number),
    condition: z.string().trim().max(400, 'Use at most 400 letters.'),
  })
  .superRefine(({ stamps, pieces }, context) => {
    if (stamps.length === 0 || stamps.length === pieces) return;
    const message = `There are ${stamps.length} stamps for ${pieces} pieces. Give one a piece, or none.`;
    context.addIssue({ code: 'custom', path: ['stamps'], message });
  });

export type BuildInput = z.infer<typeof buildSchema>;
export type PartInput = z.infer<typeof partSchema>;
