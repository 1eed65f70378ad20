import * as z from 'zod/mini';
import { entrySchema } from '../books/book.ts';
import {
  incentiveReceiptSchema,
  incentiveSchema,
  insuranceEndRule,
  loanPaymentSchema,
  loanSchema,
  mortgageSchema,
} from '../facts/finance.ts';
import { costSchema } from '../facts/house.ts';
import { figureSchema } from '../position/position.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { whSchema } from '../units/energy.ts';
import { endpoint, HOUSEHOLD, OWNER } from './endpoint.ts';

export const moneyView = z.object({
  loan: z.nullable(
    z.object({
      facts: loanSchema,
      /** The next payment to schedule; zero once none is left. */
      paymentCents: centsSchema,
      payoffCents: centsSchema,
      /** The same with its working. */
      payoff: figureSchema,
      payoffOn: daySchema,
      paidCents: centsSchema,
      interestPaidCents: centsSchema,
      lastPaymentOn: z.nullable(daySchema),
    }),
  ),
  insurance: z.nullable(
    z.object({
      facts: mortgageSchema,
      /** Dates of the payment at which each rule would have ended it; null where it never does. */
      ends: z.array(z.object({ rule: insuranceEndRule, on: z.nullable(daySchema), words: z.string() })),
      governs: z.nullable(insuranceEndRule),
      avoidedCents: centsSchema,
    }),
  ),
  incentive: z.nullable(
    z.object({
      facts: incentiveSchema,
      earnedCents: centsSchema,
      receivedCents: centsSchema,
      owedCents: centsSchema,
      /** By cycle, oldest first: what it earned, which receipts pay it (`stated`: the receipt says so; else matched oldest first), what is owed. */
      cycles: z.array(
        z.object({
          from: daySchema,
          earned: entrySchema,
          paidBy: z.array(
            z.object({ receipt: z.string(), on: daySchema, amountCents: centsSchema, stated: z.boolean() }),
          ),
          owedCents: centsSchema,
        }),
      ),
      /** Received and paying no earned cycle: ahead, or too much. */
      unmatchedCents: centsSchema,
      /** What is left of the term from today; null once it is over. The figure is an estimate. */
      left: z.nullable(
        z.object({
          lastDay: daySchema,
          months: z.int(),
          expectedWh: z.nullable(whSchema),
          figure: z.nullable(figureSchema),
        }),
      ),
    }),
  ),
  costs: z.array(costSchema),
  costsCents: centsSchema,
  incomeCents: centsSchema,
});
export type MoneyView = z.infer<typeof moneyView>;

export const loanPaymentBody = z.strictObject({
  on: daySchema,
  amountCents: loanPaymentSchema.shape.amountCents.check(z.minimum(1, { error: 'Write the amount paid.' })),
  extraPrincipalCents: loanPaymentSchema.shape.extraPrincipalCents.check(z.minimum(0)),
  note: loanPaymentSchema.shape.note,
  reamortize: loanPaymentSchema.shape.reamortize,
  documentId: loanPaymentSchema.shape.documentId,
});
export const receiptBody = z.strictObject({
  on: daySchema,
  amountCents: incentiveReceiptSchema.shape.amountCents,
  note: incentiveReceiptSchema.shape.note,
  /** The days it covers, `[from, to)`; both or neither. */
  from: incentiveReceiptSchema.shape.from,
  to: incentiveReceiptSchema.shape.to,
  quantityWh: z._default(z.nullable(whSchema.check(z.minimum(0))), null),
  documentId: incentiveReceiptSchema.shape.documentId,
});
export const costBody = z.strictObject({
  on: daySchema,
  kind: costSchema.shape.kind,
  label: costSchema.shape.label,
  amountCents: costSchema.shape.amountCents.check(z.minimum(1, { error: 'Write the amount.' })),
  documentId: z._default(costSchema.shape.documentId, null),
  every: costSchema.shape.every,
  until: costSchema.shape.until,
});

const at = '/api/households/:householdId/money';
export const moneyApi = {
  view: endpoint({ method: 'GET', path: at, access: HOUSEHOLD, response: moneyView }),
  addLoanPayment: endpoint({
    method: 'POST',
    path: `${at}/loan-payments`,
    access: OWNER,
    body: loanPaymentBody,
    response: moneyView,
  }),
  removeLoanPayment: endpoint({
    method: 'DELETE',
    path: `${at}/loan-payments/:id`,
    access: OWNER,
    response: moneyView,
  }),
  addReceipt: endpoint({
    method: 'POST',
    path: `${at}/incentive-receipts`,
    access: OWNER,
    body: receiptBody,
    response: moneyView,
  }),
  removeReceipt: endpoint({
    method: 'DELETE',
    path: `${at}/incentive-receipts/:id`,
    access: OWNER,
    response: moneyView,
  }),
  addCost: endpoint({ method: 'POST', path: `${at}/costs`, access: OWNER, body: costBody, response: moneyView }),
  removeCost: endpoint({ method: 'DELETE', path: `${at}/costs/:id`, access: OWNER, response: moneyView }),
};
