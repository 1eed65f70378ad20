import type { Cents } from '../units/cents.ts';
import { Exact, usdOf } from '../units/rate.ts';
import { moneyWords } from '../units/words.ts';
import type { Working } from '../working.ts';
import { plainInput, rule, stated, usdInput } from './inputs.ts';

/** A run of equal payments, one a unit period; the first after `firstUnitPeriods` whole unit periods and the fraction `parts / of` of one. */
export type PaymentRun = {
  count: number;
  amountCents: Cents;
  firstUnitPeriods: number;
  parts: number;
  of: number;
};

export type AprTerms = { advanceCents: Cents; payments: readonly PaymentRun[]; unitPeriodsPerYear: number };

/** The widest a rate per unit period is looked for, and how near the answer comes. */
const MOST = 10;
const NEAR = new Exact('1e-16');

/**
 * The annual percentage rate of one advance and its payments, as a fraction: `w × i`, with `i` the rate per unit period that solves the general equation
 * `Σ P / ((1 + f·i)(1 + i)^t) = advance`, found by bisection in exact decimals. Null where no rate from 0 to 1,000 percent a unit period does: the payments
 * come to less than the advance.
 * Source: Regulation Z, 12 CFR 1026, Appendix J, the general equation.
 */
export function effectiveApr(terms: AprTerms): Exact | null {
  const rate = ratePerUnitPeriod(terms);
  return rate === null ? null : rate.times(terms.unitPeriodsPerYear);
}

function ratePerUnitPeriod({ advanceCents, payments }: AprTerms): Exact | null {
  const advance = usdOf(advanceCents);
  const excess = (rate: Exact) => presentValue(payments, rate).minus(advance);
  let low = new Exact(0);
  if (excess(low).isNegative()) return null;
  let high = new Exact('0.01');
  while (excess(high).isPositive()) {
    if (high.gt(MOST)) return null;
    low = high;
    high = high.times(2);
  }
  while (high.minus(low).gt(NEAR)) {
    const middle = high.plus(low).div(2);
    if (excess(middle).isPositive()) low = middle;
    else high = middle;
  }
  return high.plus(low).div(2);
}

/** What payments are worth on the day of the advance at a rate per unit period, USD. */
function presentValue(payments: readonly PaymentRun[], rate: Exact): Exact {
  const discount = new Exact(1).div(rate.plus(1));
  return payments.reduce((total, run) => {
    const odd = rate.times(run.parts).div(run.of).plus(1);
    const first = discount.pow(run.firstUnitPeriods).div(odd);
    // A geometric series: each payment of the run is worth `discount` of the one before.
    const series = rate.isZero()
      ? new Exact(run.count)
      : new Exact(1).minus(discount.pow(run.count)).div(new Exact(1).minus(discount));
    return total.plus(usdOf(run.amountCents).times(first).times(series));
  }, new Exact(0));
}

/** How many figures of the rate per unit period a working shows: enough for the cents to come out. */
const RATE_PLACES = 14;

/**
 * The working that proves a rate: at it, the payments are worth the advance. A rate cannot be written as a formula of its payments; this is what the rate
 * means, and it evaluates to the advance in USD.
 */
export function aprWorking(terms: AprTerms, apr: Exact, words: string): Working {
  const rate = apr.div(terms.unitPeriodsPerYear).toDecimalPlaces(RATE_PLACES);
  const inputs = [
    plainInput('i', 'Rate a unit period', rate.toString(), 'fraction', rule('Regulation Z, 12 CFR 1026', 'Appendix J')),
  ];
  const parts = terms.payments.map((run, at) => {
    const name = `p${at + 1}`;
    const label = run.count === 1 ? 'One payment' : `${run.count} payments of`;
    inputs.push(usdInput(name, label, run.amountCents, stated('Loan schedule')));
    const odd = run.parts === 0 ? '' : ` / (1 + i * ${run.parts} / ${run.of})`;
    const series = run.count === 1 ? '1' : rate.isZero() ? `${run.count}` : seriesFormula(run.count);
    return `${name} * pow(1 + i, -${run.firstUnitPeriods})${odd} * ${series}`;
  });
  return {
    words: `${words}: at this rate the payments are worth ${moneyWords(terms.advanceCents)} on the day of the advance`,
    formula: `roundCents(${parts.join(' + ')})`,
    inputs,
    unit: 'USD',
    basis: 'computed',
  };
}

function seriesFormula(count: number): string {
  return `(1 - pow(1 + i, -${count})) / (1 - pow(1 + i, -1))`;
}
