import { and, eq } from 'drizzle-orm';
import type { Reader } from '../client.ts';
import { costs, creditCosts, creditYears, incentiveReceipts, loanPayments } from '../schema/money.ts';

/** Sets the paper of a recorded payment of the solar loan. */
export function setLoanPaymentPaper(db: Reader, householdId: string, id: string, documentId: string | null): void {
  const one = and(eq(loanPayments.householdId, householdId), eq(loanPayments.id, id));
  db.update(loanPayments).set({ documentId }).where(one).run();
}

export function setCostPaper(db: Reader, householdId: string, id: string, documentId: string | null): void {
  const one = and(eq(costs.householdId, householdId), eq(costs.id, id));
  db.update(costs).set({ documentId }).where(one).run();
}

export function setReceiptPaper(db: Reader, householdId: string, id: string, documentId: string | null): void {
  const one = and(eq(incentiveReceipts.householdId, householdId), eq(incentiveReceipts.id, id));
  db.update(incentiveReceipts).set({ documentId }).where(one).run();
}

export function setCreditCostPaper(db: Reader, householdId: string, id: string, documentId: string | null): void {
  const one = and(eq(creditCosts.householdId, householdId), eq(creditCosts.id, id));
  db.update(creditCosts).set({ documentId }).where(one).run();
}

export function setCreditYearPaper(db: Reader, householdId: string, taxYear: number, documentId: string | null): void {
  const one = and(eq(creditYears.householdId, householdId), eq(creditYears.taxYear, taxYear));
  db.update(creditYears).set({ documentId }).where(one).run();
}
