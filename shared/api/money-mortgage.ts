import * as z from 'zod/mini';
import {
  appraisalSchema,
  insuranceEndRule,
  lenderBalanceSchema,
  type mortgageMore,
  mortgageSchema,
} from '../facts/finance.ts';
import { figureSchema } from '../position/position.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { endpoint, HOUSEHOLD, OWNER } from './endpoint.ts';

export const mortgageScheduleRow = z.object({
  number: z.int(),
  on: daySchema,
  paymentCents: centsSchema,
  interestCents: centsSchema,
  principalCents: centsSchema,
  extraPrincipalCents: centsSchema,
  /** As actually paid, and by the initial schedule; the latter decides the dates by law. */
  balanceCents: centsSchema,
  initialCents: centsSchema,
  /** True where the lender states a balance after this payment; `driftCents` is how far it lies from the computed one. */
  stated: z.boolean(),
  driftCents: centsSchema,
  past: z.boolean(),
});
export type MortgageScheduleRow = z.infer<typeof mortgageScheduleRow>;

const end = z.object({
  rule: insuranceEndRule,
  on: z.nullable(daySchema),
  payment: z.nullable(z.int()),
  words: z.string(),
  /** Section of the law; null for the owner's own day. */
  source: z.nullable(z.string()),
  most: z.nullable(figureSchema),
});

const state = z.enum(['met', 'notMet', 'notStated']);
const currentValue = z.object({
  state,
  share: z.nullable(z.string()),
  percent: z.nullable(z.string()),
  most: z.nullable(figureSchema),
  conditions: z.array(
    z.object({
      id: z.enum(['kind', 'seasoning', 'value', 'ratio', 'payments']),
      label: z.string(),
      state,
      words: z.string(),
      next: z.nullable(z.string()),
    }),
  ),
});

export const mortgageView = z.object({
  facts: mortgageSchema,
  paymentCents: centsSchema,
  /** What is owed on `balanceOn`, and in percent of the original value and of the last one stated. */
  balance: figureSchema,
  balanceOn: daySchema,
  originalPercent: z.string(),
  latest: z.nullable(z.object({ valueCents: centsSchema, on: daySchema, percent: z.string() })),
  /** The premium as it would be today; null where none is entered. */
  premiumCents: z.nullable(centsSchema),
  avoidedCents: centsSchema,
  ends: z.array(end),
  /** The end that counts: its rule (null where the mortgage's own end or none of the rules decides), its day and why. */
  governs: z.nullable(z.object({ rule: z.nullable(insuranceEndRule), on: z.nullable(daySchema), words: z.string() })),
  currentValue,
  checklist: z.array(
    z.object({
      id: z.enum(['value', 'balance', 'payments', 'liens', 'letter']),
      label: z.string(),
      state: z.enum(['ready', 'open', 'trouble']),
      known: z.string(),
      next: z.nullable(z.string()),
    }),
  ),
  warnings: z.array(z.object({ id: z.enum(['security', 'otherLien', 'fha', 'va']), words: z.string() })),
  schedule: z.array(mortgageScheduleRow),
});
export type MortgageView = z.infer<typeof mortgageView>;

/** Null where no mortgage is entered. */
const answer = z.object({ mortgage: z.nullable(mortgageView) });

export const appraisalBody = z.strictObject({
  on: appraisalSchema.shape.on,
  valueCents: centsSchema.check(z.minimum(1, { error: 'Write what the home was said to be worth.' })),
  how: appraisalSchema.shape.how,
  documentId: appraisalSchema.shape.documentId,
});

export const mortgageBalanceBody = z.strictObject({
  on: lenderBalanceSchema.shape.on,
  balanceCents: lenderBalanceSchema.shape.balanceCents,
  documentId: lenderBalanceSchema.shape.documentId,
});

/** What a request to take the insurance off rests on. */
export const mortgageRecordBody = z.strictObject({
  latePayments: z.nullable(
    z.strictObject({
      thirtyIn12: z.int().check(z.minimum(0), z.maximum(12)),
      sixtyIn24: z.int().check(z.minimum(0), z.maximum(24)),
    }),
  ),
  units: z.int().check(z.minimum(1), z.maximum(4)),
  occupancy: z.enum(['principal', 'second', 'investment']),
  otherLien: z.nullable(z.boolean()),
  requestedOn: z.nullable(daySchema),
});

/** Which day the insurance could have gone anyway counts, and the owner's own day of appreciation. */
export const mortgageEndBody = z.strictObject({
  endRule: insuranceEndRule,
  appreciationOn: z.nullable(daySchema),
});

export const mortgagePremiumsBody = z.strictObject({
  premiums: z
    .array(z.strictObject({ from: daySchema, premiumMonthlyCents: centsSchema.check(z.minimum(0)) }))
    .check(z.maxLength(60)),
});
export type MortgagePremium = z.infer<typeof mortgageMore>['premiums'][number];

const at = '/api/households/:householdId/money/mortgage';
const change = { access: OWNER, response: answer };
export const moneyMortgageApi = {
  view: endpoint({ method: 'GET', path: at, access: HOUSEHOLD, response: answer }),
  addAppraisal: endpoint({ method: 'POST', path: `${at}/appraisals`, body: appraisalBody, ...change }),
  removeAppraisal: endpoint({ method: 'DELETE', path: `${at}/appraisals/:id`, ...change }),
  addBalance: endpoint({ method: 'POST', path: `${at}/balances`, body: mortgageBalanceBody, ...change }),
  removeBalance: endpoint({ method: 'DELETE', path: `${at}/balances/:id`, ...change }),
  putRecord: endpoint({ method: 'PUT', path: `${at}/record`, body: mortgageRecordBody, ...change }),
  putEnd: endpoint({ method: 'PUT', path: `${at}/end`, body: mortgageEndBody, ...change }),
  putPremiums: endpoint({ method: 'PUT', path: `${at}/premiums`, body: mortgagePremiumsBody, ...change }),
  scheduleCsv: endpoint({ method: 'GET', path: `${at}/schedule.csv`, access: HOUSEHOLD, kind: 'download' }),
};
