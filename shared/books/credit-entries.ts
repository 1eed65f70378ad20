import type { CreditFacts, CreditYear } from '../facts/finance.ts';
import { sayMoney } from '../ledger/say.ts';
import { ZERO_CENTS } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { Source } from '../working.ts';
import type { UnplacedEntry } from './book.ts';
import type { CreditLines } from './credit-lines.ts';
import { creditVintages } from './credit-vintages.ts';
import { carryCredit } from './form-5695.ts';
import { rule, stated, usdInput } from './inputs.ts';
import { type PaperName, sourceOfPaper } from './paper-source.ts';

const lines = new WeakMap<CreditFacts, CreditLines[]>();

/**
 * The form's lines for each year the owner lists and each year in which something that earns a credit was completed. Cost enters in that year alone, at
 * that year's rate: what was completed after 2025 earns nothing, whenever it was paid, and what was carried forward before is not touched by that. What
 * a return before the record carried in stands on line 12 of the first year after it; that return's year and those before it have no lines here.
 */
export function creditLinesOf(credit: CreditFacts): CreditLines[] {
  const known = lines.get(credit);
  if (known) return known;
  const after = credit.carriedIn?.taxYear ?? 0;
  const entering = new Map(
    creditVintages(credit)
      .filter((vintage) => vintage.state === 'counts')
      .map((vintage) => [vintage.year, vintage]),
  );
  const limits = new Map(
    credit.years.filter((year) => year.taxYear > after).map((year) => [year.taxYear, year.limitCents]),
  );
  for (const year of entering.keys()) if (!limits.has(year)) limits.set(year, null);
  const made = carryCredit(
    credit.carriedIn?.amountCents ?? ZERO_CENTS,
    [...limits].map(([taxYear, limitCents]) => {
      const vintage = entering.get(taxYear);
      return { taxYear, line1Cents: vintage?.line1Cents ?? ZERO_CENTS, rate: vintage?.rate ?? null, limitCents };
    }),
  );
  lines.set(credit, made);
  return made;
}

/** The day a return's use of the credit counts as cash: the refund's, or the filing's where it only lowered the tax due. Null until then. */
export function creditCashOn(year: CreditYear): Day | null {
  if (year.status === 'planned') return null;
  return year.asRefund ? year.refundOn : year.filedOn;
}

/** Cash entries through a day: line 15 of each return whose money has come. A planned year gives none. `papers` name the returns the limits came from. */
export function creditEntries(credit: CreditFacts, through: Day, papers: readonly PaperName[] = []): UnplacedEntry[] {
  const entries: UnplacedEntry[] = [];
  for (const line of creditLinesOf(credit)) {
    const year = credit.years.find((one) => one.taxYear === line.taxYear);
    const on = year ? creditCashOn(year) : null;
    const { line13Cents, line14Cents, line15Cents } = line;
    if (!year || on === null || on > through) continue;
    if (line13Cents === null || line14Cents === null || line15Cents === null || line15Cents === 0) continue;
    const form = rule('Form 5695, Part I', String(line.taxYear));
    entries.push({
      id: `credit-${line.taxYear}`,
      date: on,
      book: 'credit',
      kind: year.asRefund ? 'refund' : 'lessTax',
      label: `Tax credit used on the ${line.taxYear} return${year.asRefund ? ', refunded' : ''}`,
      amountCents: line15Cents,
      basis: 'cash',
      estimated: false,
      working: {
        words: `Line 15 of ${line.taxYear}: the smaller of ${sayMoney(line13Cents)} and the limit ${sayMoney(line14Cents)}`,
        formula: 'min(available, limit)',
        inputs: [
          usdInput('available', 'Line 13', line13Cents, form),
          usdInput('limit', 'Line 14, from the return', line14Cents, limitSource(year, papers)),
        ],
        unit: 'USD',
        basis: 'computed',
      },
    });
  }
  return entries;
}

/** The return itself where it is kept, else who typed the limit and from what. */
function limitSource(year: CreditYear, papers: readonly PaperName[]): Source {
  const by = year.typedBy === null ? '' : ` by ${year.typedBy}`;
  const from = year.limitFrom === null ? '' : `, from ${year.limitFrom}`;
  return sourceOfPaper(year.documentId, papers, stated(`Limit as entered${by}${from}`));
}
