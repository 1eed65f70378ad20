import type { CreditView } from '#shared/api/credit.ts';
import { basisEffect } from '#shared/books/credit-basis.ts';
import { creditChecks } from '#shared/books/credit-checks.ts';
import { creditFormOf } from '#shared/books/credit-forms.ts';
import type { CreditLines } from '#shared/books/credit-lines.ts';
import { creditPaperKind } from '#shared/books/credit-paper.ts';
import { creditPlan } from '#shared/books/credit-plan.ts';
import { creditVintages, undatedCosts } from '#shared/books/credit-vintages.ts';
import type { CreditFacts } from '#shared/facts/finance.ts';
import { type Cents, subtractCents, sumCents, ZERO_CENTS } from '#shared/units/cents.ts';
import type { Deps } from '../../deps.ts';
import { type HouseholdLedger, ledgerOf } from '../ledger-of.ts';

const known = (amounts: readonly (Cents | null)[]): Cents[] => amounts.filter((amount) => amount !== null);

function usedCents(credit: CreditFacts, lines: readonly CreditLines[]): Cents {
  const filed = new Set(credit.years.filter((year) => year.status !== 'planned').map((year) => year.taxYear));
  return sumCents(known(lines.filter((line) => filed.has(line.taxYear)).map((line) => line.line15Cents)));
}

/** The tax credit, for the household and its preparer: nothing in it comes from another book. */
export function viewCredit(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): CreditView {
  return creditViewOf(ledgerOf(deps, householdId));
}

/** The same from facts and ledger alone. */
export function creditViewOf({ facts, ledger }: Pick<HouseholdLedger, 'facts' | 'ledger'>): CreditView {
  const { credit } = facts;
  const lines = ledger.creditLines;
  const earned = sumCents([...lines.map((line) => line.line6bCents), credit?.carriedIn?.amountCents ?? ZERO_CENTS]);
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
    checks: creditChecks(lines, credit?.carriedIn ?? null),
    vintages: credit === null ? [] : creditVintages(credit),
    undated: credit === null ? [] : undatedCosts(credit),
    plan: credit === null ? null : creditPlan(credit),
    basis: credit === null ? null : basisEffect(credit),
    papers: facts.documents
      .filter((document) => document.kind === 'credit')
      .map((document) => ({ ...document, paperKind: creditPaperKind(document.fileName) })),
  };
}
