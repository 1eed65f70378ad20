import type { IncentiveFacts } from '../facts/finance.ts';
import { sayDate, sayKwh } from '../ledger/say.ts';
import { expectedWh, type ProductionEstimate } from '../metering/expected-production.ts';
import type { Figure } from '../position/position.ts';
import { addDays, type Day, latestDay, monthsBetween } from '../units/day.ts';
import type { Wh } from '../units/energy.ts';
import { incentiveFor } from './incentive.ts';
import { kwhInput, plainInput, stated } from './inputs.ts';

/** What is left of an incentive's term from a day on. `figure` is an estimate, before income tax. */
export type IncentiveLeft = {
  lastDay: Day;
  /** Calendar months that still have a day in the term, the current one among them. */
  months: number;
  expectedWh: Wh | null;
  figure: Figure | null;
};

/** Months left of the term, and the installer's estimate for its days (aged) × the rate; null figures without an estimate. */
export function incentiveLeft(
  terms: IncentiveFacts,
  estimate: ProductionEstimate | null,
  today: Day,
): IncentiveLeft | null {
  if (today > terms.lastDay) return null;
  const from = latestDay(today, terms.firstDay);
  const left = { lastDay: terms.lastDay, months: monthsBetween(from, terms.lastDay) + 1 };
  if (estimate === null) return { ...left, expectedWh: null, figure: null };
  const expected = expectedWh(estimate, from, addDays(terms.lastDay, 1));
  return {
    ...left,
    expectedWh: expected,
    figure: {
      amountCents: incentiveFor(terms, expected, 1, 1),
      working: {
        words: `${sayKwh(expected)} kWh expected from ${sayDate(from)} × $${terms.ratePerKwh}; an estimate, before income tax`,
        formula: 'roundCents(rate * expected)',
        inputs: [
          plainInput('rate', 'Rate', terms.ratePerKwh, 'USD/kWh', stated('Incentive terms as entered')),
          kwhInput(
            'expected',
            'Expected to the last day of the term',
            expected,
            stated('Installer’s estimate by month, aged'),
          ),
        ],
        unit: 'USD',
        basis: 'estimated',
      },
    },
  };
}
