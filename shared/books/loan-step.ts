import type { DayCount, LoanPayment, Refinance } from '../facts/finance.ts';
import { keptAt } from '../settlement/place.ts';
import { type Cents, cents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { DecimalText } from '../units/rate-text.ts';
import { type AssumedPrincipal, levelPaymentAssuming } from './interest.ts';

/**
 * One thing that happens to a loan. `payment`: recorded, or as the schedule has it. `skipped`: a month in which the contract asks for nothing.
 * `capitalised`: interest added to the principal. `lender`: the lender's balance takes the place of ours. `paidOff` and `opened`: a refinance.
 */
export type LoanStepKind = 'payment' | 'skipped' | 'capitalised' | 'lender' | 'paidOff' | 'opened';

/** A loan under its terms as first made, or as refinanced: each counts its payments from 1. */
export type LoanSegment = {
  /** 0 as first made, 1 after the first refinance … */
  index: number;
  lender: string;
  principalCents: Cents;
  annualRate: DecimalText;
  termMonths: number;
  fundedOn: Day;
  firstPaymentOn: Day;
  dayCount: DayCount;
  payoffFeeCents: Cents;
};

/** A level payment and what it was worked out from. */
export type LoanLevel = {
  segment: LoanSegment;
  /** The first payment it holds for. */
  fromNumber: number;
  reason: 'start' | 'promotionEnd' | 'prepayment' | 'reamortized';
  balanceCents: Cents;
  annualRate: DecimalText;
  months: number;
  assumed: AssumedPrincipal | null;
  paymentCents: Cents;
};

export type LoanStep = {
  kind: LoanStepKind;
  segment: LoanSegment;
  /** Payment number, 1 for the first; 0 for what comes before the first payment's month. */
  number: number;
  dueOn: Day;
  on: Day;
  /** Without extra principal. */
  regularCents: Cents;
  extraPrincipalCents: Cents;
  /** Interest this payment pays; the rest of the regular part is principal. */
  interestCents: Cents;
  principalCents: Cents;
  /** Interest added to the principal, and what the lender's balance added to ours (negative where it took off). */
  capitalisedCents: Cents;
  driftCents: Cents;
  /** Principal owed before and after. */
  balanceBeforeCents: Cents;
  balanceCents: Cents;
  /** Interest due and not paid, before (this payment's included) and after; it bears no interest itself. */
  interestDueCents: Cents;
  unpaidInterestCents: Cents;
  /** The fee of a payoff. */
  feeCents: Cents;
  /** Through when interest has been counted, and the rate from then on. */
  accruedTo: Day;
  rateAfter: DecimalText;
  /** The level payment in force, for a payment to schedule that pays it. */
  level: LoanLevel | null;
  record: LoanPayment | null;
  refinance: Refinance | null;
  /** What the household paid (negative) or received. */
  cashCents: Cents;
};

/** A level payment worked out from the rest of it. */
export function levelFrom(facts: Omit<LoanLevel, 'paymentCents'>): LoanLevel {
  const { balanceCents, annualRate, months, assumed } = facts;
  return { ...facts, paymentCents: levelPaymentAssuming(balanceCents, annualRate, months, assumed) };
}

/** A month of the loan. `paymentCents` = `interestCents` + `principalCents`, extra principal included. */
export type LoanRow = {
  segment: number;
  number: number;
  /** The day the month's last payment was made, or is due. */
  on: Day;
  dueOn: Day;
  paymentCents: Cents;
  interestCents: Cents;
  principalCents: Cents;
  extraPrincipalCents: Cents;
  capitalisedCents: Cents;
  driftCents: Cents;
  balanceCents: Cents;
  unpaidInterestCents: Cents;
  recorded: boolean;
  /** Paid off by a new loan, not by the household. */
  refinanced: boolean;
};

/** A month's row of its steps; there must be one. */
export function rowOf(steps: readonly LoanStep[]): LoanRow {
  const last = keptAt(steps, steps.length - 1);
  const sums = { interest: 0, principal: 0, extra: 0, capitalised: 0, drift: 0 };
  let on = last.on;
  let recorded = false;
  for (const step of steps) {
    sums.interest += step.interestCents;
    sums.principal += step.principalCents;
    sums.extra += step.extraPrincipalCents;
    sums.capitalised += step.capitalisedCents;
    sums.drift += step.driftCents;
    recorded ||= step.record !== null;
    if (step.kind === 'payment') on = step.on;
  }
  return {
    segment: last.segment.index,
    number: last.number,
    on,
    dueOn: last.dueOn,
    paymentCents: cents(sums.interest + sums.principal),
    interestCents: cents(sums.interest),
    principalCents: cents(sums.principal),
    extraPrincipalCents: cents(sums.extra),
    capitalisedCents: cents(sums.capitalised),
    driftCents: cents(sums.drift),
    balanceCents: last.balanceCents,
    unpaidInterestCents: last.unpaidInterestCents,
    recorded,
    refinanced: last.kind === 'paidOff',
  };
}
