import { z } from 'zod';
import { type Length, nanometres } from '@/lib/domain/quantity/length';
import { LENGTH_PROBLEM_WORDS, parseLength } from '@/lib/domain/quantity/parse-length';

/** One reading as it is sent: a size, or a comparator reading in words. */
export const readingSchema = z
  .strictObject({
    id: z.uuid(),
    lineId: z.uuid(),
    feature: z.string().min(1).max(20),
    position: z.string().min(1).max(40),
    unit: z.enum(['in', 'mm']),
    stage: z.enum(['found', 'cut', 'finished']),
    /** The size as typed; for a comparator, how far it stands from what it was set to. */
    text: z.string().max(40),
    setToText: z.string().max(40).nullable().default(null),
    side: z.enum(['smaller', 'on', 'bigger']).nullable().default(null),
    instrument: z.string().trim().max(80).default(''),
    takenAt: z.iso.datetime(),
    replacesId: z.uuid().nullable().default(null),
  })
  .transform((reading, context) => {
    const { text, setToText, side, ...rest } = reading;
    const read = (written: string, path: string): Length => {
      const parsed = parseLength(written, reading.unit);
      if (parsed.ok) return parsed.value;
      context.addIssue({ code: 'custom', path: [path], message: LENGTH_PROBLEM_WORDS[parsed.problem] });
      return nanometres(0);
    };
    if (side === null || setToText === null)
      return { ...rest, typedText: text, comparator: null, size: read(text, 'text') };
    const away = side === 'on' ? nanometres(0) : read(text, 'text');
    if (away < 0)
      context.addIssue({
        code: 'custom',
        path: ['text'],
        message: 'Say smaller or bigger in words, without a sign.',
      });
    const typedText = side === 'on' ? `on zero at ${setToText}` : `${text} ${side} than ${setToText}`;
    return {
      ...rest,
      typedText,
      comparator: { setTo: read(setToText, 'setToText'), away, side },
      size: null,
    };
  });

/** A batch of readings. */
export const readingsSchema = z.strictObject({ readings: z.array(readingSchema).min(1).max(200) });

export type ReadingInput = z.infer<typeof readingSchema>;
