import type * as z from 'zod/mini';
import type { paperLinkBody } from '#shared/api/money-papers.ts';
import { loanMore, mortgageMore } from '#shared/facts/finance.ts';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import { isOfCredit, type PaperLink, paperLinks } from '#shared/facts/paper-links.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import type { Tx } from '../../db/client.ts';
import { replaceOtherLoans, writeLease, writeLoanMore, writeMortgageMore } from '../../db/facts/write-money.ts';
import {
  setCostPaper,
  setCreditCostPaper,
  setCreditYearPaper,
  setLoanPaymentPaper,
  setReceiptPaper,
} from '../../db/facts/write-paper-links.ts';
import type { Actor, Deps } from '../../deps.ts';
import { fieldFault } from '../field-fault.ts';
import { ledgerOf } from '../ledger-of.ts';
import { writeHousehold } from '../write-household.ts';
import { unknownPaper } from './known-paper.ts';

/** Says which paper a fact was taken from, or takes the paper off it. */
export function linkPaper(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  body: z.infer<typeof paperLinkBody>,
): Result<null> {
  const { facts } = ledgerOf(deps, actor.householdId);
  const target = paperLinks(facts).find(({ kind, id }) => kind === body.kind && id === body.id);
  if (target === undefined) return fail('not-found', 'What this paper is for is not there any more.');
  const faults = unknownPaper(deps, actor, body.documentId);
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  const paper = facts.documents.find(({ id }) => id === body.documentId);
  if (paper !== undefined && isOfCredit(body.kind) && paper.kind !== 'credit') {
    return fail('invalid-fields', null, [
      fieldFault('documentId', 'Add this paper on Tax credit: a preparer may open the papers there and no others.'),
    ]);
  }
  const action = body.documentId === null ? 'paper-unlinked' : 'paper-linked';
  const about = `${body.kind} ${target.label || target.id}: ${paper?.fileName ?? 'none'}`;
  return writeHousehold(deps, actor, { action, about }, (tx) => {
    writeLink(tx, actor.householdId, facts, target, body.documentId);
    return succeed(null);
  });
}

function writeLink(
  tx: Tx,
  householdId: string,
  facts: HouseholdFacts,
  { kind, id }: PaperLink,
  documentId: string | null,
): void {
  const withPaper = <T extends { id: string }>(rows: readonly T[]): T[] =>
    rows.map((row) => (row.id === id ? { ...row, documentId } : row));
  const { loan, mortgage, lease, otherLoans } = facts;
  switch (kind) {
    case 'loan':
      if (loan) writeLoanMore(tx, householdId, { ...loanMore.parse(loan), documentId });
      return;
    case 'lenderBalance':
      if (loan) writeLoanMore(tx, householdId, { ...loanMore.parse(loan), balances: withPaper(loan.balances) });
      return;
    case 'refinance':
      if (loan) writeLoanMore(tx, householdId, { ...loanMore.parse(loan), refinances: withPaper(loan.refinances) });
      return;
    case 'loanPayment':
      setLoanPaymentPaper(tx, householdId, id, documentId);
      return;
    case 'otherLoan':
      replaceOtherLoans(
        tx,
        householdId,
        otherLoans.map((other) => (other.id === id ? { ...other, loan: { ...other.loan, documentId } } : other)),
      );
      return;
    case 'lease':
      if (lease) writeLease(tx, householdId, { ...lease, documentId });
      return;
    case 'mortgage':
      if (mortgage) writeMortgageMore(tx, householdId, { ...mortgageMore.parse(mortgage), documentId });
      return;
    case 'mortgageBalance':
      if (mortgage) {
        const balances = withPaper(mortgage.balances);
        writeMortgageMore(tx, householdId, { ...mortgageMore.parse(mortgage), balances });
      }
      return;
    case 'appraisal':
      if (mortgage) {
        const appraisals = withPaper(mortgage.appraisals);
        writeMortgageMore(tx, householdId, { ...mortgageMore.parse(mortgage), appraisals });
      }
      return;
    case 'cost':
      setCostPaper(tx, householdId, id, documentId);
      return;
    case 'receipt':
      setReceiptPaper(tx, householdId, id, documentId);
      return;
    case 'creditCost':
      setCreditCostPaper(tx, householdId, id, documentId);
      return;
    case 'creditYear':
      setCreditYearPaper(tx, householdId, Number(id), documentId);
      return;
  }
}
