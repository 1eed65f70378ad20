import type { StatementBody } from '#shared/api/cycles.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import type { Tx } from '../../db/client.ts';
import { readDocumentBytes } from '../../db/documents.ts';
import { readDraft } from '../../db/drafts.ts';
import { insertDocument } from '../../db/facts/write-papers.ts';
import {
  changeDraftStatement,
  deleteDraftStatement,
  deleteStatementsOfFile,
  insertDraftStatement,
  putDraftFile,
} from '../../db/write-drafts.ts';
import type { Actor, Deps } from '../../deps.ts';
import { newId } from '../../ids.ts';
import type { FileInput, StatementReading } from '../../importers/contract.ts';
import { readStatementCsv } from '../../importers/statement-csv.ts';
import { statementFaults } from '../correct-statement.ts';
import { ledgerOf } from '../ledger-of.ts';
import { writeDraft } from '../write-household.ts';
import { alreadyHere, newDocument } from './held-file.ts';
import { wasEdited } from './plan-posting.ts';

type LogDeps = Pick<Deps, 'db' | 'clock'>;

function insertRead(tx: Tx, householdId: string, documentId: string, reading: StatementReading): void {
  for (const { statement, firstRow, lastRow } of reading.statements) {
    insertDraftStatement(tx, householdId, {
      key: newId(),
      documentId,
      firstRow,
      lastRow,
      statement,
      asRead: statement,
    });
  }
}

/**
 * Reads a statement file into the log. Its bytes are kept at once, whatever its rows are like; a file that is no statement file at all is
 * refused, and so is one whose bytes are here already.
 */
export function addStatementFile(deps: LogDeps, actor: Actor, file: FileInput): Result<null> {
  const { today } = ledgerOf(deps, actor.householdId);
  const document = newDocument(deps, actor, file, { kind: 'statement', today });
  if (!document.ok) return document;
  const here = alreadyHere(deps, actor, document.value);
  if (here !== null) return here.refusal;
  const reading = readStatementCsv(file, { keepGoodRows: false });
  if (!reading.ok) return reading;
  return writeDraft(deps, (tx) => {
    const { table, faults } = reading.value;
    insertDocument(tx, actor.householdId, { ...document.value, state: 'held' });
    putDraftFile(tx, actor.householdId, { documentId: document.value.id, table, faults, keepGoodRows: false });
    insertRead(tx, actor.householdId, document.value.id, reading.value);
    return succeed(null);
  });
}

/** Reads a file of the log again, with its faulty rows left out or not. What the owner changed by hand stays as changed. */
export function rereadStatementFile(
  deps: LogDeps,
  actor: Actor,
  documentId: string,
  keepGoodRows: boolean,
): Result<null> {
  const stored = readDocumentBytes(deps.db, actor.householdId, documentId);
  if (stored === null) return fail('not-found', 'This file is not in the log.');
  const reading = readStatementCsv({ fileName: stored.fileName, bytes: stored.bytes }, { keepGoodRows });
  if (!reading.ok) return reading;
  const edited = readDraft(deps.db, actor.householdId).statements.filter(
    (drafted) => drafted.documentId === documentId && wasEdited(drafted),
  );
  return writeDraft(deps, (tx) => {
    const { table, faults } = reading.value;
    putDraftFile(tx, actor.householdId, { documentId, table, faults, keepGoodRows });
    deleteStatementsOfFile(tx, actor.householdId, documentId);
    for (const { statement, firstRow, lastRow } of reading.value.statements) {
      const changed = edited.find(({ asRead }) => asRead?.from === statement.from && asRead.to === statement.to);
      insertDraftStatement(tx, actor.householdId, {
        key: changed?.key ?? newId(),
        documentId,
        firstRow,
        lastRow,
        statement: changed?.statement ?? statement,
        asRead: statement,
      });
    }
    return succeed(null);
  });
}

/** Adds a statement typed from paper. */
export function addTypedStatement(deps: LogDeps, actor: Actor, statement: StatementBody): Result<null> {
  const faults = statementFaults(statement);
  if (faults.length > 0) return fail('invalid-fields', faults[0]?.message ?? null, faults);
  const typed = { key: newId(), documentId: null, firstRow: null, lastRow: null, statement, asRead: null };
  return writeDraft(deps, (tx) => {
    insertDraftStatement(tx, actor.householdId, typed);
    return succeed(null);
  });
}

/** Puts the owner's values in place of what was read or typed; what was read stays known. */
export function changeStatement(deps: LogDeps, actor: Actor, key: string, statement: StatementBody): Result<null> {
  const faults = statementFaults(statement);
  if (faults.length > 0) return fail('invalid-fields', faults[0]?.message ?? null, faults);
  return writeDraft(deps, (tx) =>
    changeDraftStatement(tx, actor.householdId, key, statement)
      ? succeed(null)
      : fail('not-found', 'This statement is not in the log any more.'),
  );
}

export function removeStatement(deps: LogDeps, actor: Actor, key: string): Result<null> {
  return writeDraft(deps, (tx) =>
    deleteDraftStatement(tx, actor.householdId, key)
      ? succeed(null)
      : fail('not-found', 'This statement is not in the log any more.'),
  );
}
