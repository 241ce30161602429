import type { Figure } from '@/lib/domain/operations/operation';
import {
  add,
  largest as largestOf,
  type Length,
  smallest as smallestOf,
  subtract,
} from '@/lib/domain/quantity/length';

/** A figure worked out from others. */
export function worked(label: string, value: Length, how: string, of: readonly Figure[]): Figure {
  return { label, value, from: { is: 'worked', how, of } };
}

/** The smallest of some figures; says which one it is. */
export function smallest(label: string, figures: readonly Figure[]): Figure {
  const value = smallestOf(figures.map((figure) => figure.value));
  return worked(nameOf(label, figures, value), value, 'smallest', figures);
}

/** The largest of some figures; says which one it is. */
export function largest(label: string, figures: readonly Figure[]): Figure {
  const value = largestOf(figures.map((figure) => figure.value));
  return worked(nameOf(label, figures, value), value, 'largest', figures);
}

/** a − b. */
export function less(label: string, a: Figure, b: Figure): Figure {
  return worked(label, subtract(a.value, b.value), 'less', [a, b]);
}

/** a + b. */
export function plus(label: string, a: Figure, b: Figure): Figure {
  return worked(label, add(a.value, b.value), 'plus', [a, b]);
}

/** A figure shown with its sign turned, as the number written under another in a sum. */
export function taken(figure: Figure): Figure {
  return { ...figure, value: (0 - figure.value) as Length };
}

function nameOf(label: string, figures: readonly Figure[], value: Length): string {
  const first = figures.find((figure) => figure.value === value);
  return first ? `${label} (${first.label})` : label;
}
