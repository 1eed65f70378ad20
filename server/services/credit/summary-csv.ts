import type { CreditView } from '#shared/api/credit.ts';
import type { CreditLines } from '#shared/books/credit-lines.ts';
import { CREDIT_CAUTIONS, creditSummary } from '#shared/books/credit-summary.ts';
import type { Cents } from '#shared/units/cents.ts';
import type { Deps } from '../../deps.ts';
import { type Cell, csvText } from '../csv-text.ts';
import { ledgerOf } from '../ledger-of.ts';
import { viewCredit } from './view-credit.ts';

const AGREES: Record<string, string> = { true: 'yes', false: 'no', null: 'not known yet' };

const money = (amount: Cents | null): Cell => (amount === null ? null : { cents: amount });

const ROWS: readonly { key: string; label: string; of: (line: CreditLines) => Cents | null }[] = [
  { key: 'line1', label: 'Qualified solar electric cost', of: (line) => line.line1Cents },
  { key: 'line6a', label: 'Sum of costs', of: (line) => line.line6aCents },
  { key: 'line6b', label: 'Credit on the cost', of: (line) => line.line6bCents },
  { key: 'line12', label: 'Carried in', of: (line) => line.line12Cents },
  { key: 'line13', label: 'Available', of: (line) => line.line13Cents },
  { key: 'line14', label: 'Limit, from the worksheet', of: (line) => line.line14Cents },
  { key: 'line15', label: 'Used', of: (line) => line.line15Cents },
  { key: 'line16', label: 'Carried forward', of: (line) => line.line16Cents },
];

/** The line's number where all years agree on it, else the number of each year. */
function numberOf(view: CreditView, key: string): string {
  const numbers = [...new Set(view.forms.map((form) => form.lines[key] ?? '?'))];
  return numbers.join(' / ');
}

function sheet(view: CreditView, householdName: string, today: string): Cell[][] {
  const years = view.credit?.years ?? [];
  const summary = view.credit === null ? null : creditSummary(view.credit);
  const yearOf = (taxYear: number) => years.find((year) => year.taxYear === taxYear) ?? null;
  const across = <T extends Cell>(of: (line: CreditLines) => T): T[] => view.lines.map(of);
  return [
    ['Residential clean energy credit, carryforward summary'],
    ['Household', householdName],
    ['Made on', today],
    ['Placed in service', view.credit?.placedInServiceOn ?? 'not stated'],
    ['Origin year', summary?.originYear ?? 'not stated'],
    ['Rate of the origin year', summary?.originRate ?? ''],
    ['Cost before reductions', money(summary?.grossCostCents ?? null)],
    ['Reduction of the home’s basis by filed returns', money(summary?.basisReductionCents ?? null)],
    [],
    ['Form 5695, Part I', 'Line', ...across((line) => line.taxYear)],
    ...ROWS.map(({ key, label, of }): Cell[] => [label, numberOf(view, key), ...across((line) => money(of(line)))]),
    ['Rate', '', ...across((line) => line.rate ?? '')],
    ['Schedule 3, line', '', ...view.forms.map((form) => form.schedule3 ?? 'not checked')],
    ['Status', '', ...across((line) => yearOf(line.taxYear)?.status ?? 'planned')],
    ['Filed on', '', ...across((line) => yearOf(line.taxYear)?.filedOn ?? '')],
    ['Limit typed by', '', ...across((line) => yearOf(line.taxYear)?.typedBy ?? '')],
    ['About the form', '', ...view.forms.map((form) => form.note ?? '')],
    [],
    ['What the cost is made of', 'Treatment', 'Amount', 'Reason'],
    ...(view.credit?.costs ?? []).map((cost): Cell[] => [
      cost.label,
      cost.treatment === 'leftOut' ? 'left out' : cost.treatment,
      money(cost.amountCents),
      cost.reason ?? '',
    ]),
    ['Share for the home', '', view.credit?.homeShare ?? ''],
    [],
    ['Checks', 'Agrees', 'Figures'],
    ...view.checks.map((check): Cell[] => [check.label, AGREES[String(check.agrees)] ?? '', check.detail]),
    [],
    ['Papers', 'Uploaded on'],
    ...view.papers.map((paper): Cell[] => [paper.fileName, paper.uploadedOn]),
    [],
    ...CREDIT_CAUTIONS.map((caution): Cell[] => [caution]),
  ];
}

/** The preparer's carryforward summary: years across, form lines down, then costs, checks and papers. */
export function creditSummaryCsv(
  deps: Pick<Deps, 'db' | 'clock'>,
  householdId: string,
): { fileName: string; contentType: string; body: string } {
  const { row, today } = ledgerOf(deps, householdId);
  return {
    fileName: `tax-credit-summary-${today}.csv`,
    contentType: 'text/csv; charset=utf-8',
    body: csvText(sheet(viewCredit(deps, householdId), row.name, today)),
  };
}
