import * as z from 'zod/mini';
import { leaseSchema, loanSchema, loanTerms, otherLoanSchema } from '../facts/finance.ts';
import { costSchema } from '../facts/house.ts';
import { figureSchema } from '../position/position.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { endpoint, HOUSEHOLD, OWNER } from './endpoint.ts';
import { costBody, loanPaymentBody } from './money.ts';

/** A cost or income as it stands today. */
export const costStanding = z.object({
  id: z.string(),
  /** How often it has moved, and what it came to; negative where it was paid. */
  times: z.int(),
  toDateCents: centsSchema,
  /** The next day it moves; null where it does not any more. */
  nextOn: z.nullable(daySchema),
  /** One of its entries, with its working; null before the first. */
  each: z.nullable(figureSchema),
});

/** What a kind came to in a year, from its entries through today. */
export const costTotal = z.object({ year: z.int(), kind: costSchema.shape.kind, amount: figureSchema });

export const costsView = z.object({
  costs: z.array(costSchema),
  standings: z.array(costStanding),
  totals: z.array(costTotal),
  /** Paid and received through today: the first negative, the second positive. */
  paid: figureSchema,
  received: figureSchema,
});
export type CostsView = z.infer<typeof costsView>;

/** Another loan that paid for the roof, as it stands today. */
export const otherLoanView = z.object({
  id: z.string(),
  kind: otherLoanSchema.shape.kind,
  facts: loanSchema,
  paymentCents: centsSchema,
  paidCents: centsSchema,
  payoff: figureSchema,
  payoffOn: daySchema,
  lastPaymentOn: z.nullable(daySchema),
});
export type OtherLoanView = z.infer<typeof otherLoanView>;

export const leaseView = z.object({
  facts: leaseSchema,
  /** Paid through today, positive. */
  paid: figureSchema,
  /** The next payment of a lease, by its schedule; null for a power-purchase agreement and after the term. */
  next: z.nullable(z.object({ on: daySchema, amountCents: centsSchema })),
  /** The first day after the term. */
  endsOn: daySchema,
  /** Ends of cycles whose production is not known, so that what was paid for them is missing. */
  missing: z.array(daySchema),
});
export type LeaseView = z.infer<typeof leaseView>;

export const otherMoneyView = z.object({
  costs: costsView,
  loans: z.array(otherLoanView),
  lease: z.nullable(leaseView),
});
export type OtherMoneyView = z.infer<typeof otherMoneyView>;

export const otherLoanBody = z.strictObject({
  kind: otherLoanSchema.shape.kind,
  ...loanTerms.shape,
  documentId: loanSchema.shape.documentId,
});
export type OtherLoanBody = z.infer<typeof otherLoanBody>;

export const leaseBody = z.strictObject({ ...leaseSchema.shape });
export type LeaseBody = z.infer<typeof leaseBody>;

const at = '/api/households/:householdId/money';
const loans = `${at}/other-loans`;
const response = otherMoneyView;
export const moneyOtherApi = {
  view: endpoint({ method: 'GET', path: `${at}/other`, access: HOUSEHOLD, response }),
  changeCost: endpoint({ method: 'PUT', path: `${at}/costs/:id`, access: OWNER, body: costBody, response }),
  addLoan: endpoint({ method: 'POST', path: loans, access: OWNER, body: otherLoanBody, response }),
  changeLoan: endpoint({ method: 'PUT', path: `${loans}/:id`, access: OWNER, body: otherLoanBody, response }),
  removeLoan: endpoint({ method: 'DELETE', path: `${loans}/:id`, access: OWNER, response }),
  addPayment: endpoint({
    method: 'POST',
    path: `${loans}/:id/payments`,
    access: OWNER,
    body: loanPaymentBody,
    response,
  }),
  removePayment: endpoint({ method: 'DELETE', path: `${loans}/:id/payments/:paymentId`, access: OWNER, response }),
  putLease: endpoint({ method: 'PUT', path: `${at}/lease`, access: OWNER, body: leaseBody, response }),
  removeLease: endpoint({ method: 'DELETE', path: `${at}/lease`, access: OWNER, response }),
};
