import { asc, eq } from 'drizzle-orm';
import * as z from 'zod/mini';
import { type StatementBody, statementBody } from '#shared/api/cycles.ts';
import { productionMapping, type SourceTable, sourceTable } from '#shared/api/log.ts';
import { type DocumentFacts, type IntervalChannel, intervalDay } from '#shared/facts/papers.ts';
import { type Fault, faultSchema } from '#shared/problem.ts';
import { daySchema } from '#shared/units/day.ts';
import { whSchema } from '#shared/units/energy.ts';
import type { Reader } from './client.ts';
import { draftFiles, draftReadings, draftStatements } from './schema/drafts.ts';
import { documents } from './schema/papers.ts';

/** What an importer made of an interval or register file, as it is stored between requests. */
const readingSchema = z.object({
  mapping: productionMapping,
  doubts: z.array(z.object({ field: z.string(), message: z.string() })),
  columns: z.array(z.string()),
  table: sourceTable,
  days: z.array(z.omit(intervalDay, { documentId: true })),
  firstDay: z.nullable(daySchema),
  lastDay: z.nullable(daySchema),
  minutes: z.nullable(z.int()),
  totalWh: whSchema,
  acceptedRows: z.int(),
  rejectedRows: z.array(z.object({ row: z.int(), reason: z.string() })),
  missingSteps: z.int(),
  clippedNegativeWh: whSchema,
  statedTotalWh: z.nullable(whSchema),
  unallocatedWh: whSchema,
  faults: z.array(faultSchema),
});
const faultsSchema = z.array(faultSchema);

export type DraftFile = {
  documentId: string;
  fileName: string;
  table: SourceTable;
  faults: Fault[];
  keepGoodRows: boolean;
};
export type DraftedStatement = {
  /** Becomes the statement's id when it is posted as a new one. */
  key: string;
  documentId: string | null;
  fileName: string | null;
  firstRow: number | null;
  lastRow: number | null;
  statement: StatementBody;
  /** As it stood in the file; null when typed. */
  asRead: StatementBody | null;
};
export type DraftedReading = {
  key: string;
  documentId: string;
  fileName: string;
  channel: IntervalChannel;
  keepGoodRows: boolean;
  reading: z.infer<typeof readingSchema>;
};
/** The log in progress. */
export type Draft = {
  documents: DocumentFacts[];
  files: DraftFile[];
  statements: DraftedStatement[];
  readings: DraftedReading[];
};

export function readDraft(db: Reader, householdId: string): Draft {
  const held = db
    .select({
      id: documents.id,
      fileName: documents.fileName,
      kind: documents.kind,
      sha256: documents.sha256,
      size: documents.size,
      uploadedOn: documents.uploadedOn,
      uploadedBy: documents.uploadedBy,
      state: documents.state,
    })
    .from(documents)
    .where(eq(documents.householdId, householdId))
    .orderBy(asc(documents.ordinal))
    .all();
  const names = new Map(held.map((document) => [document.id, document.fileName]));
  const nameOf = (documentId: string) => names.get(documentId) ?? '';
  const files = db
    .select()
    .from(draftFiles)
    .where(eq(draftFiles.householdId, householdId))
    .orderBy(asc(draftFiles.ordinal))
    .all();
  const statements = db
    .select()
    .from(draftStatements)
    .where(eq(draftStatements.householdId, householdId))
    .orderBy(asc(draftStatements.ordinal))
    .all();
  const readings = db
    .select()
    .from(draftReadings)
    .where(eq(draftReadings.householdId, householdId))
    .orderBy(asc(draftReadings.ordinal))
    .all();
  return {
    documents: held.filter((document) => document.state === 'held').map(({ state: _, ...document }) => document),
    files: files.map((row) => ({
      documentId: row.documentId,
      fileName: nameOf(row.documentId),
      table: sourceTable.parse(JSON.parse(row.sourceTable)),
      faults: faultsSchema.parse(JSON.parse(row.faults)),
      keepGoodRows: row.keepGoodRows,
    })),
    statements: statements.map((row) => ({
      key: row.key,
      documentId: row.documentId,
      fileName: row.documentId === null ? null : nameOf(row.documentId),
      firstRow: row.firstRow,
      lastRow: row.lastRow,
      statement: statementBody.parse(JSON.parse(row.statement)),
      asRead: row.asRead === null ? null : statementBody.parse(JSON.parse(row.asRead)),
    })),
    readings: readings.map((row) => ({
      key: row.key,
      documentId: row.documentId,
      fileName: nameOf(row.documentId),
      channel: row.channel,
      keepGoodRows: row.keepGoodRows,
      reading: readingSchema.parse(JSON.parse(row.reading)),
    })),
  };
}
