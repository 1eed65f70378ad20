import type { Fault } from '#shared/problem.ts';
import { keptDocumentKind } from '../../db/documents.ts';
import type { Deps } from '../../deps.ts';
import { fieldFault } from '../field-fault.ts';

/** A return or a cost of the credit may name the credit's own papers only: a preparer may open those and no other. */
export function creditPaperFault(deps: Pick<Deps, 'db'>, householdId: string, documentId: string | null): Fault[] {
  if (documentId === null || keptDocumentKind(deps.db, householdId, documentId) === 'credit') return [];
  return [fieldFault('documentId', 'Choose one of the papers of the tax credit.')];
}
