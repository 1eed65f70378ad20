import { and, eq, inArray } from 'drizzle-orm';
import {
  type CreditFacts,
  type CreditYear,
  type IncentiveFacts,
  type IncentiveReceipt,
  type LeaseFacts,
  type LoanMore,
  type LoanPayment,
  type LoanTerms,
  loanMore,
  type MortgageMore,
  type MortgageTerms,
  mortgageMore,
  type OtherLoan,
} from '#shared/facts/finance.ts';
import type { CostFacts, CostKind } from '#shared/facts/house.ts';
import type { Scenario } from '#shared/facts/scenario.ts';
import type { Reader } from '../client.ts';
import {
  costs,
  creditCosts,
  creditYears,
  incentiveReceipts,
  incentives,
  leases,
  loanPayments,
  loans,
  mortgages,
  otherLoans,
  scenarios,
  taxCredits,
} from '../schema/money.ts';

/** Sets the loan's terms, or takes the loan away; recorded payments stay, and so does the rest of a contract that stays. */
export function writeLoan(db: Reader, householdId: string, loan: LoanTerms | null): void {
  if (loan === null) {
    db.delete(loans).where(eq(loans.householdId, householdId)).run();
    return;
  }
  db.insert(loans)
    .values({ householdId, ...loan, more: JSON.stringify(loanMore.parse({})) })
    .onConflictDoUpdate({ target: loans.householdId, set: loan })
    .run();
}

/** Sets the rest of the loan's contract; there must be a loan. */
export function writeLoanMore(db: Reader, householdId: string, more: LoanMore): void {
  db.update(loans)
    .set({ more: JSON.stringify(more) })
    .where(eq(loans.householdId, householdId))
    .run();
}

export function insertLoanPayment(db: Reader, householdId: string, payment: LoanPayment): void {
  db.insert(loanPayments)
    .values({ householdId, ...payment })
    .run();
}

export function deleteLoanPayment(db: Reader, householdId: string, id: string): boolean {
  return (
    db
      .delete(loanPayments)
      .where(and(eq(loanPayments.householdId, householdId), eq(loanPayments.id, id)))
      .run().changes > 0
  );
}

const NO_INSURANCE = {
  premiumMonthlyCents: null,
  removedOn: null,
  becauseOfRoof: null,
  endRule: null,
  appreciationOn: null,
};

/** Sets the mortgage's terms, or takes the mortgage away; appraisals and what else is known of one that stays are kept. */
export function writeMortgage(db: Reader, householdId: string, mortgage: MortgageTerms | null): void {
  if (mortgage === null) {
    db.delete(mortgages).where(eq(mortgages.householdId, householdId)).run();
    return;
  }
  const { insurance, ...terms } = mortgage;
  const values = { ...terms, ...(insurance ?? NO_INSURANCE) };
  db.insert(mortgages)
    .values({ householdId, ...values, more: JSON.stringify(mortgageMore.parse({})) })
    .onConflictDoUpdate({ target: mortgages.householdId, set: values })
    .run();
}

/** Sets what is known beside the mortgage's terms; there must be a mortgage. */
export function writeMortgageMore(db: Reader, householdId: string, more: MortgageMore): void {
  db.update(mortgages)
    .set({ more: JSON.stringify(more) })
    .where(eq(mortgages.householdId, householdId))
    .run();
}

/** Sets the credit's date, share and costs, or takes the credit away; the years stay, and so does what was carried in. */
export function writeCredit(
  db: Reader,
  householdId: string,
  credit: Omit<CreditFacts, 'years' | 'carriedIn'> | null,
): void {
  db.delete(creditCosts).where(eq(creditCosts.householdId, householdId)).run();
  if (credit === null) {
    db.delete(taxCredits).where(eq(taxCredits.householdId, householdId)).run();
    return;
  }
  const { placedInServiceOn, homeShare } = credit;
  db.insert(taxCredits)
    .values({ householdId, placedInServiceOn, homeShare })
    .onConflictDoUpdate({ target: taxCredits.householdId, set: { placedInServiceOn, homeShare } })
    .run();
  for (const [ordinal, cost] of credit.costs.entries()) {
    db.insert(creditCosts)
      .values({ householdId, ordinal, ...cost })
      .run();
  }
}

