import type { MoneyView } from '#shared/api/money.ts';
import type { BookId, Entry } from '#shared/books/book.ts';
import { costToDate } from '#shared/books/costs.ts';
import { loanClearedOn, loanPayoff } from '#shared/books/loan.ts';
import { loanBook } from '#shared/books/loan-book.ts';
import { governingEnd, insuranceEnds } from '#shared/books/mortgage-insurance.ts';
import { isOfSolarLoan } from '#shared/books/other-money.ts';
import { type CostFacts, INCOME_KINDS } from '#shared/facts/house.ts';
import { type Cents, negateCents, sumCents, ZERO_CENTS } from '#shared/units/cents.ts';
import type { Deps } from '../deps.ts';
import { type HouseholdLedger, ledgerOf } from './ledger-of.ts';
import { nextPayment } from './money/loan-view.ts';
import { viewIncentive } from './view-incentive.ts';

function sumOf(entries: readonly Entry[], book: BookId, counted: boolean): Cents {
  return sumCents(
    entries
      .filter((entry) => entry.book === book && (entry.basis !== 'memo') === counted)
      .map((entry) => entry.amountCents),
  );
}

function loanView({ facts, ledger, today }: HouseholdLedger): MoneyView['loan'] {
  const { loan } = facts;
  if (loan === null) return null;
  const book = loanBook(loan);
  const payoff = loanPayoff(loan, today);
  const paid = book.steps.filter(({ on }) => on <= today);
  return {
    facts: loan,
    paymentCents: nextPayment(book, today)?.payment.amountCents ?? ZERO_CENTS,
    payoffCents: payoff.amountCents,
    payoff,
    payoffOn: today,
    paidCents: negateCents(sumOf(ledger.entries.filter(isOfSolarLoan), 'loan', true)),
    interestPaidCents: sumCents(paid.map(({ interestCents }) => interestCents)),
    lastPaymentOn: loanClearedOn(loan),
  };
}

function insuranceView({ facts, ledger }: HouseholdLedger): MoneyView['insurance'] {
  const { mortgage } = facts;
  if (mortgage === null) return null;
  return {
    facts: mortgage,
    ends: insuranceEnds(mortgage).map(({ rule, on, words }) => ({ rule, on, words })),
    governs: mortgage.insurance === null ? null : governingEnd(mortgage).rule,
    avoidedCents: sumOf(ledger.entries, 'insurance', true),
  };
}

/** Loan, mortgage insurance, incentive and costs as they stand today. */
export function viewMoney(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): MoneyView {
  const household = ledgerOf(deps, householdId);
  const { costs } = household.facts;
  const isIncome = (cost: CostFacts) => INCOME_KINDS.includes(cost.kind);
  const toDate = (some: readonly CostFacts[]) => sumCents(some.map((cost) => costToDate(cost, household.today)));
  return {
    loan: loanView(household),
    insurance: insuranceView(household),
    incentive: viewIncentive(household),
    costs,
    costsCents: toDate(costs.filter((cost) => !isIncome(cost))),
    incomeCents: toDate(costs.filter(isIncome)),
  };
}
