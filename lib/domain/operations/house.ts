import { OPERATIONS } from '@/lib/domain/operations/catalogue';
import { COMMON, type Operation } from '@/lib/domain/operations/operation';
import type { LengthUnit } from '@/lib/domain/quantity/length';
import { parseLength } from '@/lib/domain/quantity/parse-length';

/** A shop's own defaults as typed, by operation and field: `grind_rods.least`. What is not there is the catalogue's. */
export interface House {
  readonly unit: LengthUnit;
  readonly typed: Readonly<Record<string, string>>;
}

/** An operation with the shop's own defaults in place of the catalogue's; the sheet says which one speaks. */
export function withHouse(operation: Operation, house: House | undefined): Operation {
  if (!house) return operation;
  const fields = Object.entries(operation.fields).map(([name, field]) => {
    const value = house.typed[`${operation.key}.${name}`];
    if (value === undefined || value === '' || field.fallback?.source !== COMMON)
      return [name, field] as const;
    return [
      name,
      { ...field, fallback: { value, source: 'your shop’s default', unit: house.unit } },
    ] as const;
  });
  return { ...operation, fields: Object.fromEntries(fields) };
}

/** A default as it is shown to a shop that works in `unit`: one typed in the other unit says so, and means the same. */
export function houseText({ unit: own, typed }: House, key: string, unit: LengthUnit): string {
  const text = typed[key] ?? '';
  if (text === '' || own === unit) return text;
  const [inches, millimetres] = [parseLength(text, 'in'), parseLength(text, 'mm')];
  const saysItself = inches.ok && millimetres.ok && inches.value === millimetres.value;
  return saysItself ? text : `${text} ${own}`;
}

/** One default that a shop may set for itself. */
export interface HouseField {
  /** As in `House.typed`. */
  readonly key: string;
  readonly operation: string;
  readonly label: string;
  readonly value: string;
  readonly source: string;
}

/** Every size in the catalogue that a shop may set once for all: habits of the trade, never what belongs to one job. */
export const HOUSE_FIELDS: readonly HouseField[] = OPERATIONS.flatMap((operation) =>
  Object.entries(operation.fields).flatMap(([name, field]) =>
    field.fallback?.source === COMMON && field.quantity === 'length'
      ? [
          {
            ...{ key: `${operation.key}.${name}`, operation: operation.title, label: field.label },
            ...{ value: field.fallback.value, source: field.fallback.source },
          },
        ]
      : [],
  ),
);
