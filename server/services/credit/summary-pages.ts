import { CREDIT_PAPER_KINDS } from '#shared/books/credit-paper.ts';
import { CREDIT_CAUTIONS, type CreditSummary, PREPARER_QUESTIONS } from '#shared/books/credit-summary.ts';
import type { CreditVintage } from '#shared/books/credit-vintages.ts';
import type { Figure } from '#shared/position/position.ts';
import { type Cents, cents } from '#shared/units/cents.ts';
import { dateWords, MINUS, moneyWords } from '#shared/units/words.ts';
import { type Flow, flowOn, STYLES } from '../../pdf/flow.ts';
import type { Pen } from '../../pdf/pen.ts';
import { type Column, type Row, table } from '../../pdf/table.ts';
import { limitWords, percentText, STATUS_WORDS, type SummaryFacts, VINTAGE_STATES } from './summary-facts.ts';

const NOT_KNOWN = '\u2013';
const OUTCOMES: Record<string, string> = { true: 'agrees', false: 'differs', null: 'not known yet' };
/** Years beside each other on the page; more go into a table of their own. */
const ACROSS = 5;

type SummaryYear = CreditSummary['years'][number];

/** Draws the preparer's summary: the form on the first page, what stands behind it on the second. */
export function drawCreditSummary(pen: Pen, facts: SummaryFacts): void {
  const flow = flowOn(pen);
  flow.paragraph('Residential clean energy credit: carryforward summary', STYLES.title);
  flow.gap(4);
  flow.paragraph(
    [facts.household, facts.place === '' ? null : facts.place].filter((part) => part !== null).join(', '),
    STYLES.strong,
  );
  if (facts.summary === null) flow.paragraph('No tax credit is entered.');
  else {
    formPage(flow, facts, facts.summary);
    flow.newPage();
    costs(flow, facts, facts.summary);
    basis(flow, facts);
    checks(flow, facts.summary);
    papers(flow, facts);
    cautions(flow);
  }
  flow.finish({
    head: `${facts.household}: tax credit summary`,
    headRight: `made on ${dateWords(facts.madeOn)} by ${facts.madeBy}`,
    foot: 'Figures as entered by the owner and the arithmetic of Form 5695. Not tax advice.',
  });
}

function formPage(flow: Flow, facts: SummaryFacts, summary: CreditSummary): void {
  const { view } = facts;
  const placed = facts.credit?.placedInServiceOn ?? null;
  flow.paragraph(
    [
      placed === null ? 'The day of completion is not stated.' : `Roof placed in service on ${dateWords(placed)}.`,
      `Earned or carried in ${moneyWords(view.earnedCents)}, used on filed returns ${moneyWords(view.usedCents)}, left ${moneyWords(view.stillToCarryCents)}.`,
    ].join(' '),
  );
  if (summary.carriedIn !== null) {
    flow.paragraph(
      `Line 16 of the ${summary.carriedIn.taxYear} return, before this record: ${moneyWords(summary.carriedIn.amountCents)}.`,
    );
  }
  flow.gap(12);
  flow.heading('Form 5695, Part I, year by year');
  if (summary.years.length === 0) flow.paragraph('No year of the form is in this record.');
  for (let at = 0; at < summary.years.length; at += ACROSS) {
    formTable(flow, facts, summary.years.slice(at, at + ACROSS));
    flow.gap(14);
  }
  flow.heading('Where each limit, line 14, comes from');
  table(
    flow,
    [left(10), left(22), left(68)],
    null,
    summary.years.map((year) => ({
      cells: [String(year.taxYear), amount(year.lines.line14Cents), limitWords(year, view)],
    })),
  );
  const notes = summary.years.flatMap(({ taxYear, form }) => (form.note === null ? [] : [`${taxYear}: ${form.note}`]));
  if (notes.length > 0) {
    flow.gap(12);
    flow.heading('About the line numbers');
    for (const note of notes) flow.paragraph(note, STYLES.small);
  }
}

function formTable(flow: Flow, { view }: SummaryFacts, years: readonly SummaryYear[]): void {
  const across = (of: (year: SummaryYear) => string) => years.map(of);
  const numbers = (key: string) => [...new Set(view.forms.map((form) => form.lines[key] ?? ''))].join(' / ');
  const line = (
    key: string,
    label: string,
    of: (lines: SummaryYear['lines']) => Cents | null,
    kind?: Row['kind'],
  ): Row => ({
    cells: [numbers(key), label, ...across((year) => amount(of(year.lines)))],
    ...(kind === undefined ? {} : { kind }),
  });
  const beside = (label: string, of: (year: SummaryYear) => string): Row => ({
    cells: ['', label, ...across(of)],
    kind: 'quiet',
  });
  table(
    flow,
    [left(8), left(34), ...years.map(() => right(58 / Math.max(3, years.length)))],
    ['Line', '', ...across(({ taxYear }) => String(taxYear))],
    [
      line('line1', 'Qualified solar electric cost', (lines) => lines.line1Cents),
      line('line6a', 'Sum of costs', (lines) => lines.line6aCents),
      line('line6b', 'Credit on the cost', (lines) => lines.line6bCents),
      line('line12', 'Carried in', (lines) => lines.line12Cents),
      line('line13', 'Available', (lines) => lines.line13Cents),
      line('line14', 'Limit, from the worksheet', (lines) => lines.line14Cents),
      line('line15', 'Used', (lines) => lines.line15Cents, 'total'),
      line('line16', 'Carried forward', (lines) => lines.line16Cents),
      beside('Rate', ({ lines }) => (lines.rate === null ? NOT_KNOWN : percentText(lines.rate))),
      beside('Schedule 3 line', ({ form }) => form.schedule3 ?? 'not checked'),
      beside('Status', ({ status }) => STATUS_WORDS[status]),
      beside('Filed on', ({ filedOn }) => (filedOn === null ? NOT_KNOWN : dateWords(filedOn))),
      beside('Refund came on', ({ refundOn }) => (refundOn === null ? NOT_KNOWN : dateWords(refundOn))),
    ],
  );
}

