import type { Made } from '@/lib/domain/builds/made';
import type { Length, LengthUnit } from '@/lib/domain/quantity/length';

/** Where a default has no printed source. */
export const COMMON = 'common practice, no source';

/** What cutting does to a feature: decides which side is still to cut. */
export type Cutting = 'smaller' | 'bigger' | 'one_limit';

/** Where a figure came from. The drawn sum, the paper and `npm run sum` walk it. */
export type Source =
  | { readonly is: 'typed'; readonly text: string; readonly condition?: string }
  | { readonly is: 'default'; readonly says: string }
  | { readonly is: 'worked'; readonly how: string; readonly of: readonly Figure[] };

/** A length that knows its name and where it came from. */
export interface Figure {
  readonly value: Length;
  readonly label: string;
  readonly from: Source;
}

/** The columns a `feature` field runs over. */
export type Rows = 'features' | 'rods' | 'cylinders';

/** One thing that must be known. */
export interface Field {
  readonly quantity: 'length' | 'choice' | 'words';
  readonly label: string;
  /** One box, a column of boxes (one a row), or a grid (rows by positions). */
  readonly per: 'line' | 'feature' | 'position';
  readonly rows?: Rows;
  /** 'shells in, caps torqued': asked with the value, printed with it. */
  readonly condition?: string;
  readonly optional?: true;
  /** In inches, as text: outside this range the value is questioned. */
  readonly plausible?: readonly [low: string, high: string];
  /** In inches, as text: a value further than this from the middle of its column is questioned. */
  readonly spread?: string;
  readonly choices?: readonly { readonly value: string; readonly label: string }[];
  /** Read in inches unless it says otherwise. */
  readonly fallback?: { readonly value: string; readonly source: string; readonly unit?: LengthUnit };
}

export type Fields = Readonly<Record<string, Field>>;

/** What a sum reads: declared fields only, each already parsed. */
export interface Known<F extends Fields> {
  readonly length: (name: keyof F & string) => Figure;
  readonly maybe: (name: keyof F & string) => Figure | null;
  readonly each: (name: keyof F & string) => readonly Figure[];
  /** A grid, row by row. */
  readonly grid: (name: keyof F & string) => readonly (readonly Figure[])[];
  readonly words: (name: keyof F & string) => string;
}

/** What to cut one feature to. */
export interface Size {
  readonly feature: string;
  /** The name that equal sizes share when they are repeated back. */
  readonly what: string;
  readonly target: Figure;
  readonly lower: Length;
  readonly upper: Length;
  readonly cutting: Cutting;
}

/** Something the sheet has found out. `refuse` stops a release; `warn` asks to be read. */
export interface Check {
  readonly tone: 'fine' | 'note' | 'warn' | 'refuse';
  readonly words: string;
}

/** Whether one undersize or oversize cleans up, judged at the size actually cut. */
export interface CleanUp {
  readonly step: Length;
  readonly cutTo: Length;
  readonly even: boolean;
  readonly oneSided: boolean;
  readonly chosen: boolean;
}

/** A window before the finishing cut: what the size is before polish or hone. */
export interface Window {
  readonly label: string;
  readonly lower: Length;
  readonly upper: Length;
}

/** Everything a sum answers. */
export interface Worked {
  readonly column: readonly (Figure | 'rule')[];
  readonly sizes: readonly Size[];
  readonly windows: readonly Window[];
  readonly cleanUp: readonly CleanUp[];
  readonly checks: readonly Check[];
}

/** Printing inside sums follows the shop's unit; the figures themselves never change. */
export type Print = (value: Length) => string;

/** What a sum may ask besides its fields. */
export interface Setting {
  readonly made: Made;
  readonly print: Print;
}

export interface Declaration<F extends Fields> {
  readonly key: string;
  readonly title: string;
  readonly part: 'crank' | 'block' | 'any';
  readonly cutting: Cutting | 'none';
  /** What must travel with the part. */
  readonly kit: readonly string[];
  /** Operations of the same part that come before this one. */
  readonly after: readonly string[];
  readonly features: (made: Made) => readonly string[];
  readonly positions: readonly string[];
  readonly fields: F;
  readonly sheet: readonly { readonly title: string; readonly show: readonly (keyof F & string)[] }[];
  readonly work: ((known: Known<F>, setting: Setting) => Worked) | null;
  readonly cautions: readonly string[];
  /** How it is measured and worked out, for a person at a bench. */
  readonly method: string;
}

/** The same entry as the rest of the product sees it, with its field names closed over. */
export type Operation = Omit<Declaration<Fields>, 'work'> & {
  readonly work: ((known: Known<Fields>, setting: Setting) => Worked) | null;
};

/** Declares an operation; the compiler checks that `work` and `sheet` name declared fields only. */
export function operation<const F extends Fields>(entry: Declaration<F>): Operation {
  const { work, ...rest } = entry;
  return { ...rest, work: work && ((known, setting) => work(known as Known<F>, setting)) };
}

/** Whether lines of this operation need sizes before they may be cut. */
export function needsSizes(entry: Operation): boolean {
  return entry.work !== null;
}
