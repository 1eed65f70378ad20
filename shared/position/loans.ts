import { loanStateOn, type PaymentsOfTheDay } from '../books/loan.ts';
import type { LoanFacts } from '../facts/finance.ts';
import type { HouseholdFacts } from '../facts/household.ts';
import type { Day } from '../units/day.ts';

/** Every loan that paid for the roof: the solar loan, and the roof's share of others. */
export function loansOf(facts: Pick<HouseholdFacts, 'loan' | 'otherLoans'>): LoanFacts[] {
  const others = facts.otherLoans.map((other) => other.loan);
  return facts.loan ? [facts.loan, ...others] : others;
}

/** What all loans together owe on a day. */
export function owedOn(
  loans: readonly LoanFacts[],
  on: Day,
  payments: PaymentsOfTheDay,
): { payoffCents: number; balanceCents: number } {
  let payoffCents = 0;
  let balanceCents = 0;
  for (const loan of loans) {
    const state = loanStateOn(loan, on, payments);
    payoffCents += state.payoffCents;
    balanceCents += state.balanceCents;
  }
  return { payoffCents, balanceCents };
}
