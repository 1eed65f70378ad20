import type { PapersView } from '#shared/api/money-papers.ts';
import { paperLinks } from '#shared/facts/paper-links.ts';
import type { Deps } from '../../deps.ts';
import { ledgerOf } from '../ledger-of.ts';

/** The papers behind the figures of Money and Tax credit, with what each proves. */
export function viewPapers(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): PapersView {
  const { facts } = ledgerOf(deps, householdId);
  const targets = paperLinks(facts);
  const papers = facts.documents
    .map((document) => {
      const proves = targets.filter(({ documentId }) => documentId === document.id);
      return { ...document, proves, removable: document.kind === 'other' && proves.length === 0 };
    })
    .filter(({ kind, proves }) => kind === 'other' || kind === 'credit' || proves.length > 0);
  return { papers, targets };
}
