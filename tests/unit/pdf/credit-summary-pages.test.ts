import { describe, expect, it } from 'vitest';
import { pdfPen } from '#server/pdf/pdf-pen.ts';
import { type Drawn, recorded } from '#server/pdf/pen.ts';
import { summaryFactsOf } from '#server/services/credit/summary-facts.ts';
import { drawCreditSummary } from '#server/services/credit/summary-pages.ts';
import { CREDIT_CAUTIONS, PREPARER_QUESTIONS } from '#shared/books/credit-summary.ts';
import type { CreditFacts } from '#shared/facts/finance.ts';
import type { DocumentFacts } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { creditCost, creditOf, creditYear } from '../books/facts.ts';

const TODAY = day('2026-12-01');
const paper = (id: string, fileName: string): DocumentFacts => ({
  id,
  fileName,
  kind: 'credit',
  sha256: '0'.repeat(64),
  size: 1,
  uploadedOn: day('2025-02-03'),
  uploadedBy: 'Priya',
});

function draw(credit: CreditFacts | null, documents: DocumentFacts[] = []) {
  const facts = { ...buildHousehold({ cycles: 2 }), credit };
  facts.documents = [...facts.documents, ...documents];
  const ledger = computeLedger(facts, { today: TODAY });
  const summary = summaryFactsOf({ facts, ledger, today: TODAY }, 'Marisol Vega');
  const { pen, drawn } = recorded(pdfPen({ title: 'x', madeOn: TODAY }).pen);
  drawCreditSummary(pen, summary);
  return { drawn, pages: pen.pages(), lines: ledger.creditLines };
}

/** The texts of a page that stand on one line, from left to right. */
function rowsOf(drawn: readonly Drawn[], page: number): string[][] {
  const lines = new Map<number, { x: number; text: string }[]>();
  for (const one of drawn) {
    if (one.kind !== 'text' || one.page !== page || one.text === '') continue;
    const y = Math.round(one.y * 10);
    lines.set(y, [...(lines.get(y) ?? []), one]);
  }
  return [...lines]
    .sort(([a], [b]) => a - b)
    .map(([, cells]) => cells.sort((a, b) => a.x - b.x).map(({ text }) => text));
}
const words = (drawn: readonly Drawn[], page: number) => rowsOf(drawn, page).flat().join(' ');

