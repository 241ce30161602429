import type { Made } from '@/lib/domain/builds/made';
import { findPreset } from '@/lib/domain/builds/presets';
import { fill, type Filled, type Raw } from '@/lib/domain/operations/fill';
import { operationByKey } from '@/lib/domain/operations/catalogue';
import type { Figure, Worked } from '@/lib/domain/operations/operation';
import { type Length, type LengthUnit, nanometres } from '@/lib/domain/quantity/length';
import { parseLength } from '@/lib/domain/quantity/parse-length';
import { printNear } from '@/lib/domain/quantity/print-length';

/** A preset that must exist. */
export function made(key: string): Made {
  const found = findPreset(key);
  if (!found) throw new Error(`No preset ${key}`);
  return found;
}

/** Inches as they are written, exactly. */
export function inches(text: string): Length {
  const parsed = parseLength(text, 'in');
  if (!parsed.ok) throw new Error(`${text}: ${parsed.problem}`);
  return parsed.value;
}

/** A length as the trade writes it in inches. */
export function text(length: Length): string {
  return printNear(length, 'in');
}

/** A figure typed for a test. */
export function figure(label: string, written: string): Figure {
  return { label, value: inches(written), from: { is: 'typed', text: written } };
}

/** Writes a column of boxes: `column('bores', 1, '1.9 2.0')` is bores.1, bores.2. */
export function column(name: string, prefix: string, values: string): Raw {
  return Object.fromEntries(
    values.split(' ').map((value, index) => [`${name}.${prefix}${index + 1}`, value]),
  );
}

/** Fills a worksheet in and works it out; null while something is missing or questioned. */
export function workOut(
  key: string,
  raw: Raw,
  from: { made: Made; unit?: LengthUnit },
): { filled: Filled; worked: Worked | null } {
  const operation = operationByKey(key);
  const unit = from.unit ?? 'in';
  const filled = fill(operation, raw, from.made, unit);
  const print = (value: Length) => printNear(nanometres(value), unit);
  const worked =
    filled.known && operation.work ? operation.work(filled.known, { made: from.made, print }) : null;
  return { filled, worked };
}

/** The same, where it must work out. */
export function mustWorkOut(key: string, raw: Raw, from: { made: Made; unit?: LengthUnit }): Worked {
  const { filled, worked } = workOut(key, raw, from);
  if (!worked) throw new Error(JSON.stringify({ problems: filled.problems, questions: filled.questions }));
  return worked;
}
