import type { IntervalDay } from '../facts/papers.ts';
import { keptAt } from '../settlement/place.ts';
import { type Day, monthOf } from '../units/day.ts';

/** Mean Wh a day sent out in each hour of the day, by calendar month, January first. */
export type HourlyExport = { months: number[][]; from: 'intervals' | 'assumed' };

const HOURS = 24;
/** Days a month must hold before its own mean is taken. */
const ENOUGH_DAYS = 20;

/**
 * When the house sends out, from its export readings of an hour or finer; only whole days of 24 hours count. A month with too few such days takes the mean of
 * the months that have enough. Without any, a stated shape: a half sine from 6:00 to 18:00 (common practice, no source) of one Wh a day, to be scaled by
 * the month's export.
 */
export function hourlyExportOf(intervals: readonly IntervalDay[]): HourlyExport {
  const sums = Array.from({ length: 12 }, () => ({ days: 0, hours: new Array<number>(HOURS).fill(0) }));
  for (const day of intervals) {
    if (day.channel !== 'export' || day.minutes > 60) continue;
    const perHour = 60 / day.minutes;
    if (!Number.isInteger(perHour) || day.values.length !== HOURS * perHour || day.values.includes(null)) continue;
    const month = keptAt(sums, monthOf(day.day) - 1);
    month.days += 1;
    for (const [step, value] of day.values.entries()) {
      const hour = Math.floor(step / perHour);
      month.hours[hour] = keptAt(month.hours, hour) + Number(value);
    }
  }
  const known = sums.filter((month) => month.days >= ENOUGH_DAYS);
  if (known.length === 0) return { months: sums.map(() => halfSine()), from: 'assumed' };
  const meanOf = (months: readonly { days: number; hours: number[] }[]) =>
    Array.from({ length: HOURS }, (_, hour) => {
      const days = months.reduce((sum, month) => sum + month.days, 0);
      return Math.round(months.reduce((sum, month) => sum + keptAt(month.hours, hour), 0) / days);
    });
  const all = meanOf(known);
  return { months: sums.map((month) => (month.days >= ENOUGH_DAYS ? meanOf([month]) : all)), from: 'intervals' };
}

function halfSine(): number[] {
  return Array.from({ length: HOURS }, (_, hour) =>
    hour < 6 || hour >= 18 ? 0 : (Math.cos(((hour - 6) / 12) * Math.PI) - Math.cos(((hour - 5) / 12) * Math.PI)) / 2,
  );
}

/**
 * How much of a day's export falls between two hours, as a share of the day's; `toHour` at or before `fromHour` goes past midnight. The same hour twice is
 * the whole day.
 */
export function shareInHours(profile: HourlyExport, on: Day, fromHour: number, toHour: number): number {
  const hours = keptAt(profile.months, monthOf(on) - 1);
  const total = hours.reduce((sum, value) => sum + value, 0);
  if (total === 0) return 0;
  const inside = hours.reduce((sum, value, hour) => {
    const isInside = fromHour < toHour ? hour >= fromHour && hour < toHour : hour >= fromHour || hour < toHour;
    return isInside ? sum + value : sum;
  }, 0);
  return inside / total;
}