describe('the preparer’s summary on paper', () => {
  it('has the form on the first of two pages, each line with its number and each year’s figure', () => {
    const { drawn, pages, lines } = draw(creditOf());
    expect(pages).toBe(2);
    const rows = rowsOf(drawn, 1);
    expect(rows).toContainEqual(['Line', '2024', '2025', '2026']);
    expect(rows).toContainEqual(['1', 'Qualified solar electric cost', '36,900', '0', '0']);
    expect(rows).toContainEqual(['6b', 'Credit on the cost', '11,070', '0', '0']);
    expect(rows).toContainEqual(['12', 'Carried in', '0', '6,920', '1,870']);
    expect(rows).toContainEqual(['14', 'Limit, from the worksheet', '4,150', '5,050', '5,200']);
    expect(rows).toContainEqual(['15', 'Used', '4,150', '5,050', '1,870']);
    expect(rows).toContainEqual(['16', 'Carried forward', '6,920', '1,870', '0']);
    expect(rows).toContainEqual(['Schedule 3 line', '5a', '5a', 'not checked']);
    expect(rows).toContainEqual(['Status', 'filed', 'filed', 'planned, figures expected']);
    expect(lines.map((line) => line.line15Cents)).toEqual([415_000, 505_000, 187_000]);
  });

  it('says where each limit comes from: worksheet, who typed it, and the kept return', () => {
    const credit = creditOf({
      years: [
        creditYear(2024, 415_000, {
          status: 'filed',
          filedOn: day('2025-03-10'),
          limitFrom: 'line 14 worksheet, 2024 return',
          documentId: 'r',
        }),
        creditYear(2025, null, {}),
      ],
    });
    const { drawn } = draw(credit, [paper('r', 'return 2024.pdf')]);
    expect(rowsOf(drawn, 1)).toContainEqual([
      '2024',
      '4,150',
      'line 14 worksheet, 2024 return; typed by Priya; paper: return 2024.pdf',
    ]);
    expect(rowsOf(drawn, 1)).toContainEqual(['2025', '–', 'not entered yet']);
  });

  it('has costs, reductions with their reason, basis, checks, papers and cautions on the second', () => {
    const credit = creditOf();
    credit.costs.push(creditCost('Subsidy', 150_000, 'reduction', 'Paid by the utility'));
    const { drawn } = draw(credit, [paper('c', 'contract, scan1.pdf')]);
    const rows = rowsOf(drawn, 2);
    expect(rows).toContainEqual(['Subsidy', 'Taken off. Paid by the utility', '−$1,500.00']);
    expect(rows).toContainEqual(['Dealer fee', 'Left out. Part of the loan', '$3,100.00']);
    expect(rows).toContainEqual(['Line 1 of 2024', '30 %, P.L. 117-169 §13302', '$35,400.00']);
    expect(rows).toContainEqual(['Line 12 of 2025 is line 16 of 2024', '$6,470.00 and $6,470.00', 'agrees']);
    expect(rows).toContainEqual(['Contract', 'contract, scan1.pdf', '3 Feb 2025']);
    const said = words(drawn, 2);
    for (const text of [...CREDIT_CAUTIONS, ...PREPARER_QUESTIONS]) expect(said).toContain(text);
    expect(said).toContain('page 2 of 2');
    expect(said).toContain('made on 1 Dec 2026 by Marisol Vega');
  });

  it('shows a vintage of its own, business use, costs without a day and what was carried in', () => {
    const two = draw(
      creditOf({
        placedInServiceOn: day('2021-08-05'),
        homeShare: '0.60',
        costs: [
          creditCost('Roof', 2_000_000, 'qualified'),
          { ...creditCost('Second array', 1_000_000, 'qualified'), placedInServiceOn: day('2023-06-01') },
          { ...creditCost('Third array', 500_000, 'qualified'), placedInServiceOn: day('2026-06-01') },
        ],
        carriedIn: { taxYear: 2022, amountCents: cents(220_000) },
        years: [],
      }),
    );
    const rows = rowsOf(two.drawn, 2);
    expect(rows).toContainEqual(['Second array', 'Completed 1 Jun 2023', '$10,000.00']);
    expect(rows).toContainEqual(['Share for the home', 'under 80 %: only this share counts', '60 %']);
    expect(rows).toContainEqual(['Line 1 of 2021', 'inside what was carried in, P.L. 116-260 §148', '$12,000.00']);
    expect(rows).toContainEqual(['Line 1 of 2026', 'no credit in this year, P.L. 119-21 §70506', '$0.00']);
    expect(words(two.drawn, 1)).toContain('Line 16 of the 2022 return, before this record: $2,200.00.');
    const undated = draw(creditOf({ placedInServiceOn: null, years: [] }));
    expect(rowsOf(undated.drawn, 2)).toContainEqual([
      'Contract',
      'no day of completion stated: not counted',
      '$36,400.00',
    ]);
    expect(words(undated.drawn, 1)).toContain('No year of the form is in this record.');
    expect(words(undated.drawn, 2)).toContain('None yet.');
  });

  it('sets more than five years into tables of their own, and stays on whole pages', () => {
    const years = Array.from({ length: 7 }, (_, index) => creditYear(2024 + index, 100_000, {}));
    const { drawn } = draw(creditOf({ years }));
    const heads = [1, 2].flatMap((page) => rowsOf(drawn, page)).filter(([first]) => first === 'Line');
    expect(heads).toEqual([
      ['Line', '2024', '2025', '2026', '2027', '2028'],
      ['Line', '2029', '2030'],
    ]);
  });

  it('is one page that says so where no credit is entered', () => {
    const { drawn, pages } = draw(null);
    expect(pages).toBe(1);
    expect(words(drawn, 1)).toContain('No tax credit is entered.');
  });
});
