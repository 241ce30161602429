import { z } from 'zod';
import { PRESETS } from '@/lib/domain/builds/presets';
import type { Raw } from '@/lib/domain/operations/fill';
import type { Field, Operation } from '@/lib/domain/operations/operation';

const sizeSchema = z
  .union([z.string().max(40), z.number()])
  .describe('A length: text with its unit (".030", "57.19 mm"), or a bare number in the unit above');
const wordSchema = z.string().max(200);

/** What a script gives to an operation's sum; also its JSON Schema. */
export function operationInputSchema(operation: Operation) {
  const fields = Object.fromEntries(
    Object.entries(operation.fields).map(([name, field]) => [name, fieldSchema(field)]),
  );
  return z.strictObject({
    unit: z.enum(['in', 'mm']).default('in').describe('Unit of bare numbers and of texts without a unit'),
    build: z
      .enum(PRESETS.map(({ key }) => key))
      .default('inline6')
      .describe('How the engine is made'),
    values: z.strictObject(fields),
    keep: z
      .array(z.string().max(80))
      .default([])
      .describe('Paths of questioned values that were measured so'),
  });
}

export type OperationInput = z.infer<ReturnType<typeof operationInputSchema>>;

function fieldSchema(field: Field): z.ZodType {
  const one =
    field.quantity === 'length'
      ? sizeSchema
      : field.choices
        ? z.enum(field.choices.map(({ value }) => value))
        : wordSchema;
  const described = one.describe(
    [field.label, field.condition].filter((words) => words !== undefined).join('; '),
  );
  const shaped = shape(field, described);
  const mayLack = field.optional === true || field.fallback !== undefined;
  return mayLack ? shaped.optional() : shaped;
}

function shape(field: Field, one: z.ZodType): z.ZodType {
  if (field.per === 'line') return one;
  if (field.per === 'feature') return z.record(z.string().max(10), one);
  return z.record(z.string().max(10), z.record(z.string().max(40), one));
}

/** The same as texts by path, as a worksheet holds them. */
export function toRaw(input: {
  readonly values: Readonly<Record<string, unknown>>;
  readonly keep: readonly string[];
}): Raw {
  const raw: Record<string, string> = {};
  const walk = (path: string, value: unknown): void => {
    if (typeof value === 'string' || typeof value === 'number') raw[path] = String(value);
    else if (typeof value === 'object' && value !== null) {
      for (const [name, inner] of Object.entries(value)) walk(`${path}.${name}`, inner);
    }
  };
  for (const [name, value] of Object.entries(input.values)) walk(name, value);
  return { ...raw, ...Object.fromEntries(input.keep.map((path) => [`keep:${path}`, raw[path] ?? ''])) };
}
