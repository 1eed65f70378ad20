import { and, asc, eq } from 'drizzle-orm';
import {
  type AcceptedDifference,
  type DocumentFacts,
  type IntervalDay,
  type PaperSource,
  type PrintedBank,
  type PrintedBudget,
  type PrintedLine,
  printedLine,
  type RegisterRead,
  type Statement,
} from '#shared/facts/papers.ts';
import type { Reader } from '../client.ts';
import { unpackDay } from '../packed-day.ts';
import {
  acceptedDifferences,
  documents,
  intervalDays,
  statementBanks,
  statementLines,
  statementReads,
  statements,
} from '../schema/papers.ts';

const documentColumns = {
  id: documents.id,
  fileName: documents.fileName,
  kind: documents.kind,
  sha256: documents.sha256,
  size: documents.size,
  uploadedOn: documents.uploadedOn,
  uploadedBy: documents.uploadedBy,
};

/** The kept documents in the order they came, without their bytes. */
export function readDocuments(db: Reader, householdId: string): DocumentFacts[] {
  return db
    .select(documentColumns)
    .from(documents)
    .where(and(eq(documents.householdId, householdId), eq(documents.state, 'kept')))
    .orderBy(asc(documents.ordinal))
    .all();
}

type StatementRow = typeof statements.$inferSelect;

function sourceOf(row: StatementRow): PaperSource {
  if (row.sourceKind === 'file') {
    if (row.documentId === null || row.fileName === null || row.firstRow === null || row.lastRow === null) {
      throw new Error(`statement ${row.id} says it came from a file and does not say where`);
    }
    const { documentId, fileName, firstRow, lastRow } = row;
    return { kind: 'file', documentId, fileName, firstRow, lastRow };
  }
  if (row.typedBy === null || row.typedOn === null) throw new Error(`statement ${row.id} does not say who typed it`);
  return { kind: 'typed', by: row.typedBy, on: row.typedOn };
}

type ChildRow = { householdId: string; statementId: string; revision: number; ordinal: number };

function byStatement<Row extends ChildRow, T>(rows: Row[], make: (row: Row) => T): Map<string, T[]> {
  const found = new Map<string, T[]>();
  for (const row of rows) {
    const key = `${row.statementId}/${row.revision}`;
    const list = found.get(key);
    if (list) list.push(make(row));
    else found.set(key, [make(row)]);
  }
  return found;
}

function readOf(row: typeof statementReads.$inferSelect): RegisterRead {
  const { meter, channel, previous, current, dials, multiplier, type } = row;
  return { meter, channel, from: row.fromDay, to: row.toDay, previous, current, dials, multiplier, type, row: row.row };
}

function lineOf(row: typeof statementLines.$inferSelect): PrintedLine {
  const { component, label, quantity, rate, amountCents, inDue } = row;
  const kind = printedLine.shape.kind.parse(row.kind);
  const unit = printedLine.shape.unit.parse(row.unit);
  return { component, kind, label, quantity, unit, rate, amountCents, inDue, row: row.row };
}

function bankOf(printed: typeof statementBanks.$inferSelect): PrintedBank {
  const { bank, unit, open, close, sentOut, sentValueCents, row } = printed;
  return { bank, unit, open, close, sentOut, sentValueCents, row };
}

function budgetOf({ budgetCents, budgetBalanceCents, budgetSettledCents }: StatementRow): PrintedBudget | null {
  if (budgetCents === null) return null;
  return { instalmentCents: budgetCents, balanceCents: budgetBalanceCents, settledCents: budgetSettledCents };
}

/** Every revision of every statement, by the day it ends on, then by revision. */
export function readStatements(db: Reader, householdId: string): Statement[] {
  const rows = db
    .select()
    .from(statements)
    .where(eq(statements.householdId, householdId))
    .orderBy(asc(statements.toDay), asc(statements.id), asc(statements.revision))
    .all();
  const reads = byStatement(
    db
      .select()
      .from(statementReads)
      .where(eq(statementReads.householdId, householdId))
      .orderBy(asc(statementReads.ordinal))
      .all(),
    readOf,
  );
  const lines = byStatement(
    db
      .select()
      .from(statementLines)
      .where(eq(statementLines.householdId, householdId))
      .orderBy(asc(statementLines.ordinal))
      .all(),
    lineOf,
  );
  const banks = byStatement(
    db
      .select()
      .from(statementBanks)
      .where(eq(statementBanks.householdId, householdId))
      .orderBy(asc(statementBanks.ordinal))
      .all(),
    bankOf,
  );
  return rows.map((row) => {
    const key = `${row.id}/${row.revision}`;
    return {
      id: row.id,
      revision: row.revision,
      from: row.fromDay,
      to: row.toDay,
      printedDays: row.printedDays,
      statementOn: row.statementOn,
      dueOn: row.dueOn,
      reads: reads.get(key) ?? [],
      importWh: row.importWh,
      exportWh: row.exportWh,
      productionWh: row.productionWh,
      lines: lines.get(key) ?? [],
      banks: banks.get(key) ?? [],
      previousBalanceCents: row.previousBalanceCents,
      paymentsCents: row.paymentsCents,
      amountDueCents: row.amountDueCents,
      budget: budgetOf(row),
      source: sourceOf(row),
      reason: row.reason,
      enteredBy: row.enteredBy,
      enteredAt: row.enteredAt,
    };
  });
}

export function readIntervals(db: Reader, householdId: string): IntervalDay[] {
  return db
    .select()
    .from(intervalDays)
    .where(eq(intervalDays.householdId, householdId))
    .orderBy(asc(intervalDays.channel), asc(intervalDays.day))
    .all()
    .map(({ channel, day, minutes, steps, documentId }) => ({
      channel,
      day,
      minutes,
      values: unpackDay(steps),
      documentId,
    }));
}

export function readAccepted(db: Reader, householdId: string): AcceptedDifference[] {
  return db
    .select()
    .from(acceptedDifferences)
    .where(eq(acceptedDifferences.householdId, householdId))
    .orderBy(asc(acceptedDifferences.cycleTo), asc(acceptedDifferences.check))
    .all()
    .map(({ householdId: _, ...accepted }) => accepted);
}