function costs(flow: Flow, { credit }: SummaryFacts, summary: CreditSummary): void {
  flow.heading('What the cost is made of');
  const rows: Row[] = summary.vintages.flatMap((vintage) => vintageRows(vintage, credit?.placedInServiceOn ?? null));
  for (const cost of summary.undated) {
    rows.push({
      cells: [cost.label, 'no day of completion stated: not counted', moneyWords(cost.amountCents)],
      kind: 'quiet',
    });
  }
  table(flow, [left(44), left(38), right(18)], ['Cost', 'How it counts', 'Amount'], rows);
  flow.gap(12);
}

function vintageRows(vintage: CreditVintage, roofOn: string | null): Row[] {
  const rows = vintage.costs.map((cost): Row => {
    const own = cost.placedInServiceOn !== null && cost.placedInServiceOn !== roofOn;
    const when = own && cost.placedInServiceOn !== null ? [`Completed ${dateWords(cost.placedInServiceOn)}`] : [];
    const why = cost.reason === null ? [] : [cost.reason];
    const how = { qualified: [], reduction: ['Taken off'], leftOut: ['Left out'] }[cost.treatment];
    const size = moneyWords(cost.amountCents);
    return {
      cells: [
        cost.label,
        [...how, ...why, ...when].map((part) => part.replace(/\.$/, '')).join('. '),
        cost.treatment === 'reduction' ? `${MINUS}${size}` : size,
      ],
      kind: cost.treatment === 'leftOut' ? 'quiet' : 'plain',
    };
  });
  if (vintage.share !== '1') {
    rows.push({
      cells: ['Share for the home', 'under 80 %: only this share counts', percentText(vintage.share)],
      kind: 'quiet',
    });
  }
  const state =
    vintage.state === 'counts'
      ? `${percentText(vintage.rate)}, ${vintage.law}`
      : `${VINTAGE_STATES[vintage.state]}, ${vintage.law}`;
  rows.push({ cells: [`Line 1 of ${vintage.year}`, state, moneyWords(vintage.line1Cents)], kind: 'total' });
  return rows;
}

function basis(flow: Flow, { view }: SummaryFacts): void {
  if (view.basis === null) return;
  const row = (label: string, figure: Figure): Row => ({
    cells: [label, figure.working.words, moneyWords(figure.amountCents)],
  });
  flow.heading('By how much the roof raises the home’s basis');
  table(flow, [left(27), left(57), right(16)], null, [
    row('With the credit used so far', view.basis.soFar),
    row('With all of the credit', view.basis.whole),
  ]);
  flow.gap(12);
}

function checks(flow: Flow, summary: CreditSummary): void {
  if (summary.checks.length === 0) return;
  flow.heading('Checks');
  table(
    flow,
    [left(44), left(38), right(18)],
    null,
    summary.checks.map(({ label, detail, agrees }) => ({ cells: [label, detail, OUTCOMES[String(agrees)] ?? ''] })),
  );
  flow.gap(12);
}

function papers(flow: Flow, { view }: SummaryFacts): void {
  flow.heading('Papers kept');
  if (view.papers.length === 0) flow.paragraph('None yet.');
  else {
    table(
      flow,
      [left(26), left(52), right(22)],
      null,
      view.papers.map((paper) => ({
        cells: [
          CREDIT_PAPER_KINDS.find(({ kind }) => kind === paper.paperKind)?.words ?? '',
          paper.fileName,
          dateWords(paper.uploadedOn),
        ],
      })),
    );
  }
  flow.gap(12);
}

function cautions(flow: Flow): void {
  flow.heading('To ask the preparer');
  for (const question of PREPARER_QUESTIONS) flow.paragraph(question, STYLES.small);
  flow.gap(8);
  for (const caution of CREDIT_CAUTIONS) flow.paragraph(caution, STYLES.small);
}

const left = (share: number): Column => ({ share, align: 'left' });
const right = (share: number): Column => ({ share, align: 'right' });

/** As the form has it: whole dollars where they are whole, without the sign of the dollar. */
function amount(value: Cents | null): string {
  if (value === null) return NOT_KNOWN;
  const words = moneyWords(cents(value)).replace('$', '');
  return words.endsWith('.00') ? words.slice(0, -3) : words;
}
