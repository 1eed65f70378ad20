import * as z from 'zod/mini';
import { entrySchema } from '../books/book.ts';
import { intervalChannel } from '../facts/papers.ts';
import { facingLine } from '../ledger/cycle.ts';
import { faultSchema } from '../problem.ts';
import { checkSchema } from '../reconcile/check.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { whSchema } from '../units/energy.ts';
import { statementBody } from './cycles.ts';
import { endpoint, OWNER } from './endpoint.ts';

/** A file as a table, for showing where each value was read. Row numbers count from 1 as a spreadsheet shows them. */
export const sourceTable = z.object({
  header: z.array(z.string()),
  rows: z.array(z.object({ row: z.int(), cells: z.array(z.string()), faults: z.array(faultSchema) })),
  /** Rows of the file beyond those shown. */
  more: z.int(),
});
export type SourceTable = z.infer<typeof sourceTable>;

/** A statement read or typed but not posted. */
export const draftStatement = z.object({
  key: z.string(),
  /** The file it came from; null when typed. */
  fileName: z.nullable(z.string()),
  documentId: z.nullable(z.string()),
  statement: statementBody,
  /** True after the owner changed a value that was read. */
  edited: z.boolean(),
  /** Set where posting would replace a posted statement by a new revision: its dates are the same and its values differ. */
  replaces: z.nullable(z.object({ from: daySchema, to: daySchema, revision: z.int() })),
  /** Set where exactly this statement is posted already: it will be left alone. */
  alreadyPosted: z.boolean(),
  /** Checks as the ledger would run them once posted, and the facing pages. */
  checks: z.array(checkSchema),
  facing: z.array(facingLine),
  billedDueCents: centsSchema,
  oursDueCents: z.nullable(centsSchema),
});
export type DraftStatement = z.infer<typeof draftStatement>;

export const dateOrder = z.enum(['ymd', 'mdy', 'dmy']);
export const energyUnit = z.enum(['Wh', 'kWh', 'W', 'kW']);

/** How a production file is read; proposed by the reader, corrected by the owner. Columns count from 0. */
export const productionMapping = z.strictObject({
  channel: intervalChannel,
  headerRow: z.int(),
  timeColumn: z.int(),
  /** A second column holding the time of day, where date and time stand apart. */
  clockColumn: z.nullable(z.int()),
  energyColumn: z.int(),
  unit: energyUnit,
  /** `interval`: energy of the step, or mean power with W or kW. `register`: a running total to be differenced. */
  quantity: z.enum(['interval', 'register']),
  dateOrder,
  /** IANA zone for stamps without an offset. */
  timeZone: z.string(),
  /** Stamps mark the start or the end of their interval. */
  stamp: z.enum(['start', 'end']),
  decimalMark: z.enum(['.', ',']),
});
export type ProductionMapping = z.infer<typeof productionMapping>;

export const draftReadings = z.object({
  key: z.string(),
  fileName: z.string(),
  documentId: z.string(),
  mapping: productionMapping,
  /** What the reader is unsure of, by mapping field, in a sentence each. */
  doubts: z.array(z.object({ field: z.string(), message: z.string() })),
  columns: z.array(z.string()),
  table: sourceTable,
  firstDay: z.nullable(daySchema),
  lastDay: z.nullable(daySchema),
  minutes: z.nullable(z.int()),
  totalWh: whSchema,
  acceptedRows: z.int(),
  rejectedRows: z.int(),
  missingSteps: z.int(),
  /** Negative readings at night, kept in the file and counted as nothing. */
  clippedNegativeWh: whSchema,
  /** A total row in the file, in Wh, left out of the sum and compared with it; null when there is none. */
  statedTotalWh: z.nullable(whSchema),
  faults: z.array(faultSchema),
  /** Rows with faults are left out when true: the owner has said so. Set by `keepGoodRows` with this `documentId`. */
  keepGoodRows: z.boolean(),
  overlap: z.object({ sameDays: z.int(), differentDays: z.array(daySchema) }),
});
export type DraftReadings = z.infer<typeof draftReadings>;

