import { and, eq, ne, sql } from 'drizzle-orm';
import type { StatementBody } from '#shared/api/cycles.ts';
import type { Reader } from './client.ts';
import type { DraftedReading, DraftedStatement, DraftFile } from './drafts.ts';
import { draftFiles, draftReadings, draftStatements } from './schema/drafts.ts';
import { documents } from './schema/papers.ts';

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
