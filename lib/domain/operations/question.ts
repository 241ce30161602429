import type { Figure } from '@/lib/domain/operations/operation';
import { type Length, type LengthUnit, magnitude, nanometres, subtract } from '@/lib/domain/quantity/length';
import { lengthOf, parseLength } from '@/lib/domain/quantity/parse-length';
import { printNear } from '@/lib/domain/quantity/print-length';

/** Something typed that is probably not what was measured. */
export interface Question {
  readonly path: string;
  readonly text: string;
  readonly words: string;
  /** What was probably meant, ready to be typed instead. */
  readonly meant?: string;
}

interface Box {
  readonly path: string;
  readonly figure: Figure;
}

/** Steps by which shells are made under: with the wrong shells in, a bore is off by about one of these. */
const SHELL_STEPS = ['.010 in', '.020 in', '.030 in', '0.25 mm', '0.50 mm', '0.75 mm'].map(lengthOf);

/** Questions values outside the range that such a size can have. */
export function questionRange(
  boxes: readonly Box[],
  [low, high]: readonly [string, string],
  unit: LengthUnit,
): Question[] {
  const [least, most] = [lengthOf(`${low} in`), lengthOf(`${high} in`)];
  return boxes.flatMap(({ path, figure }) => {
    if (figure.value >= least && figure.value <= most) return [];
    const text = textOf(figure);
    const within = `between ${printNear(least, unit)} and ${printNear(most, unit)}`;
    const meant = slips(text).find((slip) => inside(slip, unit, least, most));
    const words = `${text} is not ${within}.`;
    return [{ path, text, words, ...(meant === undefined ? {} : { meant }) }];
  });
}

/** Questions values that stand further from the middle of their column than wear could put them. */
export function questionColumn(boxes: readonly Box[], spread: string, unit: LengthUnit): Question[] {
  if (boxes.length < 3) return [];
  const allowed = lengthOf(`${spread} in`);
  const middle = median(boxes.map(({ figure }) => figure.value));
  return boxes.flatMap(({ path, figure }) => {
    const away = subtract(figure.value, middle);
    if (magnitude(away) <= allowed) return [];
    const text = textOf(figure);
    const far = `${text} is ${printNear(magnitude(away), unit)} ${away > 0 ? 'more' : 'less'} than its neighbours`;
    const meant = nearest(slips(text), unit, middle, allowed);
    const step =
      away > 0 && SHELL_STEPS.some((shell) => magnitude(subtract(away, shell)) < lengthOf('.0012 in'));
    const words = step ? `${far}, about one undersize: were the standard shells still in?` : `${far}.`;
    return [{ path, text, words, ...(meant === undefined ? {} : { meant }) }];
  });
}

/** What a slip of the finger makes of a figure: the point moved, two figures swapped, one figure wrong. */
function slips(text: string): string[] {
  const match = /^([^\d.,]*)(\d*)[.,]?(\d*)(.*)$/.exec(text);
  if (!match) return [];
  const [, before = '', whole = '', places = '', after = ''] = match;
  const digits = whole + places;
  const point = whole.length;
  const write = (figures: string, at: number) =>
    at < 0 || at > figures.length ? [] : [`${before}${figures.slice(0, at)}.${figures.slice(at)}${after}`];
  const swapped = Array.from(
    { length: Math.max(0, digits.length - 1) },
    (_pair, i) => `${digits.slice(0, i)}${digits[i + 1] ?? ''}${digits[i] ?? ''}${digits.slice(i + 2)}`,
  ).flatMap((figures) => write(figures, point));
  // One figure misread or mistyped.
  const wrong = [1, 2, 3, 4, 5, 6, 7, 8, 9].flatMap((by) =>
    Array.from(digits).flatMap((digit, i) => {
      const other = (Number(digit) + by) % 10;
      return write(`${digits.slice(0, i)}${other}${digits.slice(i + 1)}`, point);
    }),
  );
  return [
    ...write(digits, point - 1),
    ...write(digits, point + 1),
    ...write(digits, 1),
    ...swapped,
    ...wrong,
  ].filter((slip) => slip !== text);
}

/** Of the slips that land among the neighbours, the one nearest to their middle. */
function nearest(
  texts: readonly string[],
  unit: LengthUnit,
  middle: Length,
  allowed: Length,
): string | undefined {
  const landed = texts.flatMap((text) => {
    const parsed = parseLength(text, unit);
    const away = parsed.ok ? magnitude(subtract(parsed.value, middle)) : null;
    return away !== null && away <= allowed ? [{ text, away }] : [];
  });
  return landed.toSorted((a, b) => a.away - b.away)[0]?.text;
}

function inside(text: string, unit: LengthUnit, least: Length, most: Length): boolean {
  const parsed = parseLength(text, unit);
  return parsed.ok && parsed.value >= least && parsed.value <= most;
}

function median(values: readonly Length[]): Length {
  const sorted = values.toSorted((a, b) => a - b);
  return sorted[Math.floor((sorted.length - 1) / 2)] ?? nanometres(0);
}

function textOf(figure: Figure): string {
  return figure.from.is === 'typed' ? figure.from.text : '';
}
