import type { CostFacts } from '../facts/house.ts';
import { addMonths, type Day } from '../units/day.ts';

const MONTHS_BETWEEN = { month: 1, quarter: 3, year: 12 } as const;

/**
 * The days on which a sum moves, through a day: its own day alone, or that day and every month, quarter or year after it to its last. Counted from the
 * first day, so that one that begins on the 31st falls on the last day of each shorter month and on the 31st again after it.
 */
export function costDays(cost: Pick<CostFacts, 'on' | 'every' | 'until'>, through: Day): Day[] {
  const last = cost.until !== null && cost.until < through ? cost.until : through;
  if (cost.every === null) return cost.on <= through ? [cost.on] : [];
  const months = MONTHS_BETWEEN[cost.every];
  const days: Day[] = [];
  for (let on = cost.on; on <= last; on = addMonths(cost.on, days.length * months)) days.push(on);
  return days;
}
