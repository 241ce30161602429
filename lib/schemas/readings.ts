import { z } from 'zod';
import { type Length, type LengthUnit, nanometres } from '@/lib/domain/quantity/length';
import { LENGTH_PROBLEM_WORDS, parseLength } from '@/lib/domain/quantity/parse-length';
import {
  parseTemperature,
  type Temperature,
  TEMPERATURE_PROBLEM_WORDS,
} from '@/lib/domain/quantity/temperature';

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
    /** Of the part, as 68 F or 20 C; without a unit the shop's usual one. */
    temperature: z.string().trim().max(20).default(''),
    takenAt: z.iso.datetime(),
    replacesId: z.uuid().nullable().default(null),
  })
  .transform((reading, context) => {
    const { text, setToText, side, temperature, ...more } = reading;
    const partMc = readTemperature(temperature, reading.unit, context);
    const rest = { ...more, temperatureText: temperature, partMc };
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

function readTemperature(
  text: string,
  unit: LengthUnit,
  context: { addIssue: (issue: { code: 'custom'; path: string[]; message: string }) => void },
): Temperature | null {
  if (text === '') return null;
  const parsed = parseTemperature(text, unit === 'in' ? 'F' : 'C');
  if (parsed.ok) return parsed.value;
  const message = TEMPERATURE_PROBLEM_WORDS[parsed.problem];
  context.addIssue({ code: 'custom', path: ['temperature'], message });
  return null;
}

/** What a gauge read on its setting standard once the round was done. */
const afterwardsSchema = z.strictObject({
  side: z.enum(['smaller', 'on', 'bigger']),
  text: z.string().trim().max(40).default(''),
});

/** A batch of readings. */
export const readingsSchema = z
  .strictObject({
    readings: z.array(readingSchema).min(1).max(200),
    afterwards: afterwardsSchema.nullable().default(null),
  })
  .transform(({ readings, afterwards }, context) => {
    if (afterwards === null) return { readings, marks: [] };
    if (afterwards.side === 'on') return { readings, marks: ['gauge on zero afterwards'] };
    const by = parseLength(afterwards.text, readings[0]?.unit ?? 'in');
    if (!by.ok || by.value <= 0) {
      const message = by.ok ? 'Say by how much.' : LENGTH_PROBLEM_WORDS[by.problem];
      context.addIssue({ code: 'custom', path: ['afterwards', 'text'], message });
    }
    return { readings, marks: [`gauge ${afterwards.text} ${afterwards.side} afterwards`] };
  });

export type ReadingInput = z.infer<typeof readingSchema>;
