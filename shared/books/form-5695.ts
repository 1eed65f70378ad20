import type { CreditCost } from '../facts/finance.ts';
import { type Cents, cents, subtractCents, ZERO_CENTS } from '../units/cents.ts';
import { Exact, exact } from '../units/rate.ts';
import type { DecimalText } from '../units/rate-text.ts';
import type { CreditLines } from './credit-lines.ts';
import { creditCapCents } from './credit-rate.ts';

/** From this share of home use on, the whole cost counts: 26 U.S.C. 25D(e)(7). */
const WHOLE_FROM_SHARE = '0.80';

/**
 * Line 1: what qualifies less what reduces it, in the home's share (26 U.S.C. 25D(e)(7): under 80 % home use only that share, else all), in
 * whole dollars and never below zero. What is left out is shown and not counted.
 */
export function creditLine1(costs: readonly CreditCost[], homeShare: DecimalText): Cents {
  const net = costs.reduce((sum, cost) => sum + signed(cost), 0);
  return wholeDollars(new Exact(Math.max(0, net)).times(countedShare(homeShare)));
}

/** The share of the cost that counts. */
export function countedShare(homeShare: DecimalText): Exact {
  return exact(homeShare).gte(exact(WHOLE_FROM_SHARE)) ? new Exact(1) : exact(homeShare);
}

function signed(cost: CreditCost): number {
  if (cost.treatment === 'leftOut') return 0;
  return cost.treatment === 'qualified' ? cost.amountCents : -cost.amountCents;
}

/** Line 6b: line 6a at the rate of the year, in whole dollars, and no more than the law's own sum where it sets one. */
export function creditLine6b(line6aCents: Cents, rate: DecimalText, taxYear: number): Cents {
  const cap = creditCapCents(taxYear);
  const atRate = wholeDollars(new Exact(line6aCents).times(exact(rate)));
  return cap !== null && atRate > cap ? cap : atRate;
}

/** A tax year as Form 5695 Part I takes it: line 1 and its rate where cost enters, and line 14 if known. */
export type CreditYearInput = {
  taxYear: number;
  line1Cents: Cents;
  rate: DecimalText | null;
  limitCents: Cents | null;
};

/**
 * Form 5695 Part I, solar electric only, over the years in order: 6a = 1, 6b = 6a × the rate of the year placed in service, 12 = the last line 16,
 * 13 = 6b + 12, 15 = the smaller of 13 and 14, 16 = 13 − 15. Whole dollars at every line, half up. A carryforward stays in dollars and passes over
 * years that are not listed. Without a limit 15 and 16 are unknown, and so is what later years carry in.
 */
export function carryCredit(carryInCents: Cents, years: readonly CreditYearInput[]): CreditLines[] {
  let carried: Cents | null = wholeDollars(new Exact(carryInCents));
  return [...years]
    .sort((a, b) => a.taxYear - b.taxYear)
    .map((year) => {
      const line1Cents = wholeDollars(new Exact(year.line1Cents));
      const line6bCents = year.rate === null ? ZERO_CENTS : creditLine6b(line1Cents, year.rate, year.taxYear);
      const line12Cents = carried;
      const line13Cents = line12Cents === null ? null : cents(line6bCents + line12Cents);
      const line14Cents = year.limitCents === null ? null : wholeDollars(new Exact(year.limitCents));
      const known = line13Cents !== null && line14Cents !== null;
      const line15Cents = known ? cents(Math.min(line13Cents, line14Cents)) : null;
      const line16Cents = line13Cents !== null && line15Cents !== null ? subtractCents(line13Cents, line15Cents) : null;
      carried = line16Cents;
      return {
        taxYear: year.taxYear,
        line1Cents,
        line6aCents: line1Cents,
        rate: year.rate,
        line6bCents,
        line12Cents,
        line13Cents,
        line14Cents,
        line15Cents,
        line16Cents,
      };
    });
}

/** Cents to whole dollars, half up, as the form takes them. */
function wholeDollars(amount: Exact): Cents {
  return cents(amount.div(100).toDecimalPlaces(0, Exact.ROUND_HALF_UP).times(100).toNumber());
}
