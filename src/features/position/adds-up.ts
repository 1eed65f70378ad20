import { BOOKS, type BookId } from '#shared/books/book.ts';
import type { Figure, Position } from '#shared/position/position.ts';
import { addCents, type Cents, cents, dollarsText, sumCents } from '#shared/units/cents.ts';
import type { Working } from '#shared/working.ts';
import { monthYear } from '#src/lib/format.ts';
import { BOOK_NAMES } from '#src/ui/book-key.tsx';

/** A cell of "How it adds up": an amount, with its working where there is one; null where the column has no such line. */
export type Cell = { cents: Cents; working: Working | null } | null;
export type Column = {
  key: 'lastCycle' | 'last12' | 'all' | 'even';
  head: string;
  books: Record<BookId, Cell>;
  cash: Cell;
  loan: Cell;
  creditToCome: Cell;
  incentiveOwed: Cell;
  bank: Cell;
  settled: Cell;
  withoutCredit: Cell;
};

/** The columns of "How it adds up": this cycle, the last twelve, since switch-on, and the projection to the day it comes even. */
export function addsUp(position: Position): Column[] {
  const { sums, settledParts } = position;
  const columns: Column[] = [
    flowColumn('lastCycle', 'This cycle', sums.lastCycle),
    flowColumn('last12', 'Last 12 cycles', sums.last12),
    {
      ...flowColumn('all', 'Since switch-on', sums.all),
      cash: figureCell(position.cashSoFar),
      loan: figureCell(settledParts.loanPayoff),
      creditToCome: figureCell(settledParts.creditStillToCome),
      incentiveOwed: figureCell(settledParts.incentiveOwed),
      bank: figureCell(settledParts.utilityBank),
      settled: figureCell(position.settledToday),
      withoutCredit: figureCell(position.settledWithoutCredit),
    },
  ];
  const even = evenColumn(position);
  return even ? [...columns, even] : columns;
}

/** Books that have anything in any column; the rest would be rows of zeros. */
export function booksShown(columns: Column[]): BookId[] {
  return BOOKS.filter((book) => columns.some((column) => (column.books[book]?.cents ?? 0) !== 0));
}

const NOTHING = {
  loan: null,
  creditToCome: null,
  incentiveOwed: null,
  bank: null,
  settled: null,
  withoutCredit: null,
};

function flowColumn(key: Column['key'], head: string, sums: Record<string, Figure>): Column {
  const books = byBook((book) => {
    const figure = sums[book];
    return figure ? figureCell(figure) : { cents: cents(0), working: null };
  });
  return { ...NOTHING, key, head, books, cash: totalCell(books) };
}

/** What the record and the projection come to on the day the position comes even. */
function evenColumn(position: Position): Column | null {
  const { projection } = position;
  const even = projection?.evenOn;
  const month = projection?.months.find((one) => one.on === even);
  if (!projection || !even || !month) return null;
  const closed = position.points.filter((point) => point.cycle !== 'since');
  const ahead = projection.months.filter((one) => one.on <= even);
  const books = byBook((book) => {
    const past = sumCents(closed.map((point) => point.books[book]));
    const months = ahead.map((one) => one.books[book]).filter((amount) => amount !== 0);
    return projectedCell(
      'The closed cycles, and the months projected from them, added',
      'past + sum(months)',
      past + sumCents(months),
      [
        projected('past', 'Closed cycles', dollarsText(past)),
        projected('months', `Projected months to ${monthYear(even)}, those with a sum`, months.map(dollarsText)),
      ],
    );
  });
  const part = (label: string, amount: Cents) =>
    projectedCell(`${label} by then, in the projection`, 'part', amount, [
      projected('part', label, dollarsText(amount)),
    ]);
  const parts = [
    month.cashSoFarCents,
    month.loanPayoffCents,
    month.creditStillToComeCents,
    month.incentiveOwedCents,
    month.utilityBankCents,
  ];
  return {
    ...NOTHING,
    key: 'even',
    head: `By ${monthYear(even)}`,
    books,
    cash: projectedCell('Every book by then, added', 'sum(books)', month.cashSoFarCents, [
      projected(
        'books',
        'The books of this column',
        BOOKS.map((book) => dollarsText(books[book]?.cents ?? cents(0))),
      ),
    ]),
    loan: part('Loan payoff by its schedule', month.loanPayoffCents),
    creditToCome: part('Tax credit still to come', month.creditStillToComeCents),
    incentiveOwed: part('Incentive owed', month.incentiveOwedCents),
    bank: part('Utility bank', month.utilityBankCents),
    settled: projectedCell(
      'Cash so far by then, the loan paid off and everything owed collected',
      'sum(parts)',
      month.settledTodayCents,
      [projected('parts', 'Cash so far, loan payoff, tax credit, incentive, utility bank', parts.map(dollarsText))],
    ),
  };
}

function projected(name: string, label: string, value: string | string[]): Working['inputs'][number] {
  return { name, label, value, unit: 'USD', source: { kind: 'figure', name: 'the projection' } };
}

function projectedCell(words: string, formula: string, amount: number, inputs: Working['inputs']): Cell {
  return { cents: cents(amount), working: { words, formula, inputs, unit: 'USD', basis: 'estimated' } };
}

function byBook(of: (book: BookId) => Cell): Record<BookId, Cell> {
  return Object.fromEntries(BOOKS.map((book) => [book, of(book)])) as Record<BookId, Cell>;
}

function figureCell(figure: Figure): Cell {
  return { cents: figure.amountCents, working: figure.working };
}

/** The books of a column added, with a working that says so. */
function totalCell(books: Record<BookId, Cell>): Cell {
  let total = cents(0);
  const parts: string[] = [];
  for (const book of BOOKS) {
    const amount = books[book]?.cents ?? cents(0);
    if (amount === 0) continue;
    total = addCents(total, amount);
    parts.push(dollarsText(amount));
  }
  const names = BOOKS.filter((book) => (books[book]?.cents ?? 0) !== 0).map((book) => BOOK_NAMES[book]);
  return {
    cents: total,
    working: {
      words: 'The books above, added.',
      formula: 'sum(books)',
      inputs: [
        {
          name: 'books',
          label: names.length > 0 ? names.join(', ') : 'No book has an entry here',
          value: parts.length > 0 ? parts : ['0.00'],
          unit: 'USD',
          source: { kind: 'figure', name: 'the books of this column' },
        },
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}
