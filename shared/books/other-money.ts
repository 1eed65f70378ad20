import type { LoanFacts, OtherLoan } from '../facts/finance.ts';
import { sayCount, sayDate } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import { sumCents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { Source, Working } from '../working.ts';
import type { Entry, UnplacedEntry } from './book.ts';
import { stated, usdListInput } from './inputs.ts';
import { loanEntries, loanPayoff, type PaymentsOfTheDay } from './loan.ts';
import { LOAN_TERMS } from './loan-workings.ts';
import { type PaperName, sourceOfPaper } from './paper-source.ts';

/** What each kind of other solar money is called. */
export const OTHER_LOAN_NAMES: Record<OtherLoan['kind'], string> = {
  mortgageShare: 'Share of the mortgage',
  homeEquity: 'Home-equity loan',
  other: 'Second loan',
};

/** The entries of a loan through a day, the terms behind them taken from its contract where that is kept. */
export function loanEntriesWithPapers(
  loan: LoanFacts,
  through: Day,
  papers: readonly PaperName[] = [],
): UnplacedEntry[] {
  const entries = loanEntries(loan, through, papers);
  const contract = sourceOfPaper(loan.documentId, papers, LOAN_TERMS);
  if (contract === LOAN_TERMS) return entries;
  return entries.map((entry) => ({ ...entry, working: fromContract(entry.working, contract) }));
}

function fromContract(working: Working, contract: Source): Working {
  const inputs = working.inputs.map((input) => (input.source === LOAN_TERMS ? { ...input, source: contract } : input));
  return { ...working, inputs };
}

/** The entries of the other loans through a day, each by the loan book's own rules, its ids set apart by the loan's id. */
export function otherLoanEntries(
  others: readonly OtherLoan[],
  through: Day,
  papers: readonly PaperName[] = [],
): UnplacedEntry[] {
  return others.flatMap((other) =>
    loanEntriesWithPapers(other.loan, through, papers).map((entry) => ({
      ...entry,
      id: `${prefixOf(other.id)}${entry.id}`,
      label: `${OTHER_LOAN_NAMES[other.kind]}: ${entry.label}`,
    })),
  );
}

/** Whether an entry belongs to one of the other loans. */
export function isOfOtherLoan(entry: Pick<Entry, 'id'>, otherId: string): boolean {
  return entry.id.startsWith(prefixOf(otherId));
}

/** Whether an entry of the loan book is the solar loan's own, and neither another loan's nor a lease's. */
export function isOfSolarLoan(entry: Pick<Entry, 'id' | 'book'>): boolean {
  return entry.book === 'loan' && entry.id.startsWith('loan-');
}

function prefixOf(otherId: string): string {
  return `other-${otherId}-`;
}

/** What it takes to pay every loan off on a day: the one loan's own working, or the sum of them. Null where there is no loan. */
export function payoffOfLoans(
  loans: readonly LoanFacts[],
  on: Day,
  payments: PaymentsOfTheDay = 'through',
): Figure | null {
  const figures = loans.map((loan) => loanPayoff(loan, on, payments));
  const [only] = figures;
  if (only === undefined) return null;
  if (figures.length === 1) return only;
  const amounts = figures.map(({ amountCents }) => amountCents);
  return {
    amountCents: sumCents(amounts),
    working: {
      words: `The payoff of ${sayCount(loans.length, 'loan', 'loans')} on ${sayDate(on)} added`,
      formula: 'sum(payoffs)',
      inputs: [
        usdListInput(
          'payoffs',
          `Payoff of ${loans.map(({ lender }) => (lender === '' ? 'a loan' : lender)).join(', ')}`,
          amounts,
          stated('The payoff of each loan, on Money'),
        ),
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}
