import { asc, eq } from 'drizzle-orm';
import {
  type CreditFacts,
  creditSchema,
  type IncentiveFacts,
  type IncentiveReceipt,
  type LeaseFacts,
  type LoanFacts,
  type LoanPayment,
  leaseSchema,
  loanMore,
  type MortgageFacts,
  mortgageMore,
  type OtherLoan,
  otherLoanSchema,
} from '#shared/facts/finance.ts';
import { type CostFacts, costKind } from '#shared/facts/house.ts';
import { type Scenario, scenarioSchema } from '#shared/facts/scenario.ts';
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

export function readLoanPayments(db: Reader, householdId: string): LoanPayment[] {
  return db
    .select()
    .from(loanPayments)
    .where(eq(loanPayments.householdId, householdId))
    .orderBy(asc(loanPayments.on), asc(loanPayments.id))
    .all()
    .map(({ householdId: _, ...payment }) => payment);
}

export function readLoan(db: Reader, householdId: string): LoanFacts | null {
  const row = db.select().from(loans).where(eq(loans.householdId, householdId)).get();
  if (row === undefined) return null;
  const { householdId: _, more, ...terms } = row;
  return { ...terms, ...loanMore.parse(JSON.parse(more)), payments: readLoanPayments(db, householdId) };
}

export function readMortgage(db: Reader, householdId: string): MortgageFacts | null {
  const row = db.select().from(mortgages).where(eq(mortgages.householdId, householdId)).get();
  if (row === undefined) return null;
  const {
    householdId: _,
    premiumMonthlyCents,
    removedOn,
    becauseOfRoof,
    endRule,
    appreciationOn,
    more,
    ...terms
  } = row;
  const insurance =
    premiumMonthlyCents === null || endRule === null
      ? null
      : { premiumMonthlyCents, removedOn, becauseOfRoof: becauseOfRoof === true, endRule, appreciationOn };
  return { ...terms, insurance, ...mortgageMore.parse(JSON.parse(more)) };
}

export function readCredit(db: Reader, householdId: string): CreditFacts | null {
  const row = db.select().from(taxCredits).where(eq(taxCredits.householdId, householdId)).get();
  if (row === undefined) return null;
  const costRows = db
    .select()
    .from(creditCosts)
    .where(eq(creditCosts.householdId, householdId))
    .orderBy(asc(creditCosts.ordinal))
    .all();
  const yearRows = db
    .select()
    .from(creditYears)
    .where(eq(creditYears.householdId, householdId))
    .orderBy(asc(creditYears.taxYear))
    .all();
  return {
    placedInServiceOn: row.placedInServiceOn,
    costs: costRows.map(({ id, label, amountCents, treatment, reason, placedInServiceOn, documentId }) => ({
      id,
      label,
      amountCents,
      treatment,
      reason,
      placedInServiceOn,
      documentId,
    })),
    homeShare: row.homeShare,
    years: yearRows.map(({ householdId: _, ...year }) => year),
    carriedIn: row.carriedIn === null ? null : creditSchema.shape.carriedIn.parse(JSON.parse(row.carriedIn)),
  };
}

export function readReceipts(db: Reader, householdId: string): IncentiveReceipt[] {
  return db
    .select()
    .from(incentiveReceipts)
    .where(eq(incentiveReceipts.householdId, householdId))
    .orderBy(asc(incentiveReceipts.on), asc(incentiveReceipts.id))
    .all()
    .map(({ householdId: _, ...receipt }) => receipt);
}

export function readIncentive(db: Reader, householdId: string): IncentiveFacts | null {
  const row = db.select().from(incentives).where(eq(incentives.householdId, householdId)).get();
  if (row === undefined) return null;
  const { householdId: _, ...terms } = row;
  return { ...terms, received: readReceipts(db, householdId) };
}

export function readCosts(db: Reader, householdId: string): CostFacts[] {
  return db
    .select()
    .from(costs)
    .where(eq(costs.householdId, householdId))
    .orderBy(asc(costs.on), asc(costs.id))
    .all()
    .map(({ householdId: _, ...cost }) => ({ ...cost, kind: costKind.parse(cost.kind) }));
}

export function readOtherLoans(db: Reader, householdId: string): OtherLoan[] {
  return db
    .select({ value: otherLoans.value })
    .from(otherLoans)
    .where(eq(otherLoans.householdId, householdId))
    .orderBy(asc(otherLoans.ordinal))
    .all()
    .map(({ value }) => otherLoanSchema.parse(JSON.parse(value)));
}

export function readLease(db: Reader, householdId: string): LeaseFacts | null {
  const row = db.select({ value: leases.value }).from(leases).where(eq(leases.householdId, householdId)).get();
  return row === undefined ? null : leaseSchema.parse(JSON.parse(row.value));
}

export function readScenarios(db: Reader, householdId: string): Scenario[] {
  return db
    .select({ value: scenarios.value })
    .from(scenarios)
    .where(eq(scenarios.householdId, householdId))
    .orderBy(asc(scenarios.ordinal))
    .all()
    .map(({ value }) => scenarioSchema.parse(JSON.parse(value)));
}
