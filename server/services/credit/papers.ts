import { type CreditPaperKind, namedAs } from '#shared/books/credit-paper.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { readDocumentBytes } from '../../db/documents.ts';
import { renameCreditPaper } from '../../db/facts/write-credit.ts';
import { insertDocument } from '../../db/facts/write-papers.ts';
import type { Actor, Deps } from '../../deps.ts';
import type { FileInput } from '../../importers/contract.ts';
import { ledgerOf } from '../ledger-of.ts';
import { alreadyHere, newDocument } from '../log/held-file.ts';
import { writeHousehold } from '../write-household.ts';
import { acceptPaper, contentTypeOf } from './paper-kind.ts';

/** Keeps a paper behind the credit: contract, invoice, inspection, worksheet. */
export function addPaper(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  given: FileInput,
  kind: CreditPaperKind | null = null,
): Result<null> {
  const file = kind === null ? given : { ...given, fileName: namedAs(given.fileName, kind) };
  const accepted = acceptPaper(file.fileName, file.bytes);
  if (!accepted.ok) return accepted;
  const { today } = ledgerOf(deps, actor.householdId);
  const document = newDocument(deps, actor, file, { kind: 'credit', today });
  if (!document.ok) return document;
  const here = alreadyHere(deps, actor, document.value);
  if (here !== null) return here.refusal;
  return writeHousehold(deps, actor, { action: 'paper-added', about: file.fileName }, (tx) => {
    insertDocument(tx, actor.householdId, { ...document.value, state: 'kept' });
    return succeed(null);
  });
}

/** Says what a kept paper is, in front of its name; its bytes stay as they came. */
export function putPaperKind(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  documentId: string,
  kind: CreditPaperKind,
): Result<null> {
  const paper = ledgerOf(deps, actor.householdId).facts.documents.find(({ id }) => id === documentId);
  if (paper?.kind !== 'credit') return fail('not-found', 'There is no such file.');
  const fileName = namedAs(paper.fileName, kind);
  return writeHousehold(deps, actor, { action: 'paper-kind-saved', about: fileName }, (tx) =>
    renameCreditPaper(tx, actor.householdId, documentId, fileName)
      ? succeed(null)
      : fail('not-found', 'There is no such file.'),
  );
}

/** A kept file as it came. A preparer is given the credit's papers and no other. */
export function readPaper(
  deps: Pick<Deps, 'db'>,
  actor: Actor,
  documentId: string,
): Result<{ fileName: string; contentType: string; body: Uint8Array }> {
  const stored = readDocumentBytes(deps.db, actor.householdId, documentId);
  const hidden = actor.role === 'preparer' && stored?.kind !== 'credit';
  if (stored === null || stored.state !== 'kept' || hidden) return fail('not-found', 'There is no such file.');
  return succeed({ fileName: stored.fileName, contentType: contentTypeOf(stored.fileName), body: stored.bytes });
}
