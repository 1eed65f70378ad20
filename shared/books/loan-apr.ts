import type { LoanFacts } from '../facts/finance.ts';
import type { Figure } from '../position/position.ts';
import { type Cents, cents } from '../units/cents.ts';
import { addMonths, type Day, daysBetween } from '../units/day.ts';
import { decimalTextOf } from '../units/rate.ts';
import type { DecimalText } from '../units/rate-text.ts';
import { type AprTerms, aprWorking, effectiveApr, type PaymentRun } from './apr.ts';
import { loanBook } from './loan-book.ts';

/** A year's rate as a fraction, with what proves it: the payments are worth `proof.amountCents` at it. */
export type LoanApr = { apr: DecimalText; proof: Figure };

const MONTHS_A_YEAR = 12;
/** With monthly unit periods, a fraction of one is its days over 30: Appendix J's example (c)(1)(ii), 19 days as 19/30. */
const DAYS_A_UNIT_PERIOD = 30;
const APR_PLACES = 10;

/** The loan as its contract has it: no records, no lender's balances, no refinance, and nothing prepaid that nobody is bound to prepay. */
export function asContracted(loan: LoanFacts): LoanFacts {
  return { ...loan, payments: [], balances: [], refinances: [] };
}

/**
 * The annual percentage rate of the loan as contracted, on the whole principal or, with `feeCents`, on what is left of it when a fee inside the principal is taken
 * for a finance charge. Null where the payments do not come to the advance.
 * Source: Regulation Z, 12 CFR 1026, Appendix J.
 */
export function loanApr(loan: LoanFacts, feeCents: Cents): LoanApr | null {
  const contracted = asContracted(loan);
  const terms: AprTerms = {
    advanceCents: cents(loan.principalCents - feeCents),
    payments: paymentRuns(contracted),
    unitPeriodsPerYear: MONTHS_A_YEAR,
  };
  if (terms.advanceCents <= 0) return null;
  const apr = effectiveApr(terms);
  if (apr === null) return null;
  const words = feeCents === 0 ? 'The loan as contracted' : 'With the dealer fee taken for a finance charge';
  return {
    apr: decimalTextOf(apr.toDecimalPlaces(APR_PLACES)),
    proof: { amountCents: terms.advanceCents, working: aprWorking(terms, apr, words) },
  };
}

/** The payments of a loan as runs of equal amounts, counted in months from its funding. */
function paymentRuns(loan: LoanFacts): PaymentRun[] {
  const start = firstPeriod(loan.fundedOn, loan.firstPaymentOn);
  const runs: (PaymentRun & { next: number })[] = [];
  for (const step of loanBook(loan).steps) {
    if (step.kind !== 'payment') continue;
    const last = runs.at(-1);
    if (last && last.amountCents === step.regularCents && last.next === step.number) {
      last.count += 1;
      last.next += 1;
      continue;
    }
    const firstUnitPeriods = start.months + step.number - 1;
    const { days } = start;
    runs.push({
      count: 1,
      amountCents: step.regularCents,
      firstUnitPeriods,
      parts: days,
      of: DAYS_A_UNIT_PERIOD,
      next: step.number + 1,
    });
  }
  return runs.map(({ next: _, ...run }) => run);
}

/** Whole months back from the first payment, and the days that are left to the funding. */
function firstPeriod(fundedOn: Day, firstPaymentOn: Day): { months: number; days: number } {
  let months = 0;
  while (addMonths(firstPaymentOn, -(months + 1)) >= fundedOn) months += 1;
  return { months, days: daysBetween(fundedOn, addMonths(firstPaymentOn, -months)) };
}
