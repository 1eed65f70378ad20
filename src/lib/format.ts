import type { Cents } from '#shared/units/cents.ts';
import { type Day, dayOfMonth } from '#shared/units/day.ts';
import type { Wh } from '#shared/units/energy.ts';
import { dateWords, dayWords, dollarsWords, groupedWhole, MINUS, monthWords } from '#shared/units/words.ts';

export {
  dateWords as fullDate,
  dayWords as dayMonth,
  dollarsWords as dollars,
  moneyWords as money,
  monthWords as monthName,
} from '#shared/units/words.ts';

export const MISSING = '\u2013';

/** Whole dollars without the sign, where words carry it. */
export function dollarsSize(amount: Cents): string {
  return dollarsWords(Math.abs(amount) as Cents);
}

/** kWh to the whole kWh, grouped; `missing` when null. */
export function kwh(amount: Wh | null): string {
  if (amount === null) return MISSING;
  const whole = Math.round(Math.abs(amount) / 1000);
  return `${amount < 0 && whole > 0 ? MINUS : ''}${groupedWhole(whole)}`;
}

/** A decimal text as people read it: grouped, with a true minus. */
export function decimal(text: string): string {
  const [whole = '0', rest] = text.replace('-', '').split('.');
  return `${text.startsWith('-') ? MINUS : ''}${groupedWhole(Number(whole))}${rest ? `.${rest}` : ''}`;
}

/** A decimal text in dollars as people read it: "−$0.0950". */
export function decimalDollars(text: string): string {
  const said = decimal(text);
  return said.startsWith(MINUS) ? `${MINUS}$${said.slice(1)}` : `$${said}`;
}

/** "14 September" */
export function longDayMonth(day: Day): string {
  return `${dayOfMonth(day)} ${monthWords(day)}`;
}

/** "Jun 2037" */
export function monthYear(day: Day): string {
  return `${monthWords(day).slice(0, 3)} ${day.slice(0, 4)}`;
}

/** "14 Aug – 14 Sep"; the years too where they differ from each other. */
export function cycleRange(from: Day, to: Day): string {
  return from.slice(0, 4) === to.slice(0, 4)
    ? `${dayWords(from)} \u2013 ${dayWords(to)}`
    : `${dateWords(from)} \u2013 ${dateWords(to)}`;
}

/** "14 Aug – 14 Sep 2026", for a list that spans years. */
export function cycleRangeWithYear(from: Day, to: Day): string {
  const range = cycleRange(from, to);
  return from.slice(0, 4) === to.slice(0, 4) ? `${range} ${to.slice(0, 4)}` : range;
}
