import { addDays, type Day, dayNumber, dayOf, yearOf } from '../units/day.ts';
import type { Period, PlanCalendar, Season } from './plan.ts';

/** The season of a civil day, by yearly days inclusive that may wrap the new year; null outside every season. */
export function seasonOf(calendar: PlanCalendar, date: Day): string | null {
  const yearly = date.slice(5);
  for (const season of calendar.seasons) if (inSeason(season, yearly)) return season.id;
  return null;
}

function inSeason(season: Season, yearly: string): boolean {
  return season.from <= season.to
    ? yearly >= season.from && yearly <= season.to
    : yearly >= season.from || yearly <= season.to;
}

/** The days strictly inside `(from, to)` on which another season begins, in order. */
export function seasonChanges(calendar: PlanCalendar, from: Day, to: Day): Day[] {
  const found = new Set<Day>();
  for (let year = yearOf(from) - 1; year <= yearOf(to); year += 1) {
    for (const season of calendar.seasons) {
      for (const date of [yearlyDayIn(year, season.from), addDays(yearlyDayIn(year, season.to), 1)]) {
        if (date > from && date < to && seasonOf(calendar, date) !== seasonOf(calendar, addDays(date, -1)))
          found.add(date);
      }
    }
  }
  return [...found].sort();
}

/** A yearly day in a year; 29 February in an ordinary year is 1 March. */
export function yearlyDayIn(year: number, yearly: string): Day {
  return dayOf(year, Number(yearly.slice(0, 2)), Number(yearly.slice(3, 5)));
}

/** Whether a period has hours at all in a season: a bill of another season lacks it. */
export function periodExists(period: Period, season: string | null): boolean {
  return period.when === 'rest' || period.when.some((span) => span.season === undefined || span.season === season);
}

/** Whether a day counts as a weekend: Saturday, Sunday, or as the plan's holidays say. */
export function isWeekend(calendar: PlanCalendar, date: Day): boolean {
  const { holidays } = calendar;
  if (holidays?.dates.includes(date)) return holidays.as === 'weekend';
  // 1970-01-01 was a Thursday.
  const weekday = (((dayNumber(date) + 4) % 7) + 7) % 7;
  return weekday === 0 || weekday === 6;
}

/** The time-of-use period at a local day and minute of the day (0–1439): the first that matches, else the one that is the rest; null in a gap. */
export function periodAt(calendar: PlanCalendar, date: Day, minute: number): string | null {
  return periodIn(calendar, seasonOf(calendar, date), isWeekend(calendar, date), minute);
}

/** The same for a day of which only the season, and whether it counts as a weekend, is known. */
export function periodIn(
  calendar: PlanCalendar,
  season: string | null,
  weekend: boolean,
  minute: number,
): string | null {
  let rest: string | null = null;
  for (const period of calendar.periods) {
    if (period.when === 'rest') {
      rest ??= period.id;
      continue;
    }
    for (const span of period.when) {
      if (span.season !== undefined && span.season !== season) continue;
      if (span.days !== 'all' && (span.days === 'weekend') !== weekend) continue;
      if (minute >= minuteOf(span.from) && minute < minuteOf(span.to)) return period.id;
    }
  }
  return rest;
}

/** Minutes since midnight; "24:00" is 1440. */
export function minuteOf(clock: string): number {
  return Number(clock.slice(0, 2)) * 60 + Number(clock.slice(3, 5));
}

const cellKeys = new WeakMap<PlanCalendar, string>();

/** Whether two calendars have the same seasons and periods, so that what fell on those of one fell on those of the other; holidays may differ. */
export function sameCells(a: PlanCalendar, b: PlanCalendar): boolean {
  return a === b || cellKey(a) === cellKey(b);
}

function cellKey(calendar: PlanCalendar): string {
  const known = cellKeys.get(calendar);
  if (known !== undefined) return known;
  const key = JSON.stringify([calendar.seasons, calendar.periods.map(({ id, when }) => [id, when])]);
  cellKeys.set(calendar, key);
  return key;
}
