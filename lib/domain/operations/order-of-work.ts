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
 * What a builder would ask about an order's operations: one of which nothing that usually comes before it is on the
 * order, with what that would be. Common practice, no source.
 */
export function missingBefore(
  keys: readonly string[],
): readonly { readonly key: string; readonly earlier: readonly string[] }[] {
  return keys.flatMap((key) => {
    const earlier = operationByKey(key).after;
    return earlier.length === 0 || earlier.some((one) => keys.includes(one)) ? [] : [{ key, earlier }];
  });
}
