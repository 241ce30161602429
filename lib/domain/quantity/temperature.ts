import { fail, ok, type Result } from '@/lib/domain/result';

/** A temperature in thousandths of a degree Celsius. */
export type Temperature = number & { readonly __temperature: unique symbol };

export type TemperatureUnit = 'C' | 'F';

/** Why a text is no temperature. */
export type TemperatureProblem = 'not_a_temperature' | 'out_of_range';

export const TEMPERATURE_PROBLEM_WORDS: Readonly<Record<TemperatureProblem, string>> = {
  not_a_temperature: 'Write the temperature as 20 C or 68 F.',
  out_of_range: 'That is no temperature of a part on a bench: −30 to 200 °C.',
};

/**
 * Reads a temperature as 20, 20.5 C, 68 F. Without a unit it is the one given. Degrees Fahrenheit are rounded to
 * .001 °C, half away from zero; a difference of temperatures is not a temperature and is not read here.
 */
export function parseTemperature(
  text: string,
  unit: TemperatureUnit,
): Result<Temperature, TemperatureProblem> {
  const match = /^([+\-−]?)(\d{1,4})(?:[.,](\d{1,3}))?\s*(?:°|deg)?\s*([CF])?$/i.exec(text.trim());
  if (!match) return fail('not_a_temperature');
  const [, sign = '', whole = '', places = '', said = unit] = match;
  const size = Number(whole) * 1000 + Number(places.padEnd(3, '0'));
  const thousandths = ['-', '−'].includes(sign) ? -size : size;
  const celsius = said.toUpperCase() === 'F' ? toCelsius(thousandths) : thousandths;
  return celsius < -30_000 || celsius > 200_000 ? fail('out_of_range') : ok(celsius as Temperature);
}

function toCelsius(fahrenheit: number): number {
  const ninths = (fahrenheit - 32_000) * 5;
  return Math.sign(ninths) * Math.floor((Math.abs(ninths) + 4.5) / 9);
}

/** Prints a temperature in degrees Celsius, as 20.5 °C. */
export function printTemperature(mc: number): string {
  const digits = (Math.abs(mc) / 1000).toFixed(3).replace(/\.?0+$/, '');
  return `${mc < 0 ? '−' : ''}${digits} °C`;
}
