import type { CreditCost, CreditFacts, CreditYear } from '../facts/finance.ts';
import { sayMoney } from '../ledger/say.ts';
import { type Cents, cents, sumCents } from '../units/cents.ts';
import { yearOf } from '../units/day.ts';
import type { DecimalText } from '../units/rate-text.ts';
import { type CreditForm, creditFormOf } from './credit-forms.ts';
import type { CreditLines } from './credit-lines.ts';
import { creditRate } from './credit-rate.ts';
import { countedShare } from './form-5695.ts';
import { creditLinesOf } from './tax-credit.ts';

/** One year of the preparer's summary. */
export type CreditSummaryYear = {
  taxYear: number;
  form: CreditForm;
  lines: CreditLines;
  status: CreditYear['status'] | 'notListed';
  /** Who typed line 14, and from where; null until it is typed. */
  limitTypedBy: string | null;
  filedOn: CreditYear['filedOn'];
};

/** A check of the form's own arithmetic; `agrees` is null where something is not known yet. */
export type CreditCheck = { label: string; agrees: boolean | null; detail: string };

export type CreditSummary = {
  /** The year the roof was placed in service, which sets the rate; null until it is stated. */
  originYear: number | null;
  originRate: DecimalText;
  /** What qualifies before reductions, each reduction with its reason, and what is left out. */
  grossCostCents: Cents;
  reductions: CreditCost[];
  leftOut: CreditCost[];
  /** The share of the cost that counts, "1" from 80 % home use on. */
  countedShare: DecimalText;
  years: CreditSummaryYear[];
  checks: CreditCheck[];
  /** Line 15 of filed years: by so much the credit has reduced the home's basis so far. When a carried credit reduces it is a question for the preparer. */
  basisReductionCents: Cents;
  cautions: string[];
};

/** In our own words; they stand on the screen, in the file and under every printout. */
export const CREDIT_CAUTIONS: readonly string[] = [
  'These are the figures you entered and the arithmetic printed on Form 5695. This is not tax advice, and it does not decide whether you qualify.',
  'Line 14, the limit, comes from your return; it is never estimated here.',
  'Check every figure against the form and instructions of its year, or ask a tax professional, before you file.',
  'Carryforward shown is unused, not guaranteed.',
];

/** Everything a preparer asks for to carry the credit on, year by year. */
export function creditSummary(credit: CreditFacts): CreditSummary {
  const lines = creditLinesOf(credit);
  const originYear = credit.placedInServiceOn === null ? null : yearOf(credit.placedInServiceOn);
  const of = (treatment: CreditCost['treatment']) => credit.costs.filter((cost) => cost.treatment === treatment);
  const years = lines.map((line): CreditSummaryYear => {
    const year = credit.years.find((one) => one.taxYear === line.taxYear);
    return {
      taxYear: line.taxYear,
      form: creditFormOf(line.taxYear),
      lines: line,
      status: year?.status ?? 'notListed',
      limitTypedBy: year?.limitCents == null ? null : year.typedBy,
      filedOn: year?.filedOn ?? null,
    };
  });
  const filed = years.filter((year) => year.status === 'filed' || year.status === 'amended');
  return {
    originYear,
    originRate: originYear === null ? '0' : creditRate(originYear),
    grossCostCents: sumCents(of('qualified').map((cost) => cost.amountCents)),
    reductions: of('reduction'),
    leftOut: of('leftOut'),
    countedShare: countedShare(credit.homeShare).toString(),
    years,
    checks: creditChecks(lines),
    basisReductionCents: sumCents(filed.map((year) => year.lines.line15Cents ?? cents(0))),
    cautions: [...CREDIT_CAUTIONS],
  };
}

/** Line 12 of each year is line 16 of the one before; all of line 6b is used on line 15 or left on the last line 16. */
export function creditChecks(lines: readonly CreditLines[]): CreditCheck[] {
  const checks: CreditCheck[] = [];
  for (const [index, line] of lines.entries()) {
    const before = lines[index - 1];
    if (!before) continue;
    const known = before.line16Cents !== null && line.line12Cents !== null;
    checks.push({
      label: `Line 12 of ${line.taxYear} is line 16 of ${before.taxYear}`,
      agrees: known ? line.line12Cents === before.line16Cents : null,
      detail:
        before.line16Cents === null || line.line12Cents === null
          ? `Type the limit of ${before.taxYear} to know it`
          : `${sayMoney(line.line12Cents)} and ${sayMoney(before.line16Cents)}`,
    });
  }
  const last = lines.at(-1);
  if (!last) return checks;
  const earned = sumCents(lines.map((line) => line.line6bCents));
  const used = lines.map((line) => line.line15Cents).filter((amount) => amount !== null);
  const label = 'All of line 6b is used on line 15 or carried on the last line 16';
  if (last.line16Cents === null || used.length < lines.length) {
    return [...checks, { label, agrees: null, detail: 'Type every year’s limit to know it' }];
  }
  const total = cents(sumCents(used) + last.line16Cents);
  checks.push({
    label,
    agrees: total === earned,
    detail: `${sayMoney(earned)} = ${sayMoney(sumCents(used))} used + ${sayMoney(last.line16Cents)} carried`,
  });
  return checks;
}
