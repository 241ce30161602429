import { fail, ok, type Result } from '@/lib/domain/result';

/** Reads an amount as 480, 480.00 or 480,00 into minor units. Currencies with two places. */
export function parseMoney(text: string): Result<number, 'not_an_amount'> {
  const match = /^(\d{1,9})(?:[.,](\d{1,2}))?$/.exec(text.trim());
  if (!match) return fail('not_an_amount');
  const [, whole = '', places = ''] = match;
  return ok(Number(whole) * 100 + Number(places.padEnd(2, '0')));
}

/** Prints minor units as 480.00. */
export function printMoney(minor: number): string {
  const sign = minor < 0 ? '−' : '';
  const digits = Math.abs(minor).toString().padStart(3, '0');
  return `${sign}${digits.slice(0, -2)}.${digits.slice(-2)}`;
}
