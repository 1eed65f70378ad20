import type { UsageBefore } from '../facts/house.ts';
import type { Statement } from '../facts/papers.ts';
import { registerEnergy } from '../metering/register.ts';
import { addDays, type Day, daysBetween, monthOf } from '../units/day.ts';
import { kwhText, type Wh } from '../units/energy.ts';
import { Exact, kwhOf, roundToWh } from '../units/rate.ts';

/** Use estimated from the time before the roof: kWh per day of those bills × the cycle's days. */
export type UseEstimate = { wh: Wh; method: 'sameMonthBefore' | 'yearlyMeanBefore'; words: string };

/** Bills must cover most of a year for their mean to stand for a year: with less, a season would be taken for all seasons. */
const YEAR_OF_BILLS_DAYS = 300;

/** Use before the roof: as stated, and from statements that end by the switch-on day. */
export function usageBeforeRoof(
  stated: readonly UsageBefore[],
  inForce: readonly Statement[],
  switchOn: Day | null,
): UsageBefore[] {
  const all = [...stated];
  if (switchOn === null) return all;
  for (const statement of inForce) {
    if (statement.to > switchOn || all.some((one) => one.from < statement.to && statement.from < one.to)) continue;
    const importWh = registerEnergy(statement.reads, 'import', statement.source)?.wh ?? statement.importWh;
    if (importWh !== null) all.push({ from: statement.from, to: statement.to, importWh });
  }
  return all;
}

/**
 * The use of a cycle by fallback (ledger.md §5.1): kWh per day of the bills of the same month before the roof × days; else their yearly
 * mean × days, where they cover most of a year; null when neither can be said. A bill belongs to the month of its middle day.
 */
export function estimateUse(before: readonly UsageBefore[], from: Day, to: Day): UseEstimate | null {
  const days = daysBetween(from, to);
  const month = middleMonth(from, to);
  const same = before.filter((one) => middleMonth(one.from, one.to) === month);
  if (same.length > 0) return estimate(same, days, 'sameMonthBefore', 'the same month before the roof');
  const covered = before.reduce((sum, one) => sum + daysBetween(one.from, one.to), 0);
  if (covered >= YEAR_OF_BILLS_DAYS) return estimate(before, days, 'yearlyMeanBefore', 'the year before the roof');
  return null;
}

function estimate(
  bills: readonly UsageBefore[],
  days: number,
  method: UseEstimate['method'],
  when: string,
): UseEstimate {
  let total = new Exact(0);
  let covered = 0;
  for (const bill of bills) {
    total = total.plus(kwhOf(bill.importWh));
    covered += daysBetween(bill.from, bill.to);
  }
  const wh = roundToWh(total.times(days).div(covered));
  return {
    wh,
    method,
    words: `${kwhText(wh)} kWh, estimated from ${when}: ${total.toString()} kWh in ${covered} days × ${days} days`,
  };
}

function middleMonth(from: Day, to: Day): number {
  return monthOf(addDays(from, Math.floor(daysBetween(from, to) / 2)));
}
