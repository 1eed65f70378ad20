import { type PaperLink, paperLinks } from '#shared/facts/paper-links.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { deleteKeptDocument } from '../../db/documents.ts';
import { insertDocument } from '../../db/facts/write-papers.ts';
import type { Actor, Deps } from '../../deps.ts';
import type { FileInput } from '../../importers/contract.ts';
import { acceptPaper } from '../credit/paper-kind.ts';
import { ledgerOf } from '../ledger-of.ts';
import { alreadyHere, newDocument } from '../log/held-file.ts';
import { writeHousehold } from '../write-household.ts';

/** Keeps a paper behind the figures of Money. The same bytes again change nothing and answer the paper that is here. */
export function addMoneyPaper(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  file: FileInput,
): Result<{ documentId: string; alreadyHere: boolean }> {
  const accepted = acceptPaper(file.fileName, file.bytes);
  if (!accepted.ok) return accepted;
  const { today } = ledgerOf(deps, actor.householdId);
  const document = newDocument(deps, actor, file, { kind: 'other', today });
  if (!document.ok) return document;
  const here = alreadyHere(deps, actor, document.value);
  if (here?.twin.state === 'kept') return succeed({ documentId: here.twin.id, alreadyHere: true });
  if (here) return here.refusal;
  return writeHousehold(deps, actor, { action: 'paper-added', about: file.fileName }, (tx) => {
    insertDocument(tx, actor.householdId, { ...document.value, state: 'kept' });
    return succeed({ documentId: document.value.id, alreadyHere: false });
  });
}

/** Takes away a paper that was added on Money, while no fact names it. */
export function removeMoneyPaper(deps: Pick<Deps, 'db' | 'clock'>, actor: Actor, documentId: string): Result<null> {
  const { facts } = ledgerOf(deps, actor.householdId);
  const paper = facts.documents.find(({ id }) => id === documentId);
  if (paper === undefined) return fail('not-found', 'There is no such file.');
  if (paper.kind !== 'other') {
    return fail('conflict', `${paper.fileName} was added on another screen and stays with it.`);
  }
  const proves = paperLinks(facts).filter((link) => link.documentId === documentId);
  if (proves.length > 0) {
    return fail(
      'conflict',
      `${paper.fileName} stands behind ${proves.map(named).join(', ')}. Take it off there first.`,
    );
  }
  return writeHousehold(deps, actor, { action: 'paper-removed', about: paper.fileName }, (tx) =>
    deleteKeptDocument(tx, actor.householdId, documentId) ? succeed(null) : fail('not-found', 'There is no such file.'),
  );
}

const NAMES: Record<PaperLink['kind'], string> = {
  loan: 'the loan’s contract',
  loanPayment: 'a loan payment',
  lenderBalance: 'a balance of the loan',
  refinance: 'a refinance',
  otherLoan: 'another loan',
  lease: 'the lease',
  mortgage: 'the mortgage',
  mortgageBalance: 'a balance of the mortgage',
  appraisal: 'an appraisal',
  cost: 'a cost or income',
  receipt: 'a payment of the incentive',
  creditCost: 'a cost of the tax credit',
  creditYear: 'a tax return',
};

function named({ kind, label, on }: PaperLink): string {
  const which = [label, on ?? ''].filter((part) => part !== '').join(', ');
  return which === '' ? NAMES[kind] : `${NAMES[kind]} (${which})`;
}
