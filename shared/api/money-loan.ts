import * as z from 'zod/mini';
import { lenderBalanceSchema, loanMore, loanSchema, refinanceSchema } from '../facts/finance.ts';
import { figureSchema } from '../position/position.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { decimalText } from '../units/rate-text.ts';
import { workingSchema } from '../working.ts';
import { endpoint, HOUSEHOLD, OWNER } from './endpoint.ts';

/** A month of the schedule. */
export const loanRow = z.object({
  /** 0 as first made, 1 after the first refinance …; each counts its payments from 1, 0 being what comes before the first. */
  segment: z.int(),
  number: z.int(),
  on: daySchema,
  /** `working` is null where `level` says which level payment it is, and where nothing was paid. */
  payment: z.object({ amountCents: centsSchema, working: z.nullable(workingSchema), level: z.nullable(z.int()) }),
  interestCents: centsSchema,
  principalCents: centsSchema,
  extraPrincipalCents: centsSchema,
  /** Interest that joined the principal, and what the lender's balance changed in ours. */
  capitalisedCents: centsSchema,
  driftCents: centsSchema,
  balanceCents: centsSchema,
  unpaidInterestCents: centsSchema,
  recorded: z.boolean(),
  /** Paid off by a new loan. */
  refinanced: z.boolean(),
  past: z.boolean(),
});
export type LoanScheduleRow = z.infer<typeof loanRow>;

/** A level payment from its first payment on. */
export const loanLevel = z.object({
  segment: z.int(),
  fromNumber: z.int(),
  reason: z.enum(['start', 'promotionEnd', 'prepayment', 'reamortized']),
  amountCents: centsSchema,
  working: workingSchema,
});

/** A rate a year as a fraction, and what proves it. */
export const loanApr = z.object({ apr: decimalText, proof: figureSchema });

export const loanView = z.object({
  facts: loanSchema,
  /** The next payment to schedule; null once none is left. */
  next: z.nullable(z.object({ on: daySchema, payment: figureSchema })),
  payoff: figureSchema,
  payoffOn: daySchema,
  /** Paid in cash through today, prepayments and refinance included. */
  paid: figureSchema,
  interestPaidCents: centsSchema,
  clearedOn: z.nullable(daySchema),
  /** Interest of the whole schedule, from funding to the end. */
  interest: figureSchema,
  /** As contracted, and with the dealer fee taken for a finance charge; the second null where there is no fee. */
  apr: z.nullable(loanApr),
  aprWithFee: z.nullable(loanApr),
  /** What becomes of it if an assumed prepayment is paid whole, in part, or not at all; empty where none is assumed. */
  outcomes: z.array(
    z.object({
      prepaid: z.enum(['whole', 'part', 'nothing']),
      prepaidCents: centsSchema,
      next: z.nullable(figureSchema),
      interest: figureSchema,
      clearedOn: daySchema,
    }),
  ),
  /** The day of the assumed prepayment; null where none is assumed. */
  prepaymentOn: z.nullable(daySchema),
  /** The lender's balances beside ours of the same day, oldest first. */
  balances: z.array(z.object({ id: z.string(), on: daySchema, balanceCents: centsSchema, ours: figureSchema })),
  /** Refinances, oldest first: what they paid the lender before, and what was left to pay (negative) or paid out. */
  refinances: z.array(z.object({ id: z.string(), payoff: figureSchema, cash: figureSchema })),
  levels: z.array(loanLevel),
  schedule: z.array(loanRow),
});
export type LoanView = z.infer<typeof loanView>;

/** Null where no loan is entered. */
const answer = z.object({ loan: z.nullable(loanView) });

/** The contract beside the terms of the set-up. */
export const loanContractBody = z.strictObject({
  dayCount: loanMore.shape.dayCount,
  promotion: loanMore.shape.promotion,
  assumedPrepayment: loanMore.shape.assumedPrepayment,
  payoffFeeCents: loanMore.shape.payoffFeeCents,
  security: loanMore.shape.security,
});
export const loanBalanceBody = z.strictObject({
  on: lenderBalanceSchema.shape.on,
  balanceCents: lenderBalanceSchema.shape.balanceCents,
  documentId: lenderBalanceSchema.shape.documentId,
});
const { id: _, ...refinanceShape } = refinanceSchema.shape;
export const refinanceBody = z.strictObject(refinanceShape);

export const payoffView = z.object({
  on: daySchema,
  payoff: figureSchema,
  balanceCents: centsSchema,
  /** Due and not paid, and accrued since: together the payoff's interest. */
  interestCents: centsSchema,
  days: z.int(),
  feeCents: centsSchema,
});
export type PayoffView = z.infer<typeof payoffView>;

const at = '/api/households/:householdId/money/loan';
const change = { access: OWNER, response: answer };
export const moneyLoanApi = {
  view: endpoint({ method: 'GET', path: at, access: HOUSEHOLD, response: answer }),
  putContract: endpoint({ method: 'PUT', path: `${at}/contract`, body: loanContractBody, ...change }),
  addBalance: endpoint({ method: 'POST', path: `${at}/balances`, body: loanBalanceBody, ...change }),
  removeBalance: endpoint({ method: 'DELETE', path: `${at}/balances/:id`, ...change }),
  addRefinance: endpoint({ method: 'POST', path: `${at}/refinances`, body: refinanceBody, ...change }),
  removeRefinance: endpoint({ method: 'DELETE', path: `${at}/refinances/:id`, ...change }),
  payoff: endpoint({ method: 'GET', path: `${at}/payoff/:on`, access: HOUSEHOLD, response: payoffView }),
  scheduleCsv: endpoint({ method: 'GET', path: `${at}/schedule.csv`, access: HOUSEHOLD, kind: 'download' }),
};
