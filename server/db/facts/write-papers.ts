import { createHash } from 'node:crypto';
import { and, eq, sql } from 'drizzle-orm';
import type { AcceptedDifference, DocumentFacts, IntervalDay, Statement } from '#shared/facts/papers.ts';
import type { Day } from '#shared/units/day.ts';
import type { Reader } from '../client.ts';
import { packDay } from '../packed-day.ts';
import {
  acceptedDifferences,
  documents,
  intervalDays,
  statementBanks,
  statementLines,
  statementReads,
  statements,
} from '../schema/papers.ts';

export function sha256Of(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex');
}

export function insertDocument(
  db: Reader,
  householdId: string,
  document: DocumentFacts & { state: 'held' | 'kept'; bytes: Uint8Array },
): void {
  const last = db
    .select({ ordinal: sql<number>`coalesce(max(${documents.ordinal}), 0)` })
    .from(documents)
    .where(eq(documents.householdId, householdId))
    .get();
  db.insert(documents)
    .values({ householdId, ordinal: (last?.ordinal ?? 0) + 1, ...document, bytes: Buffer.from(document.bytes) })
    .run();
}

/** Makes a held document a kept one, last in the order of arrival. */
export function keepDocument(db: Reader, householdId: string, id: string): void {
  const last = db
    .select({ ordinal: sql<number>`coalesce(max(${documents.ordinal}), 0)` })
    .from(documents)
    .where(eq(documents.householdId, householdId))
    .get();
  db.update(documents)
    .set({ state: 'kept', ordinal: (last?.ordinal ?? 0) + 1 })
    .where(and(eq(documents.householdId, householdId), eq(documents.id, id), eq(documents.state, 'held')))
    .run();
}

export function deleteHeldDocument(db: Reader, householdId: string, id: string): void {
  db.delete(documents)
    .where(and(eq(documents.householdId, householdId), eq(documents.id, id), eq(documents.state, 'held')))
    .run();
}

export function insertStatement(db: Reader, householdId: string, statement: Statement): void {
  const { id, revision, source, from, to, reads, lines, banks, budget, ...rest } = statement;
  const where =
    source.kind === 'file'
      ? {
          sourceKind: source.kind,
          documentId: source.documentId,
          fileName: source.fileName,
          firstRow: source.firstRow,
          lastRow: source.lastRow,
        }
      : { sourceKind: source.kind, typedBy: source.by, typedOn: source.on };
  const onBudget =
    budget === null
      ? {}
      : {
          budgetCents: budget.instalmentCents,
          budgetBalanceCents: budget.balanceCents,
          budgetSettledCents: budget.settledCents,
        };
  db.insert(statements)
    .values({ householdId, id, revision, fromDay: from, toDay: to, ...rest, ...onBudget, ...where })
    .run();
  const key = { householdId, statementId: id, revision };
  for (const [ordinal, { from: fromDay, to: toDay, ...read }] of reads.entries()) {
    db.insert(statementReads)
      .values({ ...key, ordinal, fromDay, toDay, ...read })
      .run();
  }
  for (const [ordinal, line] of lines.entries()) {
    db.insert(statementLines)
      .values({ ...key, ordinal, ...line })
      .run();
  }
  for (const [ordinal, bank] of banks.entries()) {
    db.insert(statementBanks)
      .values({ ...key, ordinal, ...bank })
      .run();
  }
}

/** Puts a day of a channel in place of what may be there. */
export function putIntervalDay(db: Reader, householdId: string, interval: IntervalDay): void {
  const { channel, day, minutes, values, documentId } = interval;
  const steps = packDay(values);
  db.insert(intervalDays)
    .values({ householdId, channel, day, minutes, steps, documentId })
    .onConflictDoUpdate({
      target: [intervalDays.householdId, intervalDays.channel, intervalDays.day],
      set: { minutes, steps, documentId },
    })
    .run();
}

export function putAccepted(db: Reader, householdId: string, accepted: AcceptedDifference): void {
  db.insert(acceptedDifferences)
    .values({ householdId, ...accepted })
    .onConflictDoUpdate({
      target: [acceptedDifferences.householdId, acceptedDifferences.cycleTo, acceptedDifferences.check],
      set: { note: accepted.note, by: accepted.by, on: accepted.on },
    })
    .run();
}

export function deleteAccepted(db: Reader, householdId: string, cycleTo: Day, check: string): boolean {
  return (
    db
      .delete(acceptedDifferences)
      .where(
        and(
          eq(acceptedDifferences.householdId, householdId),
          eq(acceptedDifferences.cycleTo, cycleTo),
          eq(acceptedDifferences.check, check),
        ),
      )
      .run().changes > 0
  );
}
