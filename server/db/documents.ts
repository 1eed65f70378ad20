import { and, eq, sql } from 'drizzle-orm';
import type { Reader } from './client.ts';
import { documents } from './schema/papers.ts';

export type StoredDocument = typeof documents.$inferSelect;

export function readDocumentBytes(db: Reader, householdId: string, id: string): StoredDocument | null {
  return (
    db
      .select()
      .from(documents)
      .where(and(eq(documents.householdId, householdId), eq(documents.id, id)))
      .get() ?? null
  );
}

export function findDocumentByHash(
  db: Reader,
  householdId: string,
  sha256: string,
): Pick<StoredDocument, 'id' | 'fileName' | 'state' | 'kind' | 'uploadedOn'> | null {
  return (
    db
      .select({
        id: documents.id,
        fileName: documents.fileName,
        state: documents.state,
        kind: documents.kind,
        uploadedOn: documents.uploadedOn,
      })
      .from(documents)
      .where(and(eq(documents.householdId, householdId), eq(documents.sha256, sha256)))
      .get() ?? null
  );
}

/** How much a household holds. */
export function documentTotals(db: Reader, householdId: string): { held: number; bytes: number } {
  const row = db
    .select({
      held: sql<number>`coalesce(sum(${documents.state} = 'held'), 0)`,
      bytes: sql<number>`coalesce(sum(${documents.size}), 0)`,
    })
    .from(documents)
    .where(eq(documents.householdId, householdId))
    .get();
  return row ?? { held: 0, bytes: 0 };
}

/** The kind of a kept file; null where the household keeps none of that id. */
export function keptDocumentKind(db: Reader, householdId: string, id: string): StoredDocument['kind'] | null {
  const kept = and(eq(documents.householdId, householdId), eq(documents.id, id), eq(documents.state, 'kept'));
  return db.select({ kind: documents.kind }).from(documents).where(kept).get()?.kind ?? null;
}

/** Takes a kept file away; true where there was one. The database refuses one that a statement, a reading or a cost rests on. */
export function deleteKeptDocument(db: Reader, householdId: string, id: string): boolean {
  const kept = and(eq(documents.householdId, householdId), eq(documents.id, id), eq(documents.state, 'kept'));
  return db.delete(documents).where(kept).run().changes > 0;
}
