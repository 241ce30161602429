import { largest, smallest } from '@/lib/domain/operations/figures';
import type { GrindKnown } from '@/lib/domain/operations/grind-fields';
import type { Check, Figure, Print, Setting } from '@/lib/domain/operations/operation';
import { type Length, magnitude, subtract } from '@/lib/domain/quantity/length';
import { lengthOf } from '@/lib/domain/quantity/parse-length';

interface Cut {
  readonly target: Length;
  readonly lower: Length;
}

/** What the sizes leave over all bores. */
export function clearanceChecks(
  known: GrindKnown,
  { print }: Setting,
  cut: Cut & { measured: boolean },
): Check[] {
  const bores = known.each('bores');
  if (!cut.measured)
    return [
      { tone: 'warn', words: 'The clearance is unproven: the bores were not measured with these shells in.' },
    ];
  if (known.words('asFitted') !== 'torqued') {
    return [
      {
        tone: 'refuse',
        words:
          'The bores were not measured with these shells in and the bolts torqued, so nothing is judged.',
      },
    ];
  }
  const low = subtract(smallest('', bores).value, cut.target);
  const high = subtract(largest('', bores).value, cut.lower);
  const over: Check = { tone: 'fine', words: `Across all this leaves ${print(low)} to ${print(high)}.` };
  const most = known.maybe('most');
  if (low <= 0)
    return [
      over,
      { tone: 'refuse', words: 'A journal would be as large as its bore. Check the sign and the shells.' },
    ];
  if (most && high > most.value) {
    return [over, { tone: 'warn', words: `${print(high)} is past the ${print(most.value)} wanted at most.` }];
  }
  return [over];
}

/** A size typed by hand beside the one worked out. */
export function typedChecks(known: GrindKnown, print: Print, derived: Figure): Check[] {
  const typed = known.maybe('typed');
  if (!typed || typed.value === derived.value) return [];
  const bores = known.each('bores');
  const leaves =
    bores.length > 0
      ? ` It leaves ${print(subtract(smallest('', bores).value, typed.value))} at the smallest bore.`
      : '';
  const words = `Typed by hand: ${print(typed.value)}. Worked out: ${print(derived.value)}.${leaves}`;
  const reason: Check[] =
    known.words('typedReason') === ''
      ? [{ tone: 'refuse', words: 'Say why the size is typed by hand.' }]
      : [];
  return [{ tone: 'warn', words }, ...reason];
}

const METRIC_STEPS = ['0.25 mm', '0.50 mm', '0.75 mm', '1.00 mm'];
/** Undersizes of the inch family. */
export const INCH_STEPS = ['.010 in', '.020 in', '.030 in', '.040 in'];

/** The maker’s size beside it, and shells of the other family. */
export function bookChecks(
  known: GrindKnown,
  print: Print,
  { target, book, source }: { target: Length; book: Length; source: string },
): Check[] {
  if (source !== 'measured') return [];
  if (target === book) return [{ tone: 'fine', words: `The book size is also ${print(book)}.` }];
  const difference = subtract(target, book);
  const notes: Check[] = [
    { tone: 'note', words: `The book size is ${print(book)}; this differs by ${print(difference)}.` },
  ];
  const standard = known.length('standardHigh').value;
  const other = [...METRIC_STEPS, ...INCH_STEPS].find((step) => {
    const size = subtract(standard, lengthOf(step));
    return (
      size !== book &&
      magnitude(subtract(size, book)) < lengthOf('.0012 in') &&
      magnitude(subtract(target, size)) < magnitude(difference)
    );
  });
  if (other !== undefined)
    notes.push({
      tone: 'warn',
      words: `These bores fit ${other} shells, not ${print(known.length('undersize').value)}.`,
    });
  return notes;
}

/** Journals that are smaller already than the size. */
export function foundChecks(found: readonly Figure[], print: Print, { target, lower }: Cut): Check[] {
  const past = found.filter((journal) => journal.value < lower);
  if (past.length > 0) {
    return past.map((journal) => ({
      tone: 'refuse',
      words: `${capital(journal.label)} is ${print(journal.value)} as found: already past this size by ${print(subtract(lower, journal.value))}.`,
    }));
  }
  return found
    .filter((journal) => journal.value < target)
    .map((journal) => ({
      tone: 'warn',
      words: `${capital(journal.label)} is ${print(journal.value)} as found, smaller than the size.`,
    }));
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
