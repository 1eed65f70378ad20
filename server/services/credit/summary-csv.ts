import type { CreditLines } from '#shared/books/credit-lines.ts';
import { CREDIT_PAPER_KINDS } from '#shared/books/credit-paper.ts';
import { CREDIT_CAUTIONS, type CreditSummary, PREPARER_QUESTIONS } from '#shared/books/credit-summary.ts';
import { completedOn } from '#shared/books/credit-vintages.ts';
import type { CreditCost } from '#shared/facts/finance.ts';
import type { Cents } from '#shared/units/cents.ts';
import type { Actor, Deps } from '../../deps.ts';
import { type Cell, csvText } from '../csv-text.ts';
import { limitWords, STATUS_WORDS, type SummaryFacts, summaryFacts, VINTAGE_STATES } from './summary-facts.ts';

const AGREES: Record<string, string> = { true: 'yes', false: 'no', null: 'not known yet' };
const TREATMENTS: Record<CreditCost['treatment'], string> = {
  qualified: 'qualified',
  reduction: 'reduction',
  leftOut: 'left out',
};

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

/** The form, years across and lines down, each year with its status and where its limit comes from. */
function formRows({ view }: SummaryFacts, summary: CreditSummary): Cell[][] {
  const { years } = summary;
  const across = (of: (year: CreditSummary['years'][number]) => Cell): Cell[] => years.map(of);
  const numbers = (key: string) => [...new Set(view.forms.map((form) => form.lines[key] ?? '?'))].join(' / ');
  return [
    ['Form 5695, Part I', 'Line', ...across(({ taxYear }) => taxYear)],
    ...ROWS.map(({ key, label, of }): Cell[] => [label, numbers(key), ...across(({ lines }) => money(of(lines)))]),
    ['Rate', '', ...across(({ lines }) => lines.rate ?? '')],
    ['Schedule 3, line', '', ...across(({ form }) => form.schedule3 ?? 'not checked')],
    ['Status', '', ...across(({ status }) => STATUS_WORDS[status])],
    ['Filed on', '', ...across(({ filedOn }) => filedOn ?? '')],
    ['Refund came on', '', ...across(({ refundOn }) => refundOn ?? '')],
    ['Where the limit comes from', '', ...across((year) => limitWords(year, view))],
    ['Reduction of the home’s basis so far', '', ...across((year) => money(year.basisReductionCents))],
    ['About the form', '', ...across(({ form }) => form.note ?? '')],
  ];
}

function costRows({ credit }: SummaryFacts, summary: CreditSummary): Cell[][] {
  return [
    ['Completed in', 'Rate', 'Cost', 'Taken off', 'Share that counts', 'Line 1', 'Line 6b', 'Law', 'State'],
    ...summary.vintages.map((one): Cell[] => [
      one.year,
      one.rate,
      money(one.grossCents),
      money(one.reductionCents),
      one.share,
      money(one.line1Cents),
      money(one.line6bCents),
      one.law,
      VINTAGE_STATES[one.state],
    ]),
    [],
    ['What the cost is made of', 'Treatment', 'Amount', 'Reason', 'Completed on'],
    ...(credit?.costs ?? []).map((cost): Cell[] => [
      cost.label,
      TREATMENTS[cost.treatment],
      money(cost.amountCents),
      cost.reason ?? '',
      credit === null ? '' : (completedOn(credit, cost) ?? 'not stated'),
    ]),
    ['Share for the home', '', credit?.homeShare ?? ''],
  ];
}

function sheet(facts: SummaryFacts): Cell[][] {
  const { view, summary, credit } = facts;
  const head: Cell[][] = [
    ['Residential clean energy credit, carryforward summary'],
    ['Household', facts.household],
    ['Home', facts.place],
    ['Made on', facts.madeOn],
    ['Made by', facts.madeBy],
  ];
  const cautions = CREDIT_CAUTIONS.map((caution): Cell[] => [caution]);
  if (summary === null) return [...head, ['No tax credit is entered'], [], ...cautions];
  const { carriedIn } = summary;
  return [
    ...head,
    ['Placed in service', credit?.placedInServiceOn ?? 'not stated'],
    carriedIn === null
      ? ['Carried in from before this record', 'none']
      : [`Carried in, line 16 of ${carriedIn.taxYear}`, money(carriedIn.amountCents)],
    [],
    ...formRows(facts, summary),
    [],
    ...costRows(facts, summary),
    [],
    ['Effect on the home’s basis (26 U.S.C. 25D(f))', 'Amount'],
    ['With the credit used on filed returns', money(view.basis?.soFar.amountCents ?? null)],
    ['With all of the credit', money(view.basis?.whole.amountCents ?? null)],
    [],
    ['Checks', 'Agrees', 'Figures'],
    ...summary.checks.map((check): Cell[] => [check.label, AGREES[String(check.agrees)] ?? '', check.detail]),
    [],
    ['Papers', 'What it is', 'Uploaded on', 'Uploaded by'],
    ...view.papers.map((paper): Cell[] => [
      paper.fileName,
      CREDIT_PAPER_KINDS.find(({ kind }) => kind === paper.paperKind)?.words ?? '',
      paper.uploadedOn,
      paper.uploadedBy,
    ]),
    [],
    ['To ask the preparer'],
    ...PREPARER_QUESTIONS.map((question): Cell[] => [question]),
    [],
    ...cautions,
  ];
}

/** The preparer's carryforward summary: years across, form lines down, then costs, basis, checks and papers. */
export function creditSummaryCsv(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Pick<Actor, 'householdId' | 'name'>,
): { fileName: string; contentType: string; body: string } {
  const facts = summaryFacts(deps, actor);
  return {
    fileName: `tax-credit-summary-${facts.madeOn}.csv`,
    contentType: 'text/csv; charset=utf-8',
    body: csvText(sheet(facts)),
  };
}
