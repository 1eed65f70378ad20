import type { Cents } from '../units/cents.ts';
import { type Day, dayOfMonth, monthOf, yearOf } from '../units/day.ts';
import { type Wh, wh } from '../units/energy.ts';

const MONTHS = [
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

/** "$1,204.50", "−$20.14". */
export function sayMoney(amount: Cents): string {
  const size = Math.abs(amount);
  return `${amount < 0 ? '−' : ''}$${grouped(Math.floor(size / 100))}.${String(size % 100).padStart(2, '0')}`;
}

/** Whole dollars, for sentences: "$1,870". */
export function sayDollars(amount: Cents): string {
  const whole = Math.round(Math.abs(amount) / 100);
  return `${amount < 0 && whole > 0 ? '−' : ''}$${grouped(whole)}`;
}

/** Whole kWh with thousands commas, "1,284"; with its decimals where it is not whole and below 100. */
export function sayKwh(amount: Wh): string {
  const size = Math.abs(amount);
  const sign = amount < 0 ? '−' : '';
  if (size >= 100_000 || size % 1000 === 0) return `${sign}${grouped(Math.round(size / 1000))}`;
  const tenths = Math.round(size / 100);
  return `${sign}${Math.floor(tenths / 10)}.${tenths % 10}`;
}

/** A difference between two energies, without its sign: whole kWh from ten on, "44"; else with one decimal, "1.4". */
export function sayGap(difference: Wh): string {
  const size = Math.abs(difference);
  return sayKwh(wh(size >= 10_000 ? Math.round(size / 1000) * 1000 : size));
}

/** "14 Sep". */
export function sayDay(date: Day): string {
  return `${dayOfMonth(date)} ${sayMonth(date).slice(0, 3)}`;
}

/** "14 Sep 2026". */
export function sayDate(date: Day): string {
  return `${sayDay(date)} ${yearOf(date)}`;
}

/** "September". */
export function sayMonth(date: Day): string {
  return MONTHS[monthOf(date) - 1] ?? date;
}

/** "1 day", "31 days". */
export function sayCount(count: number, one: string, many: string): string {
  return `${grouped(count)} ${count === 1 ? one : many}`;
}

function grouped(whole: number): string {
  return String(whole).replace(/\B(?=(\d{3})+$)/g, ',');
}
