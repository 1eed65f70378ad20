import * as z from 'zod/mini';
import type { IntervalChannel, IntervalDay } from '../facts/papers.ts';
import { keptAt } from '../settlement/place.ts';
import { type Day, dayNumber, monthOf } from '../units/day.ts';

const hours = z.array(z.int());

/**
 * The shape of a mean day of each calendar month, January first: 24 hours of weekdays, then 24 of weekends, in tens of Wh. A shape shares out what is known as a sum;
 * it is no measure of it. `cancels`: millionths of the lesser of import and export that cancel inside clock hours and quarter-hours; null where the readings are too coarse.
 */
export const hourlyProfile = z.object({
  months: z.array(
    z.object({
      import: hours,
      export: hours,
      /** Null where production is not read by the hour. */ self: z.nullable(hours),
    }),
  ),
  cancels: z.object({ hour: z.nullable(hours), '15min': z.nullable(hours) }),
});
export type HourlyProfile = z.infer<typeof hourlyProfile>;

const HOURS = 24;
const MILLION = 1_000_000;
/** Days a month must hold before its own mean is taken. */
const ENOUGH_DAYS = 20;

type Sum = { days: number; hours: number[] };
/** What a calendar month's days add up to: weekdays, then weekends. */
type MonthSum = {
  import: Sum[];
  export: Sum[];
  self: Sum[];
  lesser: number;
  cancelled: { hour: number; '15min': number };
};

/**
 * The hourly shape of a house from its readings of an hour or finer on and after `since`; only whole days of 24 hours with import and export count. A month with too
 * few such days takes the mean of all. Null without enough of them.
 */
export function hourlyProfileOf(intervals: readonly IntervalDay[], since: Day): HourlyProfile | null {
  const read = byChannel(intervals, since);
  const months = Array.from({ length: 12 }, emptyMonth);
  const all = emptyMonth();
  let isQuarterly = true;
  for (const [date, importing] of read.import) {
    const exporting = read.export.get(date);
    const month = keptAt(months, monthOf(date) - 1);
    if (!exporting || exporting.minutes !== importing.minutes) continue;
    if (importing.minutes > 15) isQuarterly = false;
    const production = read.production.get(date) ?? read.monitor.get(date) ?? null;
    for (const into of [month, all]) addDay(into, date, importing, exporting, production);
  }
  if (daysOf(all.import) < ENOUGH_DAYS) return null;
  const chosen = months.map((month) => (daysOf(month.import) < ENOUGH_DAYS ? all : month));
  const hasSelf = daysOf(all.self) >= ENOUGH_DAYS;
  const shareOf = (block: 'hour' | '15min') =>
    chosen.map(({ lesser, cancelled }) => (lesser === 0 ? 0 : Math.round((cancelled[block] * MILLION) / lesser)));
  return {
    months: chosen.map((month) => ({
      import: meanOf(month.import, all.import),
      export: meanOf(month.export, all.export),
      self: hasSelf ? meanOf(daysOf(month.self) < ENOUGH_DAYS ? all.self : month.self, all.self) : null,
    })),
    cancels: { hour: shareOf('hour'), '15min': isQuarterly ? shareOf('15min') : null },
  };
}

type Reading = { minutes: number; values: readonly number[] };

function byChannel(intervals: readonly IntervalDay[], since: Day): Record<IntervalChannel, Map<Day, Reading>> {
  const read: Record<IntervalChannel, Map<Day, Reading>> = {
    import: new Map(),
    export: new Map(),
    production: new Map(),
    monitor: new Map(),
  };
  for (const { channel, day, minutes, values } of intervals) {
    if (day < since || minutes > 60 || values.length * minutes !== HOURS * 60) continue;
    if (isWhole(values)) read[channel].set(day, { minutes, values });
  }
  return read;
}

function isWhole(values: readonly (number | null)[]): values is readonly number[] {
  return !values.includes(null);
}

function emptyMonth(): MonthSum {
  const sums = () => [0, 1].map(() => ({ days: 0, hours: new Array<number>(HOURS).fill(0) }));
  return { import: sums(), export: sums(), self: sums(), lesser: 0, cancelled: { hour: 0, '15min': 0 } };
}

function addDay(into: MonthSum, date: Day, importing: Reading, exporting: Reading, production: Reading | null): void {
  const bought = inBlocks(importing, 60);
  const sent = inBlocks(exporting, 60);
  addTo(into.import, date, bought);
  addTo(into.export, date, sent);
  if (production) {
    const made = inBlocks(production, 60);
    addTo(
      into.self,
      date,
      made.map((value, hour) => Math.max(0, value - Number(sent[hour]))),
    );
  }
  const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);
  into.lesser += Math.min(sum(bought), sum(sent));
  into.cancelled.hour += sum(bought.map((value, hour) => Math.min(value, Number(sent[hour]))));
  if (importing.minutes > 15) return;
  const quarters = inBlocks(exporting, 15);
  into.cancelled['15min'] += sum(inBlocks(importing, 15).map((value, at) => Math.min(value, Number(quarters[at]))));
}

function inBlocks({ minutes, values }: Reading, blockMinutes: number): number[] {
  const blocks = new Array<number>((HOURS * 60) / blockMinutes).fill(0);
  for (const [step, value] of values.entries()) {
    const block = Math.floor((step * minutes) / blockMinutes);
    blocks[block] = Number(blocks[block]) + value;
  }
  return blocks;
}

function addTo(sums: Sum[], date: Day, values: readonly number[]): void {
  // 1970-01-01 was a Thursday.
  const weekday = (((dayNumber(date) + 4) % 7) + 7) % 7;
  const sum = keptAt(sums, weekday === 0 || weekday === 6 ? 1 : 0);
  sum.days += 1;
  for (const [hour, value] of values.entries()) sum.hours[hour] = Number(sum.hours[hour]) + value;
}

function daysOf(sums: readonly Sum[]): number {
  return sums.reduce((total, sum) => total + sum.days, 0);
}

/** Mean weekday and weekend in tens of Wh; a month that lacks one of them takes that of all months. */
function meanOf(sums: readonly Sum[], all: readonly Sum[]): number[] {
  return sums.flatMap((sum, at) => {
    const of = sum.days > 0 ? sum : keptAt(all, at);
    return of.hours.map((value) => Math.round(value / Math.max(1, of.days) / 10));
  });
}
