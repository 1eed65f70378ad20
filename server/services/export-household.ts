import { asc, eq } from 'drizzle-orm';
import { EXPORT_FORMAT, EXPORT_VERSION, type HouseholdExport } from '#shared/facts/household.ts';
import { readDocumentBytes } from '../db/documents.ts';
import { readSteps } from '../db/facts/read-house.ts';
import { rejectedRows } from '../db/schema/papers.ts';
import type { Deps } from '../deps.ts';
import { ledgerOf } from './ledger-of.ts';

/** The full household as one JSON value: every fact, the bytes of every file, the rows left out with their reasons. The log in progress is no part of it. */
export function exportHousehold(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): HouseholdExport {
  const { facts, today } = ledgerOf(deps, householdId);
  const documentBytes: Record<string, string> = {};
  for (const { id } of facts.documents) {
    const stored = readDocumentBytes(deps.db, householdId, id);
    if (stored !== null) documentBytes[id] = stored.bytes.toString('base64');
  }
  const rejected = deps.db
    .select({
      documentId: rejectedRows.documentId,
      row: rejectedRows.row,
      column: rejectedRows.column,
      found: rejectedRows.found,
      reason: rejectedRows.reason,
    })
    .from(rejectedRows)
    .where(eq(rejectedRows.householdId, householdId))
    .orderBy(asc(rejectedRows.documentId), asc(rejectedRows.ordinal))
    .all();
  return {
    format: EXPORT_FORMAT,
    version: EXPORT_VERSION,
    exportedAt: deps.clock().toISOString(),
    today,
    facts,
    documentBytes,
    record: { steps: readSteps(deps.db, householdId), rejectedRows: rejected },
  };
}
