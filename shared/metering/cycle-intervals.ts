import type { IntervalChannel } from '../facts/papers.ts';
import type { RatePlan } from '../settlement/plan.ts';
import type { CycleUsage } from '../settlement/settlement.ts';
import { addDays, type Day, dayOfMonth, daysBetween, monthOf, yearOf } from '../units/day.ts';
import { type IntervalIndex, intervalDayOf } from './interval-index.ts';

/** Whether a plan prices or nets inside the cycle, so that totals are not enough to settle it. */
export function asksForIntervals(plan: RatePlan): boolean {
  const inside = (netting: string | null) => netting !== null && netting !== 'none' && netting !== 'cycle';
  return (
    inside(plan.netting) ||
    plan.rateChangeBy === 'intervals' ||
    plan.seasonBy === 'intervals' ||
    plan.calendar.periods.length > 0 ||
    [...plan.charges, ...plan.credits, ...plan.banks].some((item) => inside(item.netting))
  );
}

/**
 * The steps of import, export and (where there is a file of it) production over `[from, to)`, from local midnight; null unless import and
 * export are there without a gap and in equal steps of an hour or less.
 */
export function cycleIntervals(index: IntervalIndex, from: Day, to: Day, timeZone: string): CycleUsage['intervals'] {
  const importing = steps(index, 'import', from, to);
  const exporting = steps(index, 'export', from, to);
  if (!importing || !exporting || importing.minutes !== exporting.minutes) return null;
  if (importing.values.length !== exporting.values.length) return null;
  const production = steps(index, 'production', from, to);
  return {
    startUtc: midnightUtc(from, timeZone),
    minutes: importing.minutes,
    importWh: importing.values,
    exportWh: exporting.values,
    productionWh: production?.minutes === importing.minutes ? production.values : [],
  };
}

function steps(
  index: IntervalIndex,
  channel: IntervalChannel,
  from: Day,
  to: Day,
): { minutes: number; values: number[] } | null {
  const values: number[] = [];
  let minutes: number | null = null;
  const days = daysBetween(from, to);
  for (let at = 0; at < days; at += 1) {
    const day = intervalDayOf(index, channel, addDays(from, at));
    if (!day || day.minutes > 60 || (minutes !== null && day.minutes !== minutes)) return null;
    minutes = day.minutes;
    for (const value of day.values) {
      if (value === null) return null;
      values.push(value);
    }
  }
  return minutes === null ? null : { minutes, values };
}

/** The instant a civil day begins in a time zone, as an ISO text in UTC. */
export function midnightUtc(date: Day, timeZone: string): string {
  const wanted = Date.UTC(yearOf(date), monthOf(date) - 1, dayOfMonth(date));
  const clock = clockOf(timeZone);
  let instant = wanted;
  // Two rounds settle it: the first finds the offset near midnight, the second the one in force at the corrected instant.
  for (let round = 0; round < 2; round += 1) {
    const parts = new Map(clock.formatToParts(new Date(instant)).map((part) => [part.type, Number(part.value)]));
    const part = (name: Intl.DateTimeFormatPartTypes) => parts.get(name) ?? 0;
    const shown = Date.UTC(part('year'), part('month') - 1, part('day'), part('hour'), part('minute'));
    instant += wanted - shown;
  }
  return new Date(instant).toISOString();
}

const clocks = new Map<string, Intl.DateTimeFormat>();

/** A zone's clock takes longer to make than to ask. */
function clockOf(timeZone: string): Intl.DateTimeFormat {
  const known = clocks.get(timeZone);
  if (known) return known;
  const made = new Intl.DateTimeFormat('en-US', {
    timeZone,
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
  });
  clocks.set(timeZone, made);
  return made;
}
