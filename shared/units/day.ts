import * as z from 'zod/mini';

declare const dayBrand: unique symbol;

/** A civil date, `YYYY-MM-DD`. Compares as text. */
export type Day = string & { readonly [dayBrand]: 'day' };

/** A civil date that exists. */
export const daySchema = z.iso.date() as unknown as z.ZodMiniType<Day, string>;

const MS_PER_DAY = 86_400_000;

/** Brands a text as a day. Throws when no such date exists: that is a bug, never input (use `parseDay` for input). */
export function day(text: string): Day {
  const found = parseDay(text);
  if (found === null) throw new RangeError(`not a date: ${text}`);
  return found;
}

/** Reads `YYYY-MM-DD`; null when it is no date. */
export function parseDay(text: string): Day | null {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(text.trim());
  if (!match) return null;
  const made = dayOf(Number(match[1]), Number(match[2]), Number(match[3]));
  return made === text.trim() ? made : null;
}

/** The day of a year, month (1–12) and day of month; a day past the month's end runs into the next, as in a civil calendar. */
export function dayOf(year: number, month: number, dayOfMonth: number): Day {
  return dayFromNumber(Math.floor(Date.UTC(year, month - 1, dayOfMonth) / MS_PER_DAY));
}

/** Days since 1970-01-01. */
export function dayNumber(date: Day): number {
  return Date.UTC(yearOf(date), monthOf(date) - 1, dayOfMonth(date)) / MS_PER_DAY;
}

export function dayFromNumber(number: number): Day {
  const date = new Date(number * MS_PER_DAY);
  const year = String(date.getUTCFullYear()).padStart(4, '0');
  const month = String(date.getUTCMonth() + 1).padStart(2, '0');
  return `${year}-${month}-${String(date.getUTCDate()).padStart(2, '0')}` as Day;
}

export function addDays(date: Day, count: number): Day {
  return dayFromNumber(dayNumber(date) + count);
}

/** `to − from` in days. */
export function daysBetween(from: Day, to: Day): number {
  return dayNumber(to) - dayNumber(from);
}

export function yearOf(date: Day): number {
  return Number(date.slice(0, 4));
}

/** 1–12. */
export function monthOf(date: Day): number {
  return Number(date.slice(5, 7));
}

export function dayOfMonth(date: Day): number {
  return Number(date.slice(8, 10));
}

export function daysInMonth(year: number, month: number): number {
  return new Date(Date.UTC(year, month, 0)).getUTCDate();
}

/** The same day of the month `count` months on; the last day of a shorter month (31 January + 1 → 28 February). */
export function addMonths(date: Day, count: number): Day {
  const months = yearOf(date) * 12 + (monthOf(date) - 1) + count;
  const year = Math.floor(months / 12);
  const month = (months % 12) + 1;
  return dayOf(year, month, Math.min(dayOfMonth(date), daysInMonth(year, month)));
}

/** Whole months from one date to another, by month and year only. */
export function monthsBetween(from: Day, to: Day): number {
  return (yearOf(to) - yearOf(from)) * 12 + monthOf(to) - monthOf(from);
}

/** The first of some days; there must be one. */
export function earliestDay(first: Day, ...others: readonly Day[]): Day {
  return dayFromNumber(Math.min(dayNumber(first), ...others.map(dayNumber)));
}

/** The last of some days; there must be one. */
export function latestDay(first: Day, ...others: readonly Day[]): Day {
  return dayFromNumber(Math.max(dayNumber(first), ...others.map(dayNumber)));
}
