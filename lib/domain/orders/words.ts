/** What an order can be found by: the beginnings of these words. */
export function orderWords(texts: readonly (string | null)[]): string[] {
  const words = texts
    .flatMap((text) => (text ?? '').toLowerCase().split(/[^\p{L}\p{N}]+/u))
    .filter((word) => word.length > 0);
  return [...new Set(words)].slice(0, 60);
}

/** The tag's one line: `Crankshaft: grind rod journals, polish`. */
export function orderTitle(partKinds: readonly string[], operations: readonly string[]): string {
  const parts = partKinds.join(', ');
  const named = parts.charAt(0).toUpperCase() + parts.slice(1);
  const deeds = operations.map((title) => title.charAt(0).toLowerCase() + title.slice(1)).join(', ');
  return deeds === '' ? named : `${named || 'Order'}: ${deeds}`;
}
