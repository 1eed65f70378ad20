import { type Day, dayOfMonth, monthOf, yearOf } from '#shared/units/day.ts';

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** "14 Aug 2026" */
export function sayDay(date: Day): string {
  return `${dayOfMonth(date)} ${MONTHS[monthOf(date) - 1]} ${yearOf(date)}`;
}

/** "14 Aug – 14 Sep 2026", with both years where they differ. */
export function sayCycle(span: { from: Day; to: Day }): string {
  const from = `${dayOfMonth(span.from)} ${MONTHS[monthOf(span.from) - 1]}`;
  return `${from}${yearOf(span.from) === yearOf(span.to) ? '' : ` ${yearOf(span.from)}`} – ${sayDay(span.to)}`;
}
