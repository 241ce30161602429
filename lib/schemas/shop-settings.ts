import { z } from 'zod';
import { ROLES } from '@/lib/domain/actor';
import { HOUSE_FIELDS } from '@/lib/domain/operations/house';
import { LENGTH_PROBLEM_WORDS, parseLength } from '@/lib/domain/quantity/parse-length';
import { shopNameSchema, timeZoneSchema } from '@/lib/schemas/identity';

/** A span of one day, minutes apart from other spans. */
export interface Span {
  readonly opens: string;
  readonly closes: string;
}

export const WEEKDAYS = [
  'Monday',
  'Tuesday',
  'Wednesday',
  'Thursday',
  'Friday',
  'Saturday',
  'Sunday',
] as const;

const SPAN = /^([01]?\d|2[0-3])[:.]([0-5]\d)\s*(?:-|–|to)\s*([01]?\d|2[0-3])[:.]([0-5]\d)$/;

/** One day's hours as typed: `8:00-12:00, 13:00-17:00`; empty is closed. */
export const hoursSchema = z
  .string()
  .trim()
  .transform((text, context): Span[] => {
    const spans: Span[] = [];
    for (const one of text === '' ? [] : text.split(/[,;]/)) {
      const span = readSpan(one.trim());
      const wrong = span === null ? NOT_HOURS : spanProblem(span, spans.at(-1));
      if (wrong !== null) {
        context.addIssue({ code: 'custom', message: wrong });
        return z.NEVER;
      }
      if (span) spans.push(span);
    }
    return spans;
  });

const NOT_HOURS = 'Write the hours as 8:00-12:00, 13:00-17:00, or leave the day empty.';

function readSpan(text: string): Span | null {
  const match = SPAN.exec(text);
  if (!match) return null;
  const [, h1 = '', m1 = '', h2 = '', m2 = ''] = match;
  return { opens: `${h1.padStart(2, '0')}:${m1}`, closes: `${h2.padStart(2, '0')}:${m2}` };
}

function spanProblem(span: Span, before: Span | undefined): string | null {
  if (span.opens >= span.closes) return 'It closes before it opens.';
  return before && span.opens < before.closes ? 'These hours overlap.' : null;
}

const days = Object.fromEntries(WEEKDAYS.map((day) => [day, hoursSchema])) as Record<
  (typeof WEEKDAYS)[number],
  typeof hoursSchema
>;

/** The shop as its settings form sends it. */
export const shopSettingsSchema = z
  .object({
    version: z.coerce.number().int(),
    name: shopNameSchema,
    unit: z.enum(['in', 'mm']),
    timeZone: timeZoneSchema,
    ...days,
  })
  .transform(({ version, name, unit, timeZone, ...typed }) => ({
    version,
    settings: { name, unit, timeZone, hours: WEEKDAYS.map((day) => typed[day]) },
  }));

export const closedDaySchema = z.object({
  day: z.iso.date('Give the day.'),
  note: z.string().trim().max(80, 'Use at most 80 letters.'),
});

export const rolesSchema = z.object({
  personId: z.uuid(),
  roles: z.array(z.enum(ROLES)).min(1, 'Choose at least one.'),
});

/** The shop's own defaults: `house:OPERATION.FIELD`, each a length or empty. */
export const houseSchema = z
  .looseObject({ version: z.coerce.number().int(), unit: z.enum(['in', 'mm']) })
  .transform((form, context) => {
    const typed: Record<string, string> = {};
    for (const { key } of HOUSE_FIELDS) {
      const value = form[`house:${key}`];
      const text = typeof value === 'string' ? value.trim() : '';
      if (text === '') continue;
      const length = parseLength(text, form.unit);
      if (length.ok) typed[key] = text;
      else
        context.addIssue({
          code: 'custom',
          path: [`house:${key}`],
          message: LENGTH_PROBLEM_WORDS[length.problem],
        });
    }
    return { version: form.version, house: { unit: form.unit, typed } };
  });
