import type { BookId } from '#shared/books/book.ts';

/** Each book's name and colour token; the same in tables, charts and keys. */
export const BOOK_NAMES: Record<BookId, string> = {
  billAvoided: 'Electricity bill avoided',
  incentive: 'Production incentive',
  insurance: 'Mortgage insurance avoided',
  credit: 'Tax credit received',
  loan: 'Loan payments',
  upkeep: 'Upkeep',
  costs: 'Cash and other costs',
};

export const BOOK_TOKENS: Record<BookId, string> = {
  billAvoided: '--color-roof',
  incentive: '--color-incentive',
  insurance: '--color-insurance',
  credit: '--color-credit',
  loan: '--color-loan',
  upkeep: '--color-cash',
  costs: '--color-cash',
};

const KEY_CLASS: Record<BookId, string> = {
  billAvoided: 'bg-roof',
  incentive: 'bg-incentive',
  insurance: 'bg-insurance',
  credit: 'bg-credit',
  loan: 'bg-loan',
  upkeep: 'bg-cash',
  costs: 'bg-cash',
};

export function BookKey({ book }: { book: BookId }) {
  return (
    <i
      aria-hidden="true"
      className={`mr-[9px] inline-block size-[11px] rounded-[2px] align-[-1px] ${KEY_CLASS[book]}`}
    />
  );
}
