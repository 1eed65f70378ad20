import { type Day, daysBetween } from '../units/day.ts';
import { seasonChanges, seasonOf } from './calendar.ts';
import type { Cycle } from './cycle-flows.ts';
import type { ChangeBy } from './plan.ts';
import type { Pricing } from './rates-in-force.ts';

/**
 * A stretch of a cycle with one price: `[from, to)`. `group` is the stretch over which interval data give the kWh, to be shared by days
 * inside it; without interval data it is the whole cycle.
 */
export type Part = { from: Day; to: Day; days: number; rateDay: Day; season: string | null; group: Group };
export type Group = { from: Day; to: Day; days: number; whole: boolean };

/**
 * Splits a cycle where a price or a season of the item changes inside it, as `rateChangeBy` and `seasonBy` say. `byIntervals`: the item's
 * kWh can be told interval by interval; otherwise a change by intervals is a change by days.
 */
export function splitCycle(cycle: Cycle, pricing: Pricing, byIntervals: boolean): readonly Part[] {
  const { from, to } = cycle;
  const { plan } = cycle.prepared;
  const rateDays = plan.rateChangeBy === 'readDate' ? NO_DAYS : rateChanges(cycle, pricing);
  const seasonDays =
    !pricing.bySeason || plan.seasonBy === 'readDate' ? NO_DAYS : seasonChanges(plan.calendar, from, to);
  if (rateDays.length === 0 && seasonDays.length === 0) return unsplit(cycle, pricing);
  const whole: Group = { from, to, days: cycle.days, whole: true };

  const cutBy = (change: ChangeBy) => byIntervals && change === 'intervals';
  const groupDays = [...(cutBy(plan.rateChangeBy) ? rateDays : []), ...(cutBy(plan.seasonBy) ? seasonDays : [])];
  const groups = stretches(from, to, groupDays).map(
    ([start, end]): Group =>
      groupDays.length === 0 ? whole : { from: start, to: end, days: daysBetween(start, end), whole: false },
  );
  return groups.flatMap((group) =>
    stretches(group.from, group.to, [...rateDays, ...seasonDays]).map(([start, end]) =>
      partOf(cycle, pricing, group, start, end),
    ),
  );
}

/** The whole cycle as one part: the same for all its items that do not go by season. */
function unsplit(cycle: Cycle, pricing: Pricing): readonly Part[] {
  if (!pricing.bySeason && cycle.unsplit) return cycle.unsplit;
  const { from, to, days } = cycle;
  const parts = [partOf(cycle, pricing, { from, to, days, whole: true }, from, to)];
  if (!pricing.bySeason) cycle.unsplit = parts;
  return parts;
}

const NO_DAYS: readonly Day[] = [];

/** The days inside the cycle on which a row comes into force that holds for the season there. */
function rateChanges(cycle: Cycle, pricing: Pricing): readonly Day[] {
  let days: Day[] | null = null;
  for (const change of pricing.changes) {
    if (change.from <= cycle.from || change.from >= cycle.to) continue;
    if (change.season !== null && change.season !== seasonFor(cycle, change.from)) continue;
    days ??= [];
    days.push(change.from);
  }
  return days ?? NO_DAYS;
}

function seasonFor(cycle: Cycle, date: Day): string | null {
  const { calendar, seasonBy } = cycle.prepared.plan;
  return seasonOf(calendar, seasonBy === 'readDate' ? cycle.to : date);
}

function partOf(cycle: Cycle, pricing: Pricing, group: Group, from: Day, to: Day): Part {
  return {
    from,
    to,
    days: from === cycle.from && to === cycle.to ? cycle.days : daysBetween(from, to),
    rateDay: cycle.prepared.plan.rateChangeBy === 'readDate' ? cycle.to : from,
    season: pricing.bySeason ? seasonFor(cycle, from) : null,
    group,
  };
}

function stretches(from: Day, to: Day, cuts: readonly Day[]): [Day, Day][] {
  const inside = [...new Set(cuts)].filter((date) => date > from && date < to).sort();
  const starts = [from, ...inside];
  return starts.map((start, index): [Day, Day] => [start, starts[index + 1] ?? to]);
}
