import type { CreditCost, CreditFacts, CreditYear } from '../facts/finance.ts';
import { type Cents, cents, sumCents } from '../units/cents.ts';
import { type CreditCheck, creditChecks } from './credit-checks.ts';
import { creditLinesOf } from './credit-entries.ts';
import { type CreditForm, creditFormOf } from './credit-forms.ts';
import type { CreditLines } from './credit-lines.ts';
import { type CreditVintage, creditVintages, undatedCosts } from './credit-vintages.ts';

/** One year of the preparer's summary. */
export type CreditSummaryYear = {
  taxYear: number;
  form: CreditForm;
  lines: CreditLines;
  status: CreditYear['status'] | 'notListed';
  /** Who typed line 14, from what, and the kept return it stands on; null until it is typed. */
  limitTypedBy: string | null;
  limitFrom: string | null;
  documentId: string | null;
  filedOn: CreditYear['filedOn'];
  refundOn: CreditYear['refundOn'];
  /** Line 15 of this and every earlier filed return: by so much the credit has lowered the home's basis by then. */
  basisReductionCents: Cents;
};

export type CreditSummary = {
  vintages: CreditVintage[];
  undated: CreditCost[];
  carriedIn: CreditFacts['carriedIn'];
  years: CreditSummaryYear[];
  checks: CreditCheck[];
  cautions: string[];
};

/** In our own words; they stand on the screen, in the file and under every printout. */
export const CREDIT_CAUTIONS: readonly string[] = [
  'These are the figures you entered and the arithmetic printed on Form 5695. This is not tax advice, and it does not decide whether you qualify.',
  'Line 14, the limit, comes from your return; it is never estimated here.',
  'Check every figure against the form and instructions of its year, or ask a tax professional, before you file.',
  'Carryforward shown is unused, not guaranteed.',
];

/** What the record cannot answer and whoever prepares the return is asked. */
export const PREPARER_QUESTIONS: readonly string[] = [
  'Whether a credit carried forward lowers the home’s basis as it is used, or all at once.',
  'Whether a dealer fee inside a loan is part of the cost; it is left out here unless the owner entered it otherwise.',
];

/** Everything a preparer asks for to carry the credit on, year by year. */
export function creditSummary(credit: CreditFacts): CreditSummary {
  const lines = creditLinesOf(credit);
  const years: CreditSummaryYear[] = [];
  for (const line of lines) {
    const year = credit.years.find((one) => one.taxYear === line.taxYear);
    const filed = year?.status === 'filed' || year?.status === 'amended';
    const typed = year !== undefined && year.limitCents !== null;
    years.push({
      taxYear: line.taxYear,
      form: creditFormOf(line.taxYear),
      lines: line,
      status: year?.status ?? 'notListed',
      limitTypedBy: typed ? year.typedBy : null,
      limitFrom: typed ? year.limitFrom : null,
      documentId: year?.documentId ?? null,
      filedOn: year?.filedOn ?? null,
      refundOn: year?.refundOn ?? null,
      basisReductionCents: sumCents([
        years.at(-1)?.basisReductionCents ?? cents(0),
        filed ? (line.line15Cents ?? cents(0)) : cents(0),
      ]),
    });
  }
  return {
    vintages: creditVintages(credit),
    undated: undatedCosts(credit),
    carriedIn: credit.carriedIn,
    years,
    checks: creditChecks(lines, credit.carriedIn),
    cautions: [...CREDIT_CAUTIONS],
  };
}
