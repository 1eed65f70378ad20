import { daysBetween } from '../units/day.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareText, nothingToCompare } from './make-check.ts';

/** 27 ≤ D ≤ 35 else flag (net-metering.md §4 "days"). */
export const USUAL_DAYS = { least: 27, most: 35 };

/**
 * A billing cycle has 27 to 35 days (net-metering.md §4). The first statement, which begins on the day the account or the roof did, may have any
 * length. `found` is the nearest usual length.
 */
export function daysInRangeCheck({ paper }: CheckContext): Check {
  const title = `Length of the cycle, usually ${USUAL_DAYS.least} to ${USUAL_DAYS.most} days`;
  const { statement } = paper;
  const days = daysBetween(statement.from, statement.to);
  if (paper.previous === null || paper.split !== null) {
    return nothingToCompare('daysInRange', '', 'days', {
      title,
      stated: String(days),
      cause: 'A first cycle may have any length.',
    });
  }
  const usual = Math.min(USUAL_DAYS.most, Math.max(USUAL_DAYS.least, days));
  const sides = {
    stated: String(days),
    found: String(usual),
    difference: String(days - usual),
    unit: 'days' as const,
  };
  return compareText('daysInRange', '', title, sides, () => ({
    cause: `A ${days < usual ? 'short' : 'long'} cycle of ${days} days: first, final and re-routed bills are. Charges and limits by the day go with its days.`,
    advice:
      'Compare the service dates with the paper. If they are as printed and you know why, accept it with a note; if not, ask the utility.',
  }));
}
