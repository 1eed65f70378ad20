import type { CreditView } from '#shared/api/credit.ts';
import { creditFormOf } from '#shared/books/credit-forms.ts';
import type { CreditLines } from '#shared/books/credit-lines.ts';
import { creditChecks } from '#shared/books/credit-summary.ts';
import type { CreditFacts } from '#shared/facts/finance.ts';
import { type Cents, subtractCents, sumCents, ZERO_CENTS } from '#shared/units/cents.ts';
import type { Deps } from '../../deps.ts';
import { ledgerOf } from '../ledger-of.ts';

const known = (amounts: readonly (Cents | null)[]): Cents[] => amounts.filter((amount) => amount !== null);

function usedCents(credit: CreditFacts, lines: readonly CreditLines[]): Cents {
  const filed = new Set(credit.years.filter((year) => year.status !== 'planned').map((year) => year.taxYear));
  return sumCents(known(lines.filter((line) => filed.has(line.taxYear)).map((line) => line.line15Cents)));
}

/** The tax credit, for the household and its preparer: nothing in it comes from another book. */
export function viewCredit(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): CreditView {
  const { facts, ledger } = ledgerOf(deps, householdId);
  const { credit } = facts;
  const lines = ledger.creditLines;
  const earned = sumCents(lines.map((line) => line.line6bCents));
  const used = credit === null ? ZERO_CENTS : usedCents(credit, lines);
  return {
    credit,
    lines,
    forms: lines.map((line) => {
      const { taxYear, lines: numbers, schedule3, note } = creditFormOf(line.taxYear);
      return { taxYear, lines: numbers, schedule3, note };
    }),
    earnedCents: earned,
    usedCents: used,
    receivedCents: sumCents(
      ledger.entries
        .filter(({ book, basis }) => book === 'credit' && basis === 'cash')
        .map((entry) => entry.amountCents),
    ),
    stillToCarryCents: subtractCents(earned, used),
    checks: creditChecks(lines),
    papers: facts.documents.filter((document) => document.kind === 'credit'),
  };
}
