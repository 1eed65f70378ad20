import { and, asc, eq, ne, sql } from 'drizzle-orm';
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

function nextOrdinal(
  db: Reader,
  table: typeof draftFiles | typeof draftStatements | typeof draftReadings,
  householdId: string,
): number {
  const last = db
    .select({ ordinal: sql<number>`coalesce(max(${table.ordinal}), 0)` })
    .from(table)
    .where(eq(table.householdId, householdId))
    .get();
  return (last?.ordinal ?? 0) + 1;
}

/** Adds a statement file, or puts its new reading in place. */
export function putDraftFile(db: Reader, householdId: string, file: Omit<DraftFile, 'fileName'>): void {
  const set = {
    keepGoodRows: file.keepGoodRows,
    sourceTable: JSON.stringify(file.table),
    faults: JSON.stringify(file.faults),
  };
  db.insert(draftFiles)
    .values({
      householdId,
      documentId: file.documentId,
      ordinal: nextOrdinal(db, draftFiles, householdId),
      ...set,
    })
    .onConflictDoUpdate({ target: [draftFiles.householdId, draftFiles.documentId], set })
    .run();
}

export function insertDraftStatement(
  db: Reader,
  householdId: string,
  drafted: Omit<DraftedStatement, 'fileName'>,
): void {
  db.insert(draftStatements)
    .values({
      householdId,
      ordinal: nextOrdinal(db, draftStatements, householdId),
      key: drafted.key,
      documentId: drafted.documentId,
      firstRow: drafted.firstRow,
      lastRow: drafted.lastRow,
      statement: JSON.stringify(drafted.statement),
      asRead: drafted.asRead === null ? null : JSON.stringify(drafted.asRead),
    })
    .run();
}

export function changeDraftStatement(db: Reader, householdId: string, key: string, statement: StatementBody): boolean {
  return (
    db
      .update(draftStatements)
      .set({ statement: JSON.stringify(statement) })
      .where(and(eq(draftStatements.householdId, householdId), eq(draftStatements.key, key)))
      .run().changes > 0
  );
}

export function deleteDraftStatement(db: Reader, householdId: string, key: string): boolean {
  return (
    db
      .delete(draftStatements)
      .where(and(eq(draftStatements.householdId, householdId), eq(draftStatements.key, key)))
      .run().changes > 0
  );
}

export function deleteStatementsOfFile(db: Reader, householdId: string, documentId: string): void {
  db.delete(draftStatements)
    .where(and(eq(draftStatements.householdId, householdId), eq(draftStatements.documentId, documentId)))
    .run();
}

/** Adds a reading, or puts a new one under the same key. */
export function putDraftReading(db: Reader, householdId: string, drafted: Omit<DraftedReading, 'fileName'>): void {
  const set = {
    keepGoodRows: drafted.keepGoodRows,
    channel: drafted.channel,
    reading: JSON.stringify(drafted.reading),
  };
  db.insert(draftReadings)
    .values({
      householdId,
      key: drafted.key,
      documentId: drafted.documentId,
      ordinal: nextOrdinal(db, draftReadings, householdId),
      ...set,
    })
    .onConflictDoUpdate({ target: [draftReadings.householdId, draftReadings.key], set })
    .run();
}

export function keepGoodReadingRows(db: Reader, householdId: string, documentId: string, keep: boolean): boolean {
  return (
    db
      .update(draftReadings)
      .set({ keepGoodRows: keep })
      .where(and(eq(draftReadings.householdId, householdId), eq(draftReadings.documentId, documentId)))
      .run().changes > 0
  );
}

/** Takes a file and all that was read from it out of the draft; true when it was there. Its bytes go too unless they are kept already. */
export function deleteDraftFile(db: Reader, householdId: string, documentId: string): boolean {
  const gone =
    db
      .delete(draftFiles)
      .where(and(eq(draftFiles.householdId, householdId), eq(draftFiles.documentId, documentId)))
      .run().changes +
    db
      .delete(draftReadings)
      .where(and(eq(draftReadings.householdId, householdId), eq(draftReadings.documentId, documentId)))
      .run().changes;
  deleteStatementsOfFile(db, householdId, documentId);
  if (gone === 0) return false;
  db.delete(documents)
    .where(and(eq(documents.householdId, householdId), eq(documents.id, documentId), eq(documents.state, 'held')))
    .run();
  return true;
}

/** Empties the draft; held files go with it. After posting none is held any more. */
export function clearDraft(db: Reader, householdId: string): void {
  for (const table of [draftFiles, draftStatements, draftReadings]) {
    db.delete(table).where(eq(table.householdId, householdId)).run();
  }
  db.delete(documents)
    .where(and(eq(documents.householdId, householdId), ne(documents.state, 'kept')))
    .run();
}
