import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { flowOn, STYLES } from '#server/pdf/flow.ts';
import { pdfPen } from '#server/pdf/pdf-pen.ts';
import { type Drawn, PAGE, recorded } from '#server/pdf/pen.ts';
import { table } from '#server/pdf/table.ts';
import { wrapText } from '#server/pdf/wrap.ts';
import { pdfTexts } from '#tests/support/pdf-text.ts';

const INFO = { title: 'A paper', madeOn: '2026-12-01' };
const textsOf = (drawn: readonly Drawn[]) => drawn.filter((one) => one.kind === 'text');

describe('wrapping', () => {
  it('never makes a line wider than it may be, and loses and adds no word', () => {
    fc.assert(
      fc.property(
        fc.array(fc.stringMatching(/^[a-z]{1,14}$/), { maxLength: 30 }),
        fc.integer({ min: 3, max: 20 }),
        (words, width) => {
          const lines = wrapText(words.join(' '), width, (text) => text.length);
          expect(lines.every((line) => line.length <= width)).toBe(true);
          expect(lines.join('').replaceAll(' ', '')).toBe(words.join(''));
        },
      ),
    );
  });

  it('keeps an empty text as one empty line, and a letter wider than the line on a line of its own', () => {
    expect(wrapText('', 10, (text) => text.length)).toEqual(['']);
    expect(wrapText('ab', 1, (text) => text.length * 2)).toEqual(['a', 'b']);
  });
});

describe('the flow of a paper', () => {
  it('goes on to a new page where a paragraph no longer fits, and frames every page with its number', () => {
    const { pen, drawn } = recorded(pdfPen(INFO).pen);
    const flow = flowOn(pen);
    for (let line = 0; line < 70; line += 1) flow.paragraph(`Line ${line}`);
    flow.finish({ head: 'Head', headRight: 'right', foot: 'Foot' });
    expect(pen.pages()).toBe(2);
    const texts = textsOf(drawn);
    expect(texts.filter(({ text }) => text.startsWith('page ')).map(({ page, text }) => [page, text])).toEqual([
      [1, 'page 1 of 2'],
      [2, 'page 2 of 2'],
    ]);
    expect(texts.filter(({ text }) => text === 'Head').map(({ page }) => page)).toEqual([1, 2]);
    const body = texts.filter(({ text }) => text.startsWith('Line '));
    expect(body).toHaveLength(70);
    expect(body.every(({ y }) => y > 60 && y < PAGE.height - 50)).toBe(true);
  });

  it('repeats a table’s head on a new page, ends right columns at their edge and stays inside the margins', () => {
    const { pen, drawn } = recorded(pdfPen(INFO).pen);
    const flow = flowOn(pen);
    const rows = Array.from({ length: 60 }, (_, index) => ({
      cells: [
        `Row ${index} with a label that needs more than a single line of its narrow column`,
        `${index * 1111}.00`,
      ],
    }));
    table(
      flow,
      [
        { share: 1, align: 'left' },
        { share: 2, align: 'right' },
      ],
      ['What', 'Amount'],
      rows,
    );
    const texts = textsOf(drawn);
    expect(texts.filter(({ text }) => text === 'Amount').length).toBe(pen.pages());
    expect(pen.pages()).toBeGreaterThan(1);
    for (const one of texts) {
      expect(one.x).toBeGreaterThanOrEqual(flow.left - 0.01);
      expect(one.x + pen.width(one.text, one.style)).toBeLessThanOrEqual(flow.left + flow.width + 0.01);
    }
    const amounts = texts.filter(({ text }) => /^\d+\.00$/.test(text));
    expect(amounts).toHaveLength(60);
    for (const { x, text, style } of amounts) {
      expect(x + pen.width(text, style)).toBeCloseTo(flow.left + flow.width, 3);
    }
  });

  it('draws two rules under a total', () => {
    const { pen, drawn } = recorded(pdfPen(INFO).pen);
    table(flowOn(pen), [{ share: 1, align: 'left' }], null, [{ cells: ['Sum'], kind: 'total' }]);
    const rules = drawn.filter((one) => one.kind === 'rule' && one.weight === 0.8);
    expect(rules).toHaveLength(2);
    expect(textsOf(drawn)[0]?.style.face).toBe('total');
  });
});

describe('the file', () => {
  it('sets figures of one width, so that columns stand under each other', () => {
    const { pen } = pdfPen(INFO);
    const widths = [...'0123456789'].map((figure) => pen.width(figure, STYLES.body));
    expect(new Set(widths.map((width) => width.toFixed(4))).size).toBe(1);
  });

  it('has the minus people read, and letters of names beyond Latin-1; what no font has is marked, not dropped', () => {
    const { pen } = pdfPen(INFO);
    const width = (text: string) => pen.width(text, STYLES.body);
    for (const letter of ['\u2212', '\u2013', '’', 'Ł', 'Ğ', 'ő', 'Ω', 'Ж']) {
      expect(width(letter), letter).not.toBe(width('?'));
    }
    expect(width('\u4e2d')).toBe(width('?'));
  });

  it('holds every text that was drawn, as letters that can be copied, on its page', async () => {
    const file = pdfPen(INFO);
    const { pen, drawn } = recorded(file.pen);
    const flow = flowOn(pen);
    flow.paragraph('Priya Łukaszewicz: −$12.40 of “office” tax, 30 %');
    flow.newPage();
    table(flow, [{ share: 1, align: 'right' }], ['Amount'], [{ cells: ['−$1,204.50'], kind: 'total' }]);
    flow.finish({ head: 'Head', headRight: 'right', foot: 'Foot' });
    const pages = pdfTexts(await file.end());
    for (const page of [1, 2]) {
      const said = textsOf(drawn).filter((one) => one.page === page);
      expect(pages[page - 1]?.join('')).toBe(said.map(({ text }) => text).join(''));
    }
  });

  it('is the same for the same content and day', async () => {
    const make = (madeOn: string) => {
      const { pen, end } = pdfPen({ ...INFO, madeOn });
      flowOn(pen).paragraph('Priya Łukaszewicz, −$12.40');
      return end();
    };
    const [one, again, later] = await Promise.all([make('2026-12-01'), make('2026-12-01'), make('2026-12-02')]);
    expect(one.equals(again)).toBe(true);
    expect(one.equals(later)).toBe(false);
    expect(one.subarray(0, 5).toString()).toBe('%PDF-');
  });
});
