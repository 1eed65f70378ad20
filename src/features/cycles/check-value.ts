import type { Check } from '#shared/reconcile/check.ts';
import { parseDay } from '#shared/units/day.ts';
import { decimal, fullDate } from '#src/lib/format.ts';

const NUMBER = /^-?\d+(\.\d+)?$/;

/** A value of a check as people read it. */
export function checkValue(value: string, unit: Check['unit']): string {
  if (unit === 'date') {
    const day = parseDay(value);
    return day ? fullDate(day) : value;
  }
  if (unit === 'text' || !NUMBER.test(value)) return value;
  const text = decimal(value);
  switch (unit) {
    case 'USD':
      return text.startsWith('\u2212') ? `\u2212$${text.slice(1)}` : `$${text}`;
    case 'percent':
      return `${text}%`;
    case 'kWh':
      return `${text} kWh`;
    case 'days':
      return `${text} days`;
  }
}
