import type { HouseFacts } from '../facts/house.ts';
import {
  addDays,
  addMonths,
  type Day,
  dayOf,
  daysBetween,
  daysInMonth,
  earliestDay,
  monthOf,
  yearOf,
} from '../units/day.ts';
import { sumWh, type Wh, wh } from '../units/energy.ts';
import { Exact, exact } from '../units/rate.ts';
import type { DecimalText } from '../units/rate-text.ts';

/** What an installer's estimate says, and how it ages. */
export type ProductionEstimate = {
  /** By calendar month, January first. */
  monthlyWh: readonly Wh[];
  switchOn: Day;
  /** Yearly loss, fraction. */
  degradation: DecimalText;
};

const MONTHS_PER_YEAR = 12;

/** The house's estimate; null without one or before the roof is on. */
export function estimateOf(
  { expectedMonthlyWh, switchOn }: Pick<HouseFacts, 'expectedMonthlyWh' | 'switchOn'>,
  degradation: DecimalText,
): ProductionEstimate | null {
  return expectedMonthlyWh === null || switchOn === null
    ? null
    : { monthlyWh: expectedMonthlyWh, switchOn, degradation };
}

/**
 * Expected Wh of the days `[from, to)`: each calendar month's estimate shared evenly over its days, less the degradation of the whole years since switch-on
 * (the first year at full strength, as the projection ages it). Rounded once.
 */
export function expectedWh(estimate: ProductionEstimate, from: Day, to: Day): Wh {
  const kept = new Exact(1).minus(exact(estimate.degradation));
  let sum = new Exact(0);
  let at = from;
  while (at < to) {
    const years = wholeYears(estimate.switchOn, at);
    const until = earliestDay(to, nextMonth(at), addMonths(estimate.switchOn, (years + 1) * MONTHS_PER_YEAR));
    const month = monthOf(at);
    const perDay = new Exact(sumWh(estimate.monthlyWh.slice(month - 1, month))).div(daysInMonth(yearOf(at), month));
    sum = sum.plus(perDay.times(daysBetween(at, until)).times(kept.pow(years)));
    at = until;
  }
  return wh(sum.toDecimalPlaces(0, Exact.ROUND_HALF_UP).toNumber());
}

/** Whole years from one day to another, none before it. */
function wholeYears(from: Day, to: Day): number {
  const years = yearOf(to) - yearOf(from);
  return Math.max(0, addMonths(from, years * MONTHS_PER_YEAR) <= to ? years : years - 1);
}

function nextMonth(date: Day): Day {
  return addDays(dayOf(yearOf(date), monthOf(date), daysInMonth(yearOf(date), monthOf(date))), 1);
}
