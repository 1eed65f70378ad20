import type { Fault } from '#shared/problem.ts';
import { keptDocumentKind } from '../../db/documents.ts';
import type { Actor, Deps } from '../../deps.ts';
import { fieldFault } from '../field-fault.ts';

/** The fault of a field that names a paper this household does not keep; none where it names one or nothing. */
export function unknownPaper(
  deps: Pick<Deps, 'db'>,
  actor: Actor,
  documentId: string | null,
  field = 'documentId',
): Fault[] {
  if (documentId === null || keptDocumentKind(deps.db, actor.householdId, documentId) !== null) return [];
  return [fieldFault(field, 'This paper is not kept here any more. Choose another, or none.')];
}
