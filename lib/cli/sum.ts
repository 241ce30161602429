import { readFileSync } from 'node:fs';
import { z } from 'zod';
import { findPreset } from '@/lib/domain/builds/presets';
import { findOperation, OPERATIONS } from '@/lib/domain/operations/catalogue';
import { type Figure, needsSizes, type Operation, type Worked } from '@/lib/domain/operations/operation';
import type { Length } from '@/lib/domain/quantity/length';
import { printNear } from '@/lib/domain/quantity/print-length';
import { workSheet } from '@/lib/domain/sizes/release';
import { operationInputSchema, toRaw } from '@/lib/schemas/operation-input';

/** `sum --list`, `sum NAME --schema`, `sum NAME [FILE]`: the same sums as the screens, for scripts. */
const [name = '', second = ''] = process.argv.slice(2);
const SUMS = OPERATIONS.filter(needsSizes);

if (name === '--list') {
  say(SUMS.map(({ key, title }) => ({ name: key, title })));
} else {
  const operation = findOperation(name);
  if (!operation || !needsSizes(operation)) refuse(404, `There is no sum called "${name}". See --list.`);
  else if (second === '--schema') say(z.toJSONSchema(operationInputSchema(operation), { io: 'input' }));
  else answer(operation, second);
}

function answer(operation: Operation, file: string): void {
  const typed = readInput(file);
  if (typed === undefined) return;
  const input = operationInputSchema(operation).safeParse(typed);
  if (!input.success) {
    const errors = input.error.issues.map(({ path, message }) => ({
      pointer: `#/${path.join('/')}`,
      detail: message,
    }));
    refuse(422, 'The input does not fit. See --schema.', errors);
    return;
  }
  const made = findPreset(input.data.build);
  if (!made) throw new RangeError(input.data.build);
  const { filled, worked } = workSheet(operation.key, toRaw(input.data), { made, unit: input.data.unit });
  if (worked) {
    say(toAnswer(operation, worked));
    return;
  }
  const problems = Object.entries(filled.problems).map(([path, detail]) => ({
    pointer: pointerOf(path),
    detail,
  }));
  const questions = filled.questions.map(({ path, words, meant }) => ({
    pointer: pointerOf(path),
    detail: `${words}${meant === undefined ? '' : ` Meant ${meant}?`} Put "${path}" under keep if it was measured so.`,
  }));
  const errors = [...problems, ...questions];
  refuse(
    422,
    errors.length > 0
      ? 'Something does not read, or is questioned.'
      : 'Something is still missing. See --schema.',
    errors,
  );
}

function toAnswer(operation: Operation, worked: Worked) {
  return {
    sum: operation.key,
    title: operation.title,
    steps: worked.column.map((row) =>
      row === 'rule' ? { rule: true } : { label: row.label, value: lengthOf(row.value), from: sourceOf(row) },
    ),
    results: worked.sizes.map(({ feature, what, target, lower, upper, cutting }) => ({
      ...{
        feature,
        what,
        cutting,
        target: lengthOf(target.value),
        lower: lengthOf(lower),
        upper: lengthOf(upper),
      },
    })),
    windows: worked.windows.map(({ label, lower, upper }) => ({
      label,
      lower: lengthOf(lower),
      upper: lengthOf(upper),
    })),
    cleanUp: worked.cleanUp.map(({ step, cutTo, ...says }) => ({
      step: lengthOf(step),
      cutTo: lengthOf(cutTo),
      ...says,
    })),
    checks: worked.checks,
    cautions: operation.cautions,
  };
}

function lengthOf(value: Length) {
  return { nm: value, in: printNear(value, 'in'), mm: printNear(value, 'mm') };
}

function sourceOf({ from }: Figure): string {
  if (from.is === 'typed') return `typed ${from.text}`;
  return from.is === 'default'
    ? from.says
    : `${from.how} of ${from.of.map((figure) => figure.label).join(', ')}`;
}

function pointerOf(path: string): string {
  return `#/values/${path.replaceAll('.', '/')}`;
}

function readInput(file: string): unknown {
  try {
    return JSON.parse(readFileSync(file === '' ? 0 : file, 'utf8')) as unknown;
  } catch (error) {
    refuse(400, `The input is not JSON: ${error instanceof Error ? error.message : ''}`);
    return undefined;
  }
}

function refuse(status: number, title: string, errors: readonly object[] = []): void {
  say({ type: 'about:blank', status, title, ...(errors.length > 0 ? { errors } : {}) });
  process.exitCode = 1;
}

function say(value: unknown): void {
  process.stdout.write(`${JSON.stringify(value, null, 2)}\n`);
}