/** Sets what a return before the record carried in; there must be a credit. */
export function writeCreditCarriedIn(db: Reader, householdId: string, carriedIn: CreditFacts['carriedIn']): void {
  db.update(taxCredits)
    .set({ carriedIn: carriedIn === null ? null : JSON.stringify(carriedIn) })
    .where(eq(taxCredits.householdId, householdId))
    .run();
}

export function putCreditYear(db: Reader, householdId: string, year: CreditYear): void {
  db.insert(creditYears)
    .values({ householdId, ...year })
    .onConflictDoUpdate({ target: [creditYears.householdId, creditYears.taxYear], set: year })
    .run();
}

export function deleteCreditYear(db: Reader, householdId: string, taxYear: number): boolean {
  return (
    db
      .delete(creditYears)
      .where(and(eq(creditYears.householdId, householdId), eq(creditYears.taxYear, taxYear)))
      .run().changes > 0
  );
}

/** Sets the incentive's terms, or takes them away; recorded receipts stay. */
export function writeIncentive(db: Reader, householdId: string, terms: Omit<IncentiveFacts, 'received'> | null): void {
  if (terms === null) {
    db.delete(incentives).where(eq(incentives.householdId, householdId)).run();
    return;
  }
  db.insert(incentives)
    .values({ householdId, ...terms })
    .onConflictDoUpdate({ target: incentives.householdId, set: terms })
    .run();
}

export function insertReceipt(db: Reader, householdId: string, receipt: IncentiveReceipt): void {
  db.insert(incentiveReceipts)
    .values({ householdId, ...receipt })
    .run();
}

export function deleteReceipt(db: Reader, householdId: string, id: string): boolean {
  return (
    db
      .delete(incentiveReceipts)
      .where(and(eq(incentiveReceipts.householdId, householdId), eq(incentiveReceipts.id, id)))
      .run().changes > 0
  );
}

export function insertCost(db: Reader, householdId: string, cost: CostFacts): void {
  db.insert(costs)
    .values({ householdId, ...cost })
    .run();
}

export function deleteCost(db: Reader, householdId: string, id: string): boolean {
  return (
    db
      .delete(costs)
      .where(and(eq(costs.householdId, householdId), eq(costs.id, id)))
      .run().changes > 0
  );
}

/** Puts these costs in the place of all costs of the kinds given. */
export function replaceCosts(
  db: Reader,
  householdId: string,
  kinds: readonly CostKind[],
  rows: readonly CostFacts[],
): void {
  db.delete(costs)
    .where(and(eq(costs.householdId, householdId), inArray(costs.kind, [...kinds])))
    .run();
  for (const cost of rows) insertCost(db, householdId, cost);
}

/** Puts these in the place of all the household's other solar money. */
export function replaceOtherLoans(db: Reader, householdId: string, rows: readonly OtherLoan[]): void {
  db.delete(otherLoans).where(eq(otherLoans.householdId, householdId)).run();
  for (const [ordinal, row] of rows.entries()) {
    db.insert(otherLoans)
      .values({ householdId, id: row.id, ordinal, value: JSON.stringify(row) })
      .run();
  }
}

export function writeLease(db: Reader, householdId: string, lease: LeaseFacts | null): void {
  db.delete(leases).where(eq(leases.householdId, householdId)).run();
  if (lease !== null)
    db.insert(leases)
      .values({ householdId, value: JSON.stringify(lease) })
      .run();
}

export function replaceScenarios(db: Reader, householdId: string, rows: readonly Scenario[]): void {
  db.delete(scenarios).where(eq(scenarios.householdId, householdId)).run();
  for (const [ordinal, row] of rows.entries()) {
    db.insert(scenarios)
      .values({ householdId, id: row.id, ordinal, value: JSON.stringify(row) })
      .run();
  }
}
