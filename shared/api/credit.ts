import * as z from 'zod/mini';
import { creditLines } from '../books/credit-lines.ts';
import { creditSchema, creditYearSchema } from '../facts/finance.ts';
import { documentSchema } from '../facts/papers.ts';
import { centsSchema } from '../units/cents.ts';
import { ALL_ROLES, endpoint, OWNER } from './endpoint.ts';

/** What each form year calls its lines; line numbers are per-year data. `verified` says how far the numbers are known. */
export const formYear = z.object({
  taxYear: z.int(),
  lines: z.record(z.string(), z.string()),
  schedule3: z.nullable(z.string()),
  note: z.nullable(z.string()),
});

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
  papers: z.array(documentSchema),
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
  addPaper: endpoint({ method: 'POST', path: `${at}/papers`, access: OWNER, kind: 'upload', response: creditView }),
  paper: endpoint({ method: 'GET', path: `${at}/papers/:documentId`, access: ALL_ROLES, kind: 'download' }),
  /** The preparer's carryforward summary. */
  summaryCsv: endpoint({ method: 'GET', path: `${at}/summary.csv`, access: ALL_ROLES, kind: 'download' }),
};
