import { BOOKS, type BookId, type Entry } from '../books/book.ts';
import { stated, usdInput, usdListInput } from '../books/inputs.ts';
import { sayCount, sayMoney } from '../ledger/say.ts';
import { type Cents, cents, sumCents } from '../units/cents.ts';
import type { FigureBasis } from '../working.ts';
import { counts } from './books-sum.ts';
import type { Figure, Position } from './position.ts';

/** What a book is called where its sum is explained. */
export const BOOK_LABELS: Record<BookId, string> = {
  billAvoided: 'Electricity bill avoided',
  incentive: 'Production incentive',
  insurance: 'Mortgage insurance avoided',
  credit: 'Tax credit received',
  loan: 'Loan payments',
  upkeep: 'Upkeep',
  costs: 'Costs and other income',
};

/** The sum of each book, and of the books. */
type Sums = Record<BookId | 'cashSoFar', Figure>;
export type SumsByBook = Record<keyof Position['sums'], Sums>;

/** Sums by book over the last cycle, the last twelve and all, each listing its entries; under `cashSoFar` the sum of the books. */
export function sumsByBook(entries: readonly Entry[], cycleTos: readonly string[]): SumsByBook {
  const lastTo = cycleTos.at(-1);
  const last12 = new Set<string>(cycleTos.slice(-12));
  const counted = entries.filter(counts);
  return {
    lastCycle: sumsOf(counted.filter((entry) => entry.cycle === lastTo)),
    last12: sumsOf(counted.filter((entry) => last12.has(entry.cycle))),
    all: sumsOf(counted),
  };
}

function sumsOf(entries: readonly Entry[]): Sums {
  const sumOf = (book: BookId) =>
    sumOfEntries(
      BOOK_LABELS[book],
      entries.filter((entry) => entry.book === book),
    );
  const books: Record<BookId, Figure> = {
    billAvoided: sumOf('billAvoided'),
    incentive: sumOf('incentive'),
    insurance: sumOf('insurance'),
    credit: sumOf('credit'),
    loan: sumOf('loan'),
    upkeep: sumOf('upkeep'),
    costs: sumOf('costs'),
  };
  const named = BOOKS.map((book) => ({ name: book, label: BOOK_LABELS[book], figure: books[book] }));
  return { ...books, cashSoFar: addFigures('The books added', named) };
}

/** The sum of a book's entries, listed. */
export function sumOfEntries(label: string, entries: readonly Entry[]): Figure {
  const amounts = entries.map((entry) => entry.amountCents);
  const first = entries[0];
  const span = first ? `, ${first.date} to ${entries.at(-1)?.date}` : '';
  return {
    amountCents: sumCents(amounts),
    working: {
      words: `${sayCount(entries.length, 'entry', 'entries')} added`,
      formula: 'sum(entries)',
      inputs: [
        usdListInput(
          'entries',
          `${label}: ${sayCount(entries.length, 'entry', 'entries')}${span}`,
          amounts,
          stated(label),
        ),
      ],
      unit: 'USD',
      basis: basisOf(entries),
    },
  };
}

function basisOf(entries: readonly Entry[]): FigureBasis {
  return entries.some((entry) => entry.estimated) ? 'estimated' : 'computed';
}

export type NamedFigure = { name: string; label: string; figure: Figure };

/** A figure that is the sum of others, by their names. Estimated when one of them is. */
export function addFigures(words: string, parts: readonly NamedFigure[]): Figure {
  return {
    amountCents: sumCents(parts.map((part) => part.figure.amountCents)),
    working: {
      words,
      formula: parts.map((part) => part.name).join(' + '),
      inputs: parts.map((part) => usdInput(part.name, part.label, part.figure.amountCents, stated(part.label))),
      unit: 'USD',
      basis: parts.some((part) => part.figure.working.basis === 'estimated') ? 'estimated' : 'computed',
    },
  };
}

/** The mean of some amounts, rounded to the cent. */
export function meanFigure(label: string, amounts: readonly Cents[]): Figure {
  const total = sumCents(amounts);
  const count = Math.max(1, amounts.length);
  return {
    amountCents: roundedMean(total, count),
    working: {
      words: `${sayMoney(total)} over ${sayCount(count, 'cycle', 'cycles')}`,
      formula: 'roundCents(sum(amounts) / count)',
      inputs: [
        usdListInput('amounts', label, amounts, stated(label)),
        { name: 'count', label: 'Cycles', value: String(count), unit: 'cycles', source: stated('Cycles') },
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}

/** Half away from zero, by whole numbers. */
export function roundedMean(total: Cents, count: number): Cents {
  const size = Math.abs(total);
  const rounded = Math.floor((2 * size + count) / (2 * count));
  return cents(total < 0 ? -rounded : rounded);
}
