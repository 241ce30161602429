import { BORE, BORE_AND_HONE, HONE } from '@/lib/domain/operations/bore-hone';
import { GRIND_MAINS, GRIND_RODS } from '@/lib/domain/operations/grind';
import type { Operation } from '@/lib/domain/operations/operation';
import { CRACK_TEST, HOT_WASH, POLISH, SOMETHING_ELSE } from '@/lib/domain/operations/plain';

/** Raised when a formula changes; a rev keeps the version it was worked out with. */
export const CATALOGUE_VERSION = 1;

/** Every operation, in the order of work. Forms, sheets, readings and `npm run sum` read this one list. */
export const OPERATIONS: readonly Operation[] = [
  HOT_WASH,
  CRACK_TEST,
  GRIND_RODS,
  GRIND_MAINS,
  POLISH,
  BORE,
  HONE,
  BORE_AND_HONE,
  SOMETHING_ELSE,
];

/** Finds an operation by its key. */
export function findOperation(key: string): Operation | undefined {
  return OPERATIONS.find((operation) => operation.key === key);
}

/** The operation of a stored line. @throws RangeError for a key that was never in the catalogue: a bug. */
export function operationByKey(key: string): Operation {
  const found = findOperation(key);
  if (!found) throw new RangeError(`No operation ${key}`);
  return found;
}
