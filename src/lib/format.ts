import type { Cents } from '#shared/units/cents.ts';
import type { Day } from '#shared/units/day.ts';
import type { Wh } from '#shared/units/energy.ts';

const MINUS = '\u2212';
export const MISSING = '\u2013';
const grouped = new Intl.NumberFormat('en-US');
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const LONG_MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

/** Money with cents, for tables: "−$1,204.50". */
export function money(amount: Cents): string {
  const size = Math.abs(amount);
  return `${amount < 0 ? MINUS : ''}$${grouped.format(Math.floor(size / 100))}.${String(size % 100).padStart(2, '0')}`;
}

/** Whole dollars, for sentences and axes: "−$1,205". */
export function dollars(amount: Cents): string {
  const whole = Math.round(Math.abs(amount) / 100);
  return `${amount < 0 && whole > 0 ? MINUS : ''}$${grouped.format(whole)}`;
}

/** Whole dollars without the sign, where words carry it. */
export function dollarsSize(amount: Cents): string {
  return dollars(Math.abs(amount) as Cents);
}

/** kWh to the whole kWh, grouped; `missing` when null. */
export function kwh(amount: Wh | null): string {
  if (amount === null) return MISSING;
  const whole = Math.round(Math.abs(amount) / 1000);
  return `${amount < 0 && whole > 0 ? MINUS : ''}${grouped.format(whole)}`;
}

/** A decimal text as people read it: grouped, with a true minus. */
export function decimal(text: string): string {
  const [whole = '0', rest] = text.replace('-', '').split('.');
  return `${text.startsWith('-') ? MINUS : ''}${grouped.format(Number(whole))}${rest ? `.${rest}` : ''}`;
}

/** "14 Sep" */
export function dayMonth(day: Day): string {
  return `${Number(day.slice(8, 10))} ${MONTHS[Number(day.slice(5, 7)) - 1]}`;
}

/** "14 Sep 2026" */
export function fullDate(day: Day): string {
  return `${dayMonth(day)} ${day.slice(0, 4)}`;
}

/** "14 September" */
export function longDayMonth(day: Day): string {
  return `${Number(day.slice(8, 10))} ${LONG_MONTHS[Number(day.slice(5, 7)) - 1]}`;
}

/** "Jun 2037" */
export function monthYear(day: Day): string {
  return `${MONTHS[Number(day.slice(5, 7)) - 1]} ${day.slice(0, 4)}`;
}

/** "September" */
export function monthName(day: Day): string {
  return LONG_MONTHS[Number(day.slice(5, 7)) - 1] ?? '';
}

/** "14 Aug – 14 Sep"; the years too where they differ from each other. */
export function cycleRange(from: Day, to: Day): string {
  return from.slice(0, 4) === to.slice(0, 4)
    ? `${dayMonth(from)} \u2013 ${dayMonth(to)}`
    : `${fullDate(from)} \u2013 ${fullDate(to)}`;
}
