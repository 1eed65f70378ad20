import type { CycleKey, Entry } from '../books/book.ts';
import type { PaymentsOfTheDay } from '../books/loan.ts';
import { creditEarnedBy } from '../books/tax-credit.ts';
import type { CreditFacts, LoanFacts } from '../facts/finance.ts';
import { cents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import { asByBook, type BookSums, counts, noSums, totalOf } from './books-sum.ts';
import { owedOn } from './loans.ts';
import type { Figure, PositionPoint } from './position.ts';

/** A closed cycle as the position sees it; `utilityBank` is what the utility holds for the house after it. */
export type PositionCycle = { from: Day; to: Day; provisional: boolean; utilityBank: Figure };

export type FoldInput = {
  /** Placed entries of every book through today. */
  entries: readonly Entry[];
  /** In order of their dates. */
  cycles: readonly PositionCycle[];
  today: Day;
  /** Every loan that paid for the roof. */
  loans: readonly LoanFacts[];
  credit: CreditFacts | null;
};

/**
 * The position before the first cycle, at the close of each, and since the last up to today. A point at `to` stands at the start of that day: what is
 * dated on it belongs to the next cycle, for cash and for the loan alike. `loanPayoffCents` is negative, so that settled today is the sum of
 * cash so far and the four parts. Without a cycle there is one point, `before`, up to today.
 */
export function foldPosition(input: FoldInput): PositionPoint[] {
  const { cycles, today } = input;
  const byCycle = entriesByCycle(input.entries);
  const running = { cash: 0, earned: 0, received: 0, credit: 0 };
  const points: PositionPoint[] = [];

  function close(cycle: CycleKey, on: Day, payments: PaymentsOfTheDay, bank: number, provisional: boolean): void {
    const books = noSums();
    for (const entry of byCycle.get(cycle) ?? []) addEntry(entry, books, running);
    const added = totalOf(books);
    running.cash += added;
    const loanPayoff = -owedOn(input.loans, on, payments).payoffCents;
    const credit = input.credit ? creditEarnedBy(input.credit, on) - running.credit : 0;
    const owed = running.earned - running.received;
    points.push({
      cycle,
      on,
      books: asByBook(books),
      addedCents: cents(added),
      cashSoFarCents: cents(running.cash),
      loanPayoffCents: cents(loanPayoff),
      creditStillToComeCents: cents(credit),
      incentiveOwedCents: cents(owed),
      utilityBankCents: cents(bank),
      settledTodayCents: cents(running.cash + loanPayoff + credit + owed + bank),
      provisional,
    });
  }

  const first = cycles[0];
  const last = cycles.at(-1);
  if (first === undefined || last === undefined) {
    close('before', today, 'through', 0, false);
    return points;
  }
  close('before', first.from, 'before', 0, false);
  for (const { to, utilityBank, provisional } of cycles) {
    close(to, to, 'before', utilityBank.amountCents, provisional);
  }
  const isLater = today > last.to;
  close('since', isLater ? today : last.to, 'through', last.utilityBank.amountCents, last.provisional);
  return points;
}

function addEntry(entry: Entry, books: BookSums, running: { earned: number; received: number; credit: number }): void {
  if (entry.book === 'incentive' && entry.kind === 'earned') running.earned += entry.amountCents;
  if (!counts(entry)) return;
  books[entry.book] += entry.amountCents;
  if (entry.book === 'incentive') running.received += entry.amountCents;
  if (entry.book === 'credit') running.credit += entry.amountCents;
}

function entriesByCycle(entries: readonly Entry[]): Map<CycleKey, Entry[]> {
  const groups = new Map<CycleKey, Entry[]>();
  for (const entry of entries) {
    const group = groups.get(entry.cycle);
    if (group) group.push(entry);
    else groups.set(entry.cycle, [entry]);
  }
  return groups;
}
