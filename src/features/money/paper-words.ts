import type { PaperTarget } from '#shared/api/money-papers.ts';
import { fullDate } from '#src/lib/format.ts';

const KINDS: Record<PaperTarget['kind'], string> = {
  loan: 'Loan contract',
  loanPayment: 'Loan payment',
  lenderBalance: 'Balance by the lender',
  refinance: 'Refinance',
  otherLoan: 'Other loan',
  lease: 'Lease or power purchase',
  mortgage: 'Mortgage',
  mortgageBalance: 'Balance of the mortgage',
  appraisal: 'Value of the home',
  cost: 'Cost or income',
  receipt: 'Incentive received',
  creditCost: 'Cost for the tax credit',
  creditYear: 'Tax return',
};

/** What a paper proves, in words: "Loan payment of 1 July 2025". */
export function targetWords({ kind, label, on }: PaperTarget): string {
  const named = label === '' ? KINDS[kind] : `${KINDS[kind]}: ${label}`;
  return on === null ? named : `${named}, ${fullDate(on)}`;
}

/** One text for a select's value: a kind and an id, which may hold anything. */
export function targetKey({ kind, id }: Pick<PaperTarget, 'kind' | 'id'>): string {
  return `${kind} ${id}`;
}

export function sizeWords(bytes: number): string {
  if (bytes < 1000) return `${bytes} bytes`;
  return bytes < 1_000_000 ? `${Math.round(bytes / 1000)} kB` : `${Math.round(bytes / 100_000) / 10} MB`;
}