export const logDraft = z.object({
  /** Statement files of this draft with their tables. */
  files: z.array(
    z.object({
      documentId: z.string(),
      fileName: z.string(),
      table: sourceTable,
      faults: z.array(faultSchema),
      /** Rows with faults are left out when true: the owner has said so. */
      keepGoodRows: z.boolean(),
    }),
  ),
  statements: z.array(draftStatement),
  readings: z.array(draftReadings),
  /** True when everything needed to post is in order. */
  ready: z.boolean(),
  /** Why not, in sentences. */
  blockers: z.array(z.string()),
  /** What would settle more checks: "No production file covers 14 Aug – 14 Sep." */
  hints: z.array(z.string()),
});
export type LogDraft = z.infer<typeof logDraft>;

/** What posting added. */
export const postedView = z.object({
  cycles: z.array(
    z.object({
      from: daySchema,
      to: daySchema,
      addedCents: centsSchema,
      entries: z.array(entrySchema),
      billedDueCents: centsSchema,
      oursDueCents: z.nullable(centsSchema),
      state: z.string(),
      /** Differing checks, in words. */
      differs: z.array(z.string()),
    }),
  ),
  /** Days of readings added, by channel. */
  readingsDays: z.record(z.string(), z.int()),
  settledBeforeCents: centsSchema,
  settledAfterCents: centsSchema,
  cashBeforeCents: centsSchema,
  cashAfterCents: centsSchema,
});
export type PostedView = z.infer<typeof postedView>;

const at = '/api/households/:householdId/log';
export const logApi = {
  draft: endpoint({ method: 'GET', path: at, access: OWNER, response: logDraft }),
  /** A statement CSV in the documented layout; several cycles may stand in one file. */
  addStatementFile: endpoint({
    method: 'POST',
    path: `${at}/statement-file`,
    access: OWNER,
    kind: 'upload',
    response: logDraft,
  }),
  /** A statement typed from paper. */
  addStatement: endpoint({
    method: 'POST',
    path: `${at}/statements`,
    access: OWNER,
    body: z.strictObject({ statement: statementBody }),
    response: logDraft,
  }),
  changeStatement: endpoint({
    method: 'PUT',
    path: `${at}/statements/:key`,
    access: OWNER,
    body: z.strictObject({ statement: statementBody }),
    response: logDraft,
  }),
  removeStatement: endpoint({ method: 'DELETE', path: `${at}/statements/:key`, access: OWNER, response: logDraft }),
  /** Says that rows with faults shall be left out (true) or that the file waits for a corrected one (false). */
  keepGoodRows: endpoint({
    method: 'PUT',
    path: `${at}/files/:documentId/keep-good-rows`,
    access: OWNER,
    body: z.strictObject({ keep: z.boolean() }),
    response: logDraft,
  }),
  /** Takes a file and what was read from it out of the draft. */
  removeFile: endpoint({ method: 'DELETE', path: `${at}/files/:documentId`, access: OWNER, response: logDraft }),
  /** A production (or import, export) CSV; the multipart field `channel` says which channel. */
  addProductionFile: endpoint({
    method: 'POST',
    path: `${at}/production-file`,
    access: OWNER,
    kind: 'upload',
    response: logDraft,
  }),
  changeMapping: endpoint({
    method: 'PUT',
    path: `${at}/readings/:key/mapping`,
    access: OWNER,
    body: productionMapping,
    response: logDraft,
  }),
  /** Confirms that different values for days already here shall replace them. */
  post: endpoint({
    method: 'POST',
    path: `${at}/post`,
    access: OWNER,
    body: z.strictObject({ replaceReadings: z.boolean() }),
    response: postedView,
  }),
  discard: endpoint({ method: 'DELETE', path: at, access: OWNER, response: logDraft }),
  /** The statement layout as an empty CSV with one example cycle. */
  template: endpoint({ method: 'GET', path: '/api/templates/statement.csv', access: 'anyone', kind: 'download' }),
};
