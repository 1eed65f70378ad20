import * as z from 'zod/mini';
import { creditLines } from '../books/credit-lines.ts';
import { CREDIT_PAPER_KINDS, type CreditPaperKind } from '../books/credit-paper.ts';
import { creditCostSchema, creditSchema, creditYearSchema } from '../facts/finance.ts';
import { documentSchema } from '../facts/papers.ts';
import { figureSchema } from '../position/position.ts';
import { centsSchema } from '../units/cents.ts';
import { ALL_ROLES, endpoint, OWNER } from './endpoint.ts';

/** What each form year calls its lines; line numbers are per-year data. `verified` says how far the numbers are known. */
export const formYear = z.object({
  taxYear: z.int(),
  lines: z.record(z.string(), z.string()),
  schedule3: z.nullable(z.string()),
  note: z.nullable(z.string()),
});

/** What was completed in one year, at that year's rate. */
export const vintageView = z.object({
  year: z.int(),
  state: z.enum(['counts', 'noCredit', 'inCarriedIn']),
  rate: z.string(),
  law: z.string(),
  costs: z.array(creditCostSchema),
  grossCents: centsSchema,
  reductionCents: centsSchema,
  share: z.string(),
  line1Cents: centsSchema,
  line6bCents: centsSchema,
});

const planView = z.object({
  leftCents: z.nullable(centsSchema),
  years: z.array(
    z.object({
      taxYear: z.int(),
      expectedLimitCents: z.nullable(centsSchema),
      usesCents: z.nullable(centsSchema),
      leavesCents: z.nullable(centsSchema),
    }),
  ),
  unplannedCents: z.nullable(centsSchema),
});

const KINDS = CREDIT_PAPER_KINDS.map(({ kind }) => kind);
export const creditPaperKindSchema = z.enum(KINDS as [CreditPaperKind, ...CreditPaperKind[]]);

export const creditView = z.object({
  /** Null until the credit is set up. */
  credit: z.nullable(creditSchema),
  lines: z.array(creditLines),
  forms: z.array(formYear),
  earnedCents: centsSchema,
  usedCents: centsSchema,
  receivedCents: centsSchema,
  stillToCarryCents: centsSchema,
  /** `agrees` is null where something is not known yet. */
  checks: z.array(z.object({ label: z.string(), agrees: z.nullable(z.boolean()), detail: z.string() })),
  vintages: z.array(vintageView),
  /** Costs without a day of completion; they earn nothing until one is stated. */
  undated: z.array(creditCostSchema),
  plan: z.nullable(planView),
  /** Null where nothing earns a credit, or an earlier return used a part that is not known here. */
  basis: z.nullable(z.object({ soFar: figureSchema, whole: figureSchema })),
  papers: z.array(z.object({ ...documentSchema.shape, paperKind: creditPaperKindSchema })),
});
export type CreditView = z.infer<typeof creditView>;

/** Everything of a year but the year; the limit is line 14 as the return's worksheet has it. */
export const creditYearBody = z.strictObject({
  limitCents: creditYearSchema.shape.limitCents,
  status: creditYearSchema.shape.status,
  filedOn: creditYearSchema.shape.filedOn,
  refundOn: creditYearSchema.shape.refundOn,
  asRefund: creditYearSchema.shape.asRefund,
  limitFrom: creditYearSchema.shape.limitFrom,
  documentId: creditYearSchema.shape.documentId,
});

export const carriedInBody = z.strictObject({ carriedIn: creditSchema.shape.carriedIn });

/** What the set-up does not ask of a cost: its own day of completion, and its paper. */
export const creditCostBody = z.strictObject({
  placedInServiceOn: creditCostSchema.shape.placedInServiceOn,
  documentId: creditCostSchema.shape.documentId,
});

export const paperKindBody = z.strictObject({ kind: creditPaperKindSchema });

const at = '/api/households/:householdId/credit';
export const creditApi = {
  view: endpoint({ method: 'GET', path: at, access: ALL_ROLES, response: creditView }),
  /** Adds the year or changes it. */
  putYear: endpoint({
    method: 'PUT',
    path: `${at}/years/:taxYear`,
    access: OWNER,
    body: creditYearBody,
    response: creditView,
  }),
  removeYear: endpoint({ method: 'DELETE', path: `${at}/years/:taxYear`, access: OWNER, response: creditView }),
  /** Line 16 of a return before this record, or none. */
  putCarriedIn: endpoint({
    method: 'PUT',
    path: `${at}/carried-in`,
    access: OWNER,
    body: carriedInBody,
    response: creditView,
  }),
  putCost: endpoint({
    method: 'PUT',
    path: `${at}/costs/:id`,
    access: OWNER,
    body: creditCostBody,
    response: creditView,
  }),
  /** Keeps a paper; the field `kind` says what it is. */
  addPaper: endpoint({ method: 'POST', path: `${at}/papers`, access: OWNER, kind: 'upload', response: creditView }),
  /** Says what a kept paper is. */
  putPaperKind: endpoint({
    method: 'PUT',
    path: `${at}/papers/:documentId/kind`,
    access: OWNER,
    body: paperKindBody,
    response: creditView,
  }),
  paper: endpoint({ method: 'GET', path: `${at}/papers/:documentId`, access: ALL_ROLES, kind: 'download' }),
  /** The preparer's carryforward summary. */
  summaryCsv: endpoint({ method: 'GET', path: `${at}/summary.csv`, access: ALL_ROLES, kind: 'download' }),
  /** The same on two pages to hand over. */
  summaryPdf: endpoint({ method: 'GET', path: `${at}/summary.pdf`, access: ALL_ROLES, kind: 'download' }),
};
