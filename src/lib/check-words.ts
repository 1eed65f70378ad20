import type { Check } from '#shared/reconcile/check.ts';
import { parseDay } from '#shared/units/day.ts';
import { decimal, decimalDollars, fullDate } from './format.ts';

const NUMBER = /^-?\d+(\.\d+)?$/;

/** A value of a check with its unit, as people read it: whole kWh from ten on. */
export function checkValue(value: string, unit: Check['unit']): string {
  return exactValue(unit === 'kWh' ? shortKwh(value) : value, unit);
}

/** What the two values of a check are, where "stated" and "found" would not say it. */
export type PairWords = { stated: string; found: string };

/** "Stated 698 kWh, found 742 kWh." Two values that would read the same are said in full. */
export function statedAndFound(
  stated: string,
  found: string,
  unit: Check['unit'],
  words: PairWords = { stated: 'Stated', found: 'found' },
): string {
  const short = [checkValue(stated, unit), checkValue(found, unit)];
  const [first, second] = short[0] === short[1] ? [exactValue(stated, unit), exactValue(found, unit)] : short;
  return `${words.stated} ${first}, ${words.found} ${second}.`;
}

function exactValue(value: string, unit: Check['unit']): string {
  if (unit === 'date') {
    const day = parseDay(value);
    return day ? fullDate(day) : value;
  }
  if (unit === 'text' || !NUMBER.test(value)) return value;
  switch (unit) {
    case 'USD':
      return decimalDollars(value);
    case 'percent':
      return `${decimal(value)}%`;
    case 'kWh':
      return `${decimal(value)} kWh`;
    case 'days':
      return value === '1' ? '1 day' : `${decimal(value)} days`;
  }
}

function shortKwh(value: string): string {
  return NUMBER.test(value) && Math.abs(Number(value)) >= 10 ? String(Math.round(Number(value))) : value;
}
