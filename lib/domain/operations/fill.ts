import { cylinders, rods } from '@/lib/domain/builds/features';
import type { Made } from '@/lib/domain/builds/made';
import type { Field, Figure, Known, Fields, Operation } from '@/lib/domain/operations/operation';
import { type Question, questionColumn, questionRange } from '@/lib/domain/operations/question';
import type { LengthUnit } from '@/lib/domain/quantity/length';
import { LENGTH_PROBLEM_WORDS, parseLength } from '@/lib/domain/quantity/parse-length';

/** What was typed, by path: `least`, `bores.4`, `found.5.Top across`. `keep:PATH` holds a questioned text that stands. */
export type Raw = Readonly<Record<string, string>>;

/** A worksheet read as far as it can be. */
export interface Filled {
  /** Null until everything needed is there, sound and unquestioned. */
  readonly known: Known<Fields> | null;
  readonly problems: Readonly<Record<string, string>>;
  readonly questions: readonly Question[];
  /** Every figure that could be read, by path. */
  readonly figures: ReadonlyMap<string, Figure>;
}

/** The rows that a field's column or grid runs over. */
export function rowsOf(operation: Operation, field: Field, made: Made): readonly string[] {
  if (field.rows === 'rods') return rods(made);
  if (field.rows === 'cylinders') return cylinders(made);
  return operation.features(made);
}

/** The paths of a field's boxes, in order. */
export function pathsOf(operation: Operation, name: string, made: Made): readonly string[] {
  const field = operation.fields[name];
  if (!field) return [];
  if (field.per === 'line') return [name];
  const rows = rowsOf(operation, field, made);
  if (field.per === 'feature') return rows.map((row) => `${name}.${row}`);
  return rows.flatMap((row) => operation.positions.map((position) => `${name}.${row}.${position}`));
}

/** Reads what was typed. A questioned value counts as missing until it is answered. */
export function fill(operation: Operation, raw: Raw, made: Made, unit: LengthUnit): Filled {
  const figures = new Map<string, Figure>();
  const problems: Record<string, string> = {};
  const questions: Question[] = [];
  const missing: string[] = [];
  for (const [name, field] of Object.entries(operation.fields)) {
    const paths = pathsOf(operation, name, made);
    const asked: Question[] = [];
    for (const path of paths) readBox({ path, field, raw, unit, figures, problems, missing });
    const column = paths.flatMap((path) => {
      const figure = figures.get(path);
      return figure ? [{ path, figure }] : [];
    });
    if (field.plausible) asked.push(...questionRange(column, field.plausible, unit));
    if (field.spread) asked.push(...questionColumn(column, field.spread, unit));
    for (const question of asked) {
      if (raw[`keep:${question.path}`] === raw[question.path]) continue;
      questions.push(question);
    }
  }
  const sound = missing.length === 0 && questions.length === 0 && Object.keys(problems).length === 0;
  return { known: sound ? knownOf(operation, raw, made, figures) : null, problems, questions, figures };
}

interface Box {
  readonly path: string;
  readonly field: Field;
  readonly raw: Raw;
  readonly unit: LengthUnit;
  readonly figures: Map<string, Figure>;
  readonly problems: Record<string, string>;
  readonly missing: string[];
}

function readBox(box: Box): void {
  const text = (box.raw[box.path] ?? '').trim();
  if (box.field.quantity !== 'length') {
    if (text === '' && !box.field.optional && !box.field.fallback) box.missing.push(box.path);
    return;
  }
  if (text === '') {
    readFallback(box);
    return;
  }
  const parsed = parseLength(text, box.unit);
  if (!parsed.ok) {
    box.problems[box.path] = LENGTH_PROBLEM_WORDS[parsed.problem];
    return;
  }
  const { condition } = box.field;
  const from = { is: 'typed' as const, text, ...(condition === undefined ? {} : { condition }) };
  box.figures.set(box.path, { value: parsed.value, label: labelOf(box), from });
}

function readFallback({ path, field, figures, missing }: Box): void {
  if (!field.fallback) {
    if (!field.optional) missing.push(path);
    return;
  }
  const parsed = parseLength(field.fallback.value, field.fallback.unit ?? 'in');
  if (parsed.ok)
    figures.set(path, {
      value: parsed.value,
      label: field.label,
      from: { is: 'default', says: field.fallback.source },
    });
}

function labelOf({ path, field }: Box): string {
  const [, row, position] = path.split('.');
  if (row === undefined) return field.label;
  const place =
    field.rows === 'rods' ? `rod ${row}` : field.rows === 'cylinders' ? `cylinder ${row}` : `journal ${row}`;
  return position === undefined ? place : `${place}, ${position.toLowerCase()}`;
}

function knownOf(
  operation: Operation,
  raw: Raw,
  made: Made,
  figures: ReadonlyMap<string, Figure>,
): Known<Fields> {
  const each = (name: string) =>
    pathsOf(operation, name, made).flatMap((path) => {
      const figure = figures.get(path);
      return figure ? [figure] : [];
    });
  return {
    maybe: (name) => figures.get(name) ?? null,
    length: (name) => {
      const figure = figures.get(name);
      if (!figure) throw new RangeError(`${name} was read before it was known`);
      return figure;
    },
    each,
    grid: (name) => {
      const width = operation.positions.length;
      const all = each(name);
      return Array.from({ length: all.length / width }, (_row, index) =>
        all.slice(index * width, (index + 1) * width),
      );
    },
    words: (name) => (raw[name] ?? '').trim() || (operation.fields[name]?.fallback?.value ?? ''),
  };
}
