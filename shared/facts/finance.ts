import * as z from 'zod/mini';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { decimalText } from '../units/rate-text.ts';

/** A payment as it was made. `extraPrincipalCents` is the part of it beyond the regular payment and goes to principal whole. */
export const loanPaymentSchema = z.object({
  id: z.string(),
  on: daySchema,
  amountCents: centsSchema,
  extraPrincipalCents: centsSchema,
  note: z.nullable(z.string()),
});
export type LoanPayment = z.infer<typeof loanPaymentSchema>;

export const loanSchema = z.object({
  lender: z.string().check(z.maxLength(120)),
  principalCents: centsSchema.check(z.minimum(1)),
  /** The part of the principal that is the dealer's fee; shown, never a cost of its own. */
  dealerFeeCents: centsSchema.check(z.minimum(0)),
  annualRate: decimalText,
  termMonths: z.int().check(z.minimum(1), z.maximum(480)),
  fundedOn: daySchema,
  firstPaymentOn: daySchema,
  /** Recorded payments replace the scheduled ones of their months; a month without a record is taken as paid to schedule. */
  payments: z.array(loanPaymentSchema),
});
export type LoanFacts = z.infer<typeof loanSchema>;

export const insuranceEndRule = z.enum(['prudent', 'request80', 'automatic78', 'midpoint', 'appreciation']);
export type InsuranceEndRule = z.infer<typeof insuranceEndRule>;

export const mortgageSchema = z.object({
  lender: z.string().check(z.maxLength(120)),
  kind: z.enum(['conventional', 'fha', 'va']),
  principalCents: centsSchema.check(z.minimum(1)),
  annualRate: decimalText,
  termMonths: z.int().check(z.minimum(1), z.maximum(480)),
  firstPaymentOn: daySchema,
  /** Lesser of price and appraisal at the start. */
  originalValueCents: centsSchema.check(z.minimum(1)),
  extraPrincipalMonthlyCents: centsSchema.check(z.minimum(0)),
  /** Refinance, sale or payoff, which ends the insurance whatever else is true; null while the mortgage runs. */
  endedOn: z.nullable(daySchema),
  insurance: z.nullable(
    z.object({
      premiumMonthlyCents: centsSchema.check(z.minimum(1)),
      /** First month in which the owner paid none because of the roof; null while it is still paid. */
      removedOn: z.nullable(daySchema),
      becauseOfRoof: z.boolean(),
      endRule: insuranceEndRule,
      /** The day on which ordinary appreciation alone would have allowed removal (the owner's stated value without the roof); null if unstated. */
      appreciationOn: z.nullable(daySchema),
    }),
  ),
});
export type MortgageFacts = z.infer<typeof mortgageSchema>;

/** One line of what the roof cost, for Form 5695. `qualified` adds to line 1, `reduction` takes off it, `leftOut` is shown and not counted. */
export const creditCostSchema = z.object({
  id: z.string(),
  label: z.string().check(z.minLength(1), z.maxLength(160)),
  amountCents: centsSchema.check(z.minimum(0)),
  treatment: z.enum(['qualified', 'reduction', 'leftOut']),
  reason: z.nullable(z.string()),
});
export type CreditCost = z.infer<typeof creditCostSchema>;

/** A tax return the credit goes through. Whole dollars on the form are kept as cents here. */
export const creditYearSchema = z.object({
  taxYear: z.int().check(z.minimum(2006), z.maximum(2100)),
  /** Line 14, from the return's worksheet; null until the owner types it. Never estimated by the product. */
  limitCents: z.nullable(centsSchema.check(z.minimum(0))),
  status: z.enum(['planned', 'filed', 'amended']),
  filedOn: z.nullable(daySchema),
  /** The day the refund came; null where the credit only lowered the tax due, or it has not come yet. */
  refundOn: z.nullable(daySchema),
  /** True where a refund is awaited: cash then counts from `refundOn`; false: it counts from `filedOn`. */
  asRefund: z.boolean(),
  typedBy: z.nullable(z.string()),
});
export type CreditYear = z.infer<typeof creditYearSchema>;

export const creditSchema = z.object({
  /** The day installation was completed (placed in service); decides the rate and whether there is a credit at all. */
  placedInServiceOn: z.nullable(daySchema),
  costs: z.array(creditCostSchema),
  /** Share of the cost that is for the home: fraction text, `"1"` unless a part is business use. */
  homeShare: decimalText,
  years: z.array(creditYearSchema),
});
export type CreditFacts = z.infer<typeof creditSchema>;

export const incentiveReceiptSchema = z.object({
  id: z.string(),
  on: daySchema,
  amountCents: centsSchema,
  note: z.nullable(z.string()),
});
export type IncentiveReceipt = z.infer<typeof incentiveReceiptSchema>;

export const incentiveSchema = z.object({
  payer: z.string().check(z.maxLength(120)),
  /** USD per kWh on the production meter; may be negative. */
  ratePerKwh: decimalText,
  firstDay: daySchema,
  lastDay: daySchema,
  /** `separate`: by cheque or transfer, as recorded in `received`. `billCredit`: inside the bill, added back there and counted here. */
  paidAs: z.enum(['separate', 'billCredit']),
  received: z.array(incentiveReceiptSchema),
});
export type IncentiveFacts = z.infer<typeof incentiveSchema>;
