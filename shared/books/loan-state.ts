import type { LoanFacts } from '../facts/finance.ts';
import { keptAt } from '../settlement/place.ts';
import { type Cents, cents, ZERO_CENTS } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { DecimalText } from '../units/rate-text.ts';
import { dayRule, interestOfDays } from './loan-accrual.ts';
import { loanBook } from './loan-book.ts';
import type { LoanSegment, LoanStep } from './loan-step.ts';

/** Whether payments dated on the day itself count as made: `through` at its close, `before` at its start. */
export type PaymentsOfTheDay = 'through' | 'before';

export type LoanState = {
  /** Principal owed. */
  balanceCents: Cents;
  /** Interest due and not paid. */
  unpaidInterestCents: Cents;
  /** Days since interest was last counted, by the contract's own count, and the interest of them at `annualRate`. */
  days: number;
  accruedCents: Cents;
  annualRate: DecimalText;
  /** The contract's fee for a payoff; none where no principal is owed. */
  feeCents: Cents;
  payoffCents: Cents;
  /** How many steps of the loan's book have been made. */
  paid: number;
  /** The loan in force: as first made, or as refinanced. */
  segment: LoanSegment;
};

/** What is owed on a day. Nothing is owed before the loan is funded. */
export function loanStateOn(loan: LoanFacts, on: Day, payments: PaymentsOfTheDay = 'through'): LoanState {
  const { steps, segments, firstRate } = loanBook(loan);
  const [first] = segments;
  const paid = on < loan.fundedOn ? 0 : stepsMade(steps, on, payments);
  const last = steps[paid - 1];
  const segment = last?.segment ?? first;
  const annualRate = last?.rateAfter ?? firstRate;
  const owed = last?.balanceCents ?? segment.principalCents;
  const balanceCents = on < loan.fundedOn ? ZERO_CENTS : owed;
  const unpaidInterestCents = last?.unpaidInterestCents ?? ZERO_CENTS;
  const between = dayRule(segment.dayCount).between(last?.accruedTo ?? segment.fundedOn, on);
  const days = balanceCents > 0 ? Math.max(0, between) : 0;
  const accruedCents = interestOfDays(balanceCents, annualRate, segment.dayCount, days);
  const feeCents = balanceCents > 0 ? segment.payoffFeeCents : ZERO_CENTS;
  const payoffCents = cents(balanceCents + unpaidInterestCents + accruedCents + feeCents);
  return {
    balanceCents,
    unpaidInterestCents,
    days,
    accruedCents,
    annualRate,
    feeCents,
    payoffCents,
    paid,
    segment,
  };
}

/** How many steps are made by a day; they are in order of their dates. */
export function stepsMade(steps: readonly LoanStep[], on: Day, payments: PaymentsOfTheDay): number {
  let low = 0;
  let high = steps.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    const date = keptAt(steps, middle).on;
    if (date < on || (payments === 'through' && date === on)) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** The day from which nothing is owed for good; null where the schedule does not come to it. */
export function loanClearedOn(loan: LoanFacts): Day | null {
  const { steps } = loanBook(loan);
  const isOwing = ({ balanceCents, unpaidInterestCents }: LoanStep) => balanceCents + unpaidInterestCents > 0;
  return steps[steps.findLastIndex(isOwing) + 1]?.on ?? null;
}
