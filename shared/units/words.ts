import type { Cents } from './cents.ts';
import { type Day, dayOfMonth, monthOf, yearOf } from './day.ts';

// How figures and days are said, to people, everywhere. For files see `dollarsText` and `kwhText`.

/** U+2212, the minus people read. */
export const MINUS = '\u2212';

export const MONTH_NAMES: readonly string[] = [
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

/** A whole number from zero up, its thousands apart by commas: "1,204". */
export function groupedWhole(whole: number): string {
  return String(whole).replace(/\B(?=(\d{3})+$)/g, ',');
}

/** Money with its cents: "$1,204.50", "−$20.14". */
export function moneyWords(amount: Cents): string {
  const size = Math.abs(amount);
  return `${amount < 0 ? MINUS : ''}$${groupedWhole(Math.floor(size / 100))}.${String(size % 100).padStart(2, '0')}`;
}

/** Whole dollars, for sentences and axes: "$1,870", "−$20". */
export function dollarsWords(amount: Cents): string {
  const whole = Math.round(Math.abs(amount) / 100);
  return `${amount < 0 && whole > 0 ? MINUS : ''}$${groupedWhole(whole)}`;
}

/** "September" */
export function monthWords(date: Day): string {
  return MONTH_NAMES[monthOf(date) - 1] ?? date;
}

/** "14 Sep" */
export function dayWords(date: Day): string {
  return `${dayOfMonth(date)} ${monthWords(date).slice(0, 3)}`;
}

/** "14 Sep 2026" */
export function dateWords(date: Day): string {
  return `${dayWords(date)} ${yearOf(date)}`;
}
