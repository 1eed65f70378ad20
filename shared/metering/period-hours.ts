import { minuteOf, periodIn, seasonOf } from '../settlement/calendar.ts';
import { keptAt } from '../settlement/place.ts';
import type { PlanCalendar } from '../settlement/plan.ts';
import { addDays, type Day } from '../units/day.ts';

const HOURS = 24;
const MINUTES = 60;
/** Days of a week that are weekdays, and weekend: a span is taken to have them in this measure, whatever days it begins and ends on. */
const WEEKDAYS = 5;
const WEEKEND = 2;

/**
 * How much of each hour of the day lies in each of a calendar's periods over a span: a row per period in the calendar's order, in it 24 hours of weekdays and
 * then 24 of weekends, as minutes × days × days of the week. A calendar without periods has one row of all hours. Null where an hour lies in none.
 */
export function periodHours(calendar: PlanCalendar, from: Day, to: Day): number[][] | null {
  const days = new Map<string | null, number>();
  for (let date = from; date < to; date = addDays(date, 1)) {
    const season = seasonOf(calendar, date);
    days.set(season, (days.get(season) ?? 0) + 1);
  }
  const rows = cellsOf(calendar).map(() => new Array<number>(2 * HOURS).fill(0));
  for (const [season, count] of days) {
    const table = seasonTable(calendar, season);
    if (table === null) return null;
    for (const [cell, hours] of table.entries()) {
      const row = keptAt(rows, cell);
      for (const [at, minutes] of hours.entries()) {
        row[at] = Number(row[at]) + minutes * count * (at < HOURS ? WEEKDAYS : WEEKEND);
      }
    }
  }
  return rows;
}

/** What a shape of 48 hours comes to in each period. */
export function weighHours(hours: readonly (readonly number[])[], shape: readonly number[]): number[] {
  return hours.map((row) => {
    let sum = 0;
    for (const [at, weight] of row.entries()) sum += weight * Number(shape[at]);
    return sum;
  });
}

/** All hours alike, or those from one to another: `toHour` at or before `fromHour` goes past midnight, the same hour twice is the whole day. */
export function hoursBetween(fromHour: number, toHour: number): number[] {
  const day = Array.from({ length: HOURS }, (_, hour) => {
    const inside = fromHour < toHour ? hour >= fromHour && hour < toHour : hour >= fromHour || hour < toHour;
    return inside ? 1 : 0;
  });
  return [...day, ...day];
}

/** The parts a plan's energy falls into: its periods, or all of it where it has none. */
export function cellsOf(calendar: PlanCalendar): readonly (string | null)[] {
  return calendar.periods.length === 0 ? [null] : calendar.periods.map((period) => period.id);
}

type Table = number[][] | null;
const tables = new WeakMap<PlanCalendar, Map<string | null, Table>>();

function seasonTable(calendar: PlanCalendar, season: string | null): Table {
  let ofCalendar = tables.get(calendar);
  if (!ofCalendar) {
    ofCalendar = new Map();
    tables.set(calendar, ofCalendar);
  }
  const known = ofCalendar.get(season);
  if (known !== undefined) return known;
  const made = makeTable(calendar, season);
  ofCalendar.set(season, made);
  return made;
}

/** Minutes of each hour in each period, weekday and weekend; null where some are in none. */
function makeTable(calendar: PlanCalendar, season: string | null): Table {
  const cells = cellsOf(calendar);
  const rows = cells.map(() => new Array<number>(2 * HOURS).fill(0));
  const cuts = cutsOf(calendar);
  for (const weekend of [false, true]) {
    for (const [at, minute] of cuts.entries()) {
      const end = cuts[at + 1];
      if (end === undefined) continue;
      const cell = cells.indexOf(periodIn(calendar, season, weekend, minute));
      const row = rows[cell];
      if (!row) return null;
      const hour = Math.floor(minute / MINUTES) + (weekend ? HOURS : 0);
      row[hour] = Number(row[hour]) + end - minute;
    }
  }
  return rows;
}

/** Every minute of the day on which an hour or a period may begin or end. */
function cutsOf(calendar: PlanCalendar): number[] {
  const cuts = new Set(Array.from({ length: HOURS + 1 }, (_, hour) => hour * MINUTES));
  for (const { when } of calendar.periods) {
    if (when === 'rest') continue;
    for (const span of when) cuts.add(minuteOf(span.from)).add(minuteOf(span.to));
  }
  return [...cuts].sort((a, b) => a - b);
}
