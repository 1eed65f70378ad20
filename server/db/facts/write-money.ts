import { and, eq, inArray } from 'drizzle-orm';
import type {
  CreditFacts,
  CreditYear,
  IncentiveFacts,
  IncentiveReceipt,
  LoanFacts,
  LoanPayment,
  MortgageFacts,
} from '#shared/facts/finance.ts';
import type { CostFacts, CostKind } from '#shared/facts/house.ts';
import type { Reader } from '../client.ts';
import {
  costs,
  creditCosts,
  creditYears,
  incentiveReceipts,
  incentives,
  loanPayments,
  loans,
  mortgages,
  taxCredits,
} from '../schema/money.ts';

/** Sets the loan's terms, or takes them away; recorded payments stay. */
export function writeLoan(db: Reader, householdId: string, loan: Omit<LoanFacts, 'payments'> | null): void {
  if (loan === null) {
    db.delete(loans).where(eq(loans.householdId, householdId)).run();
    return;
  }
  db.insert(loans)
    .values({ householdId, ...loan })
    .onConflictDoUpdate({ target: loans.householdId, set: loan })
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

export function writeMortgage(db: Reader, householdId: string, mortgage: MortgageFacts | null): void {
  db.delete(mortgages).where(eq(mortgages.householdId, householdId)).run();
  if (mortgage === null) return;
  const { insurance, ...terms } = mortgage;
  db.insert(mortgages)
    .values({ householdId, ...terms, ...insurance })
    .run();
}

/** Sets the credit's date, share and costs, or takes the credit away; the years stay. */
export function writeCredit(db: Reader, householdId: string, credit: Omit<CreditFacts, 'years'> | null): void {
  db.delete(taxCredits).where(eq(taxCredits.householdId, householdId)).run();
  db.delete(creditCosts).where(eq(creditCosts.householdId, householdId)).run();
  if (credit === null) return;
  const { placedInServiceOn, homeShare } = credit;
  db.insert(taxCredits).values({ householdId, placedInServiceOn, homeShare }).run();
  for (const [ordinal, cost] of credit.costs.entries()) {
    db.insert(creditCosts)
      .values({ householdId, ordinal, ...cost })
      .run();
  }
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
