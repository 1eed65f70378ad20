import * as z from 'zod/mini';
import { cents, centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { whSchema } from '../units/energy.ts';
import { decimalText } from '../units/rate-text.ts';

/** A payment as it was made. `extraPrincipalCents` is the part of it beyond the regular payment and goes to principal whole. */
export const loanPaymentSchema = z.object({
  id: z.string(),
  on: daySchema,
  amountCents: centsSchema,
  extraPrincipalCents: centsSchema,
  note: z.nullable(z.string()),
  /** The lender set a new level payment over the months that remain, right after this one. */
  reamortize: z._default(z.boolean(), false),
  documentId: z._default(z.nullable(z.string()), null),
});
export type LoanPayment = z.infer<typeof loanPaymentSchema>;

/** What a lender's statement says is owed in principal on a day; from then on it stands in the schedule's place. */
export const lenderBalanceSchema = z.object({
  id: z.string(),
  on: daySchema,
  balanceCents: centsSchema.check(z.minimum(0)),
  documentId: z.nullable(z.string()),
});
export type LenderBalance = z.infer<typeof lenderBalanceSchema>;

/** A new loan that paid the one before it off on `on`. */
export const refinanceSchema = z.object({
  id: z.string(),
  on: daySchema,
  lender: z.string().check(z.maxLength(120)),
  principalCents: centsSchema.check(z.minimum(1)),
  annualRate: decimalText,
  termMonths: z.int().check(z.minimum(1), z.maximum(480)),
  firstPaymentOn: daySchema,
  /** Paid in cash to get it; what was financed is inside the principal. */
  costsCents: centsSchema.check(z.minimum(0)),
  documentId: z.nullable(z.string()),
});
export type Refinance = z.infer<typeof refinanceSchema>;

export const dayCount = z.enum(['30/360', 'actual/365', 'actual/360']);
export type DayCount = z.infer<typeof dayCount>;

/** How the lender is secured. It can matter to the mortgage servicer; nothing is decided by it here. */
export const loanSecurity = z.enum([
  'unknown',
  'unsecured',
  'personalProperty',
  'fixtureFiling',
  'secondMortgage',
  'propertyAssessment',
]);
export type LoanSecurity = z.infer<typeof loanSecurity>;

/** The terms the set-up asks for. */
export const loanTerms = z.object({
  lender: z.string().check(z.maxLength(120)),
  principalCents: centsSchema.check(z.minimum(1)),
  /** The part of the principal that is the dealer's fee; shown, never a cost of its own. */
  dealerFeeCents: centsSchema.check(z.minimum(0)),
  annualRate: decimalText,
  termMonths: z.int().check(z.minimum(1), z.maximum(480)),
  fundedOn: daySchema,
  firstPaymentOn: daySchema,
});

export type LoanTerms = z.infer<typeof loanTerms>;

/** The rest of a loan's contract. Every field has a default that leaves a plain level-payment loan. */
export const loanMore = z.object({
  /** How interest is counted: whole months of 30 days, or the days that passed between payments. */
  dayCount: z._default(dayCount, '30/360'),
  /**
   * The first `months` payments, at a rate of their own. `level`: the full payment at that rate; `interest`: interest alone; `none`: no payment, the interest
   * is added to the principal when the promotion ends. Afterwards the balance is paid level over what is left of the term.
   */
  promotion: z._default(
    z.nullable(
      z.object({
        months: z.int().check(z.minimum(1), z.maximum(60)),
        annualRate: decimalText,
        payment: z.enum(['level', 'interest', 'none']),
      }),
    ),
    null,
  ),
  /**
   * A contract whose payment takes a prepayment by payment `byPayment` for granted: the level payment that clears the loan if it is made. With payment
   * `byPayment` the loan is re-amortized over the months that remain, whatever was prepaid by then. Null: a full payment from the start.
   */
  assumedPrepayment: z._default(
    z.nullable(
      z.object({
        amountCents: centsSchema.check(z.minimum(1)),
        byPayment: z.int().check(z.minimum(1), z.maximum(60)),
      }),
    ),
    null,
  ),
  payoffFeeCents: z._default(centsSchema.check(z.minimum(0)), cents(0)),
  security: z._default(loanSecurity, 'unknown'),
  balances: z._default(z.array(lenderBalanceSchema), []),
  /** In order of their days. */
  refinances: z._default(z.array(refinanceSchema), []),
  documentId: z._default(z.nullable(z.string()), null),
});
export type LoanMore = z.infer<typeof loanMore>;

export const loanSchema = z.object({
  ...loanTerms.shape,
  ...loanMore.shape,
  /** Recorded payments replace the scheduled ones of their months; a month without a record is taken as paid to schedule. */
  payments: z.array(loanPaymentSchema),
});
export type LoanFacts = z.infer<typeof loanSchema>;

/** Solar money that came from elsewhere: the roof's share of a mortgage, a refinance or a home-equity loan, or a second loan. */
export const otherLoanSchema = z.object({
  id: z.string(),
  kind: z.enum(['mortgageShare', 'homeEquity', 'other']),
  /** The roof's share alone: principal and payments are those of the share. */
  loan: loanSchema,
});
export type OtherLoan = z.infer<typeof otherLoanSchema>;

/** A lease or power-purchase agreement: paid as it runs, nothing to pay off, and no tax credit to the household. */
export const leaseSchema = z.object({
  kind: z.enum(['lease', 'powerPurchase']),
  company: z.string().check(z.maxLength(120)),
  firstPaymentOn: daySchema,
  termMonths: z.int().check(z.minimum(1), z.maximum(480)),
  /** A lease's payment a month in its first year; zero for a power-purchase agreement. */
  monthlyCents: centsSchema.check(z.minimum(0)),
  /** USD per kWh made, in the first year; null for a lease. */
  ratePerKwh: z.nullable(decimalText),
  /** Rise a year of either, fraction. */
  yearlyRise: decimalText,
  documentId: z.nullable(z.string()),
});
export type LeaseFacts = z.infer<typeof leaseSchema>;

export const insuranceEndRule = z.enum(['prudent', 'request80', 'automatic78', 'midpoint', 'appreciation']);
export type InsuranceEndRule = z.infer<typeof insuranceEndRule>;

/** What the home was said to be worth on a day. */
export const appraisalSchema = z.object({
  id: z.string(),
  on: daySchema,
  valueCents: centsSchema.check(z.minimum(1)),
  how: z.enum(['appraisal', 'brokerOpinion', 'ownEstimate']),
  documentId: z.nullable(z.string()),
});
export type Appraisal = z.infer<typeof appraisalSchema>;

/** The terms the set-up asks for. */
export const mortgageTerms = z.object({
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

/** What the request to take the insurance off rests on, and the mortgage's own papers. Every field has a default. */
export const mortgageMore = z.object({
  appraisals: z._default(z.array(appraisalSchema), []),
  /** Later premiums by the day they begin; before the first, the insurance's own premium holds. */
  premiums: z._default(
    z.array(z.object({ from: daySchema, premiumMonthlyCents: centsSchema.check(z.minimum(0)) })),
    [],
  ),
  balances: z._default(z.array(lenderBalanceSchema), []),
  /** Payments 30 days late or more in the last 12 months, and 60 days or more in the last 24; null until stated. */
  latePayments: z._default(z.nullable(z.object({ thirtyIn12: z.int(), sixtyIn24: z.int() })), null),
  units: z._default(z.int().check(z.minimum(1), z.maximum(4)), 1),
  occupancy: z._default(z.enum(['principal', 'second', 'investment']), 'principal'),
  /** Another lien on the home beside this mortgage; null until stated. */
  otherLien: z._default(z.nullable(z.boolean()), null),
  /** The day the removal was asked for in writing. */
  requestedOn: z._default(z.nullable(daySchema), null),
  documentId: z._default(z.nullable(z.string()), null),
});
export type MortgageMore = z.infer<typeof mortgageMore>;

export type MortgageTerms = z.infer<typeof mortgageTerms>;
export const mortgageSchema = z.object({ ...mortgageTerms.shape, ...mortgageMore.shape });
export type MortgageFacts = z.infer<typeof mortgageSchema>;

/** One line of what the roof cost, for Form 5695. `qualified` adds to line 1, `reduction` takes off it, `leftOut` is shown and not counted. */
export const creditCostSchema = z.object({
  id: z.string(),
  label: z.string().check(z.minLength(1), z.maxLength(160)),
  amountCents: centsSchema.check(z.minimum(0)),
  treatment: z.enum(['qualified', 'reduction', 'leftOut']),
  reason: z.nullable(z.string()),
  /** Where this part was completed on another day than the rest: it makes a vintage of its own. */
  placedInServiceOn: z._default(z.nullable(daySchema), null),
  documentId: z._default(z.nullable(z.string()), null),
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
  /** Where the limit was taken from: "Form 5695 line 14 worksheet, 2024 return". */
  limitFrom: z._default(z.nullable(z.string().check(z.maxLength(160))), null),
  documentId: z._default(z.nullable(z.string()), null),
});
export type CreditYear = z.infer<typeof creditYearSchema>;

export const creditSchema = z.object({
  /** The day installation was completed (placed in service); decides the rate and whether there is a credit at all. */
  placedInServiceOn: z.nullable(daySchema),
  costs: z.array(creditCostSchema),
  /** Share of the cost that is for the home: fraction text, `"1"` unless a part is business use. */
  homeShare: decimalText,
  years: z.array(creditYearSchema),
  /** Line 16 of a return before this record begins; null where there is none. */
  carriedIn: z._default(z.nullable(z.object({ taxYear: z.int(), amountCents: centsSchema.check(z.minimum(0)) })), null),
});
export type CreditFacts = z.infer<typeof creditSchema>;

export const incentiveReceiptSchema = z.object({
  id: z.string(),
  on: daySchema,
  amountCents: centsSchema,
  note: z.nullable(z.string()),
  /** The days it says it covers, `[from, to)`, and the kWh it was paid on; null where it does not say. */
  from: z._default(z.nullable(daySchema), null),
  to: z._default(z.nullable(daySchema), null),
  quantityWh: z._default(z.nullable(whSchema), null),
  documentId: z._default(z.nullable(z.string()), null),
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
