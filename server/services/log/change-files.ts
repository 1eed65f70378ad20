import { fail, type Result, succeed } from '#shared/problem.ts';
import { readDraft } from '../../db/drafts.ts';
import { clearDraft, deleteDraftFile, keepGoodReadingRows } from '../../db/write-drafts.ts';
import type { Actor, Deps } from '../../deps.ts';
import { writeDraft } from '../write-household.ts';
import { rereadStatementFile } from './add-statement.ts';

type LogDeps = Pick<Deps, 'db' | 'clock'>;

/** The owner's word on rows with faults: leave them out (true), or let the file wait for a corrected one (false). */
export function setKeepGoodRows(deps: LogDeps, actor: Actor, documentId: string, keep: boolean): Result<null> {
  const draft = readDraft(deps.db, actor.householdId);
  if (draft.files.some((file) => file.documentId === documentId))
    return rereadStatementFile(deps, actor, documentId, keep);
  return writeDraft(deps, (tx) =>
    keepGoodReadingRows(tx, actor.householdId, documentId, keep)
      ? succeed(null)
      : fail('not-found', 'This file is not in the log.'),
  );
}

/** Takes a file and what was read from it out of the log. */
export function removeFile(deps: LogDeps, actor: Actor, documentId: string): Result<null> {
  return writeDraft(deps, (tx) =>
    deleteDraftFile(tx, actor.householdId, documentId)
      ? succeed(null)
      : fail('not-found', 'This file is not in the log.'),
  );
}

/** Empties the log; nothing that is posted changes. */
export function discardDraft(deps: LogDeps, actor: Actor): Result<null> {
  return writeDraft(deps, (tx) => {
    clearDraft(tx, actor.householdId);
    return succeed(null);
  });
}
