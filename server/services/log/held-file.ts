import type { DocumentFacts } from '#shared/facts/papers.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import type { Day } from '#shared/units/day.ts';
import { dateWords } from '#shared/units/words.ts';
import { documentTotals, findDocumentByHash } from '../../db/documents.ts';
import { sha256Of } from '../../db/facts/write-papers.ts';
import type { Actor, Deps } from '../../deps.ts';
import { newId } from '../../ids.ts';
import type { FileInput } from '../../importers/contract.ts';

/** Files in one log, and bytes in one household: far beyond a lifetime of months, and a bound on what one account can fill. */
const MOST_HELD = 60;
const MOST_BYTES = 1024 * 1024 * 1024;

export type NewDocument = DocumentFacts & { bytes: Uint8Array };

/** A file as a document to be stored, unless the household has reached what it may hold. */
export function newDocument(
  deps: Pick<Deps, 'db'>,
  actor: Actor,
  file: FileInput,
  about: { kind: DocumentFacts['kind']; today: Day },
): Result<NewDocument> {
  const { held, bytes } = documentTotals(deps.db, actor.householdId);
  if (held >= MOST_HELD) return fail('quota-reached', `This log holds ${MOST_HELD} files. Post or discard it first.`);
  if (bytes + file.bytes.length > MOST_BYTES)
    return fail('quota-reached', 'The files of this household have reached 1 GB.');
  return succeed({
    id: newId(),
    fileName: file.fileName,
    kind: about.kind,
    sha256: sha256Of(file.bytes),
    size: file.bytes.length,
    uploadedOn: about.today,
    uploadedBy: actor.name,
    bytes: file.bytes,
  });
}

/** The refusal of a file whose bytes are here already; null when they are new. */
export function alreadyHere(deps: Pick<Deps, 'db'>, actor: Actor, document: NewDocument) {
  const twin = findDocumentByHash(deps.db, actor.householdId, document.sha256);
  if (twin === null) return null;
  const name =
    twin.fileName === document.fileName
      ? document.fileName
      : `${document.fileName} (the same file as ${twin.fileName})`;
  return {
    twin,
    refusal: fail(
      'file-already-here',
      twin.state === 'held'
        ? `${name} is in this log already. Nothing was changed.`
        : `${name} was posted already; it was uploaded on ${dateWords(twin.uploadedOn)}. Nothing was changed.`,
    ),
  };
}
