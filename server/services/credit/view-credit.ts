import type { CreditView } from '#shared/api/credit.ts';
import type { CreditLines } from '#shared/books/credit-lines.ts';
import type { CreditFacts } from '#shared/facts/finance.ts';
import { type Cents, dollarsText, subtractCents, sumCents, ZERO_CENTS } from '#shared/units/cents.ts';
import type { Deps } from '../../deps.ts';
import { ledgerOf } from '../ledger-of.ts';
import { formYearOf } from './form-years.ts';

const known = (amounts: readonly (Cents | null)[]): Cents[] => amounts.filter((amount) => amount !== null);

/** What the form's own arithmetic must show from year to year. */
function chainChecks(lines: readonly CreditLines[]): CreditView['checks'] {
  const checks: CreditView['checks'] = [];
  for (const [index, line] of lines.entries()) {
    const before = lines[index - 1];
    if (before === undefined || before.line16Cents === null || line.line12Cents === null) continue;
    checks.push({
      label: `${line.taxYear}, line 12 is line 16 of ${before.taxYear}`,
      agrees: line.line12Cents === before.line16Cents,
      detail: `$${dollarsText(line.line12Cents)} and $${dollarsText(before.line16Cents)}`,
    });
  }
  const last = lines.at(-1);
  const complete = lines.every((line) => line.line15Cents !== null);
  if (last !== undefined && last.line16Cents !== null && complete) {
    const earned = sumCents(lines.map((line) => line.line6bCents));
    const used = sumCents(known(lines.map((line) => line.line15Cents)));
    checks.push({
      label: 'All of line 6b is used on line 15 or carried on line 16',
      agrees: earned === used + last.line16Cents,
      detail: `$${dollarsText(earned)} = $${dollarsText(used)} + $${dollarsText(last.line16Cents)}`,
    });
  }
  return checks;
}

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
    forms: lines.map((line) => formYearOf(line.taxYear)),
    earnedCents: earned,
    usedCents: used,
    receivedCents: sumCents(
      ledger.entries
        .filter(({ book, basis }) => book === 'credit' && basis === 'cash')
        .map((entry) => entry.amountCents),
    ),
    stillToCarryCents: subtractCents(earned, used),
    checks: chainChecks(lines),
    papers: facts.documents.filter((document) => document.kind === 'credit'),
  };
}
