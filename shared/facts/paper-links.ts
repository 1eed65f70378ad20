import * as z from 'zod/mini';
import type { Day } from '../units/day.ts';
import type { HouseholdFacts } from './household.ts';

/** What of the money facts can name the paper it was taken from. */
export const paperLinkKind = z.enum([
  'loan',
  'loanPayment',
  'lenderBalance',
  'refinance',
  'otherLoan',
  'lease',
  'mortgage',
  'mortgageBalance',
  'appraisal',
  'cost',
  'receipt',
  'creditCost',
  'creditYear',
]);
export type PaperLinkKind = z.infer<typeof paperLinkKind>;

/** One fact that can name a paper: `id` is its own, empty where there is only one of its kind; `documentId` is the paper it names. */
export type PaperLink = {
  kind: PaperLinkKind;
  id: string;
  /** The lender's, cost's or year's own words; the kind says the rest. */
  label: string;
  on: Day | null;
  documentId: string | null;
};

type MoneyFacts = Pick<HouseholdFacts, 'loan' | 'otherLoans' | 'lease' | 'mortgage' | 'credit' | 'costs' | 'incentive'>;

/** Everything of a household that can name a paper, with the paper it names. */
export function paperLinks(facts: MoneyFacts): PaperLink[] {
  return [
    ...loanLinks(facts),
    ...otherLinks(facts),
    ...mortgageLinks(facts),
    ...creditLinks(facts),
    ...costLinks(facts),
    ...receiptLinks(facts),
  ];
}

/** The paper a credit's return or cost names must be one of the credit's own: a preparer may open those and no other. */
export function isOfCredit(kind: PaperLinkKind): boolean {
  return kind === 'creditCost' || kind === 'creditYear';
}

function loanLinks({ loan }: MoneyFacts): PaperLink[] {
  if (loan === null) return [];
  return [
    link('loan', '', null, loan.documentId, loan.lender),
    ...loan.payments.map(({ id, on, documentId }) => link('loanPayment', id, on, documentId)),
    ...loan.balances.map(({ id, on, documentId }) => link('lenderBalance', id, on, documentId)),
    ...loan.refinances.map(({ id, on, lender, documentId }) => link('refinance', id, on, documentId, lender)),
  ];
}

function otherLinks({ otherLoans, lease }: MoneyFacts): PaperLink[] {
  const loans = otherLoans.map(({ id, loan }) => link('otherLoan', id, null, loan.documentId, loan.lender));
  return lease === null ? loans : [...loans, link('lease', '', null, lease.documentId, lease.company)];
}

function mortgageLinks({ mortgage }: MoneyFacts): PaperLink[] {
  if (mortgage === null) return [];
  return [
    link('mortgage', '', null, mortgage.documentId, mortgage.lender),
    ...mortgage.balances.map(({ id, on, documentId }) => link('mortgageBalance', id, on, documentId)),
    ...mortgage.appraisals.map(({ id, on, documentId }) => link('appraisal', id, on, documentId)),
  ];
}

function creditLinks({ credit }: MoneyFacts): PaperLink[] {
  if (credit === null) return [];
  return [
    ...credit.costs.map(({ id, label, documentId }) => link('creditCost', id, null, documentId, label)),
    ...credit.years.map(({ taxYear, documentId }) =>
      link('creditYear', String(taxYear), null, documentId, String(taxYear)),
    ),
  ];
}

function costLinks({ costs }: MoneyFacts): PaperLink[] {
  return costs.map(({ id, on, label, documentId }) => link('cost', id, on, documentId, label));
}

function receiptLinks({ incentive }: MoneyFacts): PaperLink[] {
  return (incentive?.received ?? []).map(({ id, on, documentId }) => link('receipt', id, on, documentId));
}

function link(kind: PaperLinkKind, id: string, on: Day | null, documentId: string | null, label = ''): PaperLink {
  return { kind, id, label, on, documentId };
}
