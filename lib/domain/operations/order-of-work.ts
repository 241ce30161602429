import { operationByKey, OPERATIONS } from '@/lib/domain/operations/catalogue';

/** Puts operations into the order in which they are done: each after those that the catalogue names before it. */
export function inOrderOfWork(keys: readonly string[]): readonly string[] {
  const wanted = OPERATIONS.map(({ key }) => key).filter((key) => keys.includes(key));
  const done: string[] = [];
  const place = (key: string) => {
    if (done.includes(key)) return;
    for (const earlier of operationByKey(key).after) if (wanted.includes(earlier)) place(earlier);
    done.push(key);
  };
  wanted.forEach(place);
  return done;
}

/**
 * What a builder would ask about an order's operations: what usually comes before one of them and is not on the
 * order, as `Crack test usually comes before grinding …`. Common practice, no source.
 */
export function missingBefore(
  keys: readonly string[],
): readonly { readonly key: string; readonly before: string }[] {
  return keys.flatMap((key) =>
    operationByKey(key)
      .after.filter((earlier) => !keys.includes(earlier))
      .map((earlier) => ({ key: earlier, before: key })),
  );
}
