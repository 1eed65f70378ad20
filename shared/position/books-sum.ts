import { BOOKS, type BookId, type Entry } from '../books/book.ts';
import { cents } from '../units/cents.ts';
import type { ByBook } from './position.ts';

/** Running sums of the books in plain numbers; `asByBook` brands them. */
export type BookSums = Record<BookId, number>;

export function noSums(): BookSums {
  return { billAvoided: 0, incentive: 0, insurance: 0, credit: 0, loan: 0, upkeep: 0, costs: 0 };
}

/** Only cash and avoided money adds up; a memo is shown and never summed. */
export function counts(entry: { basis: Entry['basis'] }): boolean {
  return entry.basis !== 'memo';
}

export function asByBook(sums: BookSums): ByBook {
  return {
    billAvoided: cents(sums.billAvoided),
    incentive: cents(sums.incentive),
    insurance: cents(sums.insurance),
    credit: cents(sums.credit),
    loan: cents(sums.loan),
    upkeep: cents(sums.upkeep),
    costs: cents(sums.costs),
  };
}

export function totalOf(sums: BookSums): number {
  let total = 0;
  for (const book of BOOKS) total += sums[book];
  return total;
}
