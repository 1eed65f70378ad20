import { BOOKS, type BookId, type Entry } from '../books/book.ts';
import type { ByBook, Position } from '../position/position.ts';
import type { Cents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { Cycle } from './cycle.ts';
import type { Ledger } from './ledger.ts';

export const REPORT_FORMAT = 'gablebook-ledger';
export const REPORT_VERSION = 1;

/**
 * What `npm run ledger` prints. Money is in whole US cents (`…Cents`), energy in whole watt-hours (`wh`, `…Wh`), days are `YYYY-MM-DD`; quantities
 * and rates are exact decimal text. A missing figure is null, never 0.
 *
 * - `cycles`: each with its dates, `days`, `state` (open, balanced, differs, accepted), `provisional`, `split`, `energy`
 *   (import, export, production, selfUse, use), `lines` (the bill as it should have been: component, kind, label, quantity, unit,
 *   rate, amountCents, inDue, working; null where it cannot be settled, `whyNotSettled` says why), `facing` (billed beside ours), `banks` (open,
 *   earned, used, expired, paid, close), `meters` (each meter of a channel that has several), `sentOut` (credit sent to other service points, by
 *   which a bank closes lower), `payouts`, `billedDueCents`, `oursDueCents`, `withoutRoofCents` with its `method`, `asItWasCents`,
 *   `checks`, `addedCents` and `entryIds` (the entries that fall in it).
 * - `books`: every book's entries (id, date, cycle, kind, label, amountCents, basis, estimated, working). `cycle` is the cycle's `to`, or `before` the
 *   first, or `since` the last. Entries of basis `memo` are never summed.
 * - `position`: `byCycle` (books by cycle, added, cash so far, loan payoff, credit still to come, incentive owed, utility bank, settled today), and the
 *   totals with their workings; `projection` as the product shows it.
 *
 * The sum of all entries (cash and avoided) = Σ `byCycle[].addedCents` = Σ over books = `position.cashSoFar.amountCents`.
 */
export type LedgerReport = {
  format: typeof REPORT_FORMAT;
  version: typeof REPORT_VERSION;
  today: Day;
  cycles: ReportedCycle[];
  books: Record<BookId, Omit<Entry, 'book'>[]>;
  creditLines: Ledger['creditLines'];
  position: Omit<Position, 'points'> & { byCycle: Position['points']; byBook: ByBook };
  needs: Ledger['needs'];
};

type ReportedCycle = Pick<
  Cycle,
  | 'from'
  | 'to'
  | 'days'
  | 'state'
  | 'provisional'
  | 'split'
  | 'planFrom'
  | 'energy'
  | 'meters'
  | 'sentOut'
  | 'whyNotSettled'
  | 'facing'
  | 'billedDueCents'
  | 'oursDueCents'
  | 'asItWas'
  | 'checks'
  | 'addedCents'
  | 'loanPayments'
> & {
  lines: NonNullable<Cycle['settlement']>['lines'] | null;
  banks: NonNullable<Cycle['settlement']>['banks'] | null;
  payouts: NonNullable<Cycle['settlement']>['payouts'] | null;
  withoutRoof: {
    amountCents: Cents;
    method: string;
    useWh: number;
    working: NonNullable<Cycle['withoutRoof']>['working'];
  } | null;
  statement: { id: string; revision: number };
  entryIds: string[];
};

/** The ledger as it is printed. */
export function ledgerReport(ledger: Ledger): LedgerReport {
  const { points, ...position } = ledger.position;
  const books = Object.fromEntries(BOOKS.map((book) => [book, [] as Omit<Entry, 'book'>[]])) as LedgerReport['books'];
  for (const { book, ...entry } of ledger.entries) books[book].push(entry);
  return {
    format: REPORT_FORMAT,
    version: REPORT_VERSION,
    today: ledger.today,
    cycles: ledger.cycles.map(reportCycle),
    books,
    creditLines: ledger.creditLines,
    position: { byCycle: points, byBook: sumBooks(ledger), ...position },
    needs: ledger.needs,
  };
}

function reportCycle(cycle: Cycle): ReportedCycle {
  return {
    from: cycle.from,
    to: cycle.to,
    days: cycle.days,
    state: cycle.state,
    provisional: cycle.provisional,
    split: cycle.split,
    planFrom: cycle.planFrom,
    statement: { id: cycle.statement.id, revision: cycle.statement.revision },
    energy: cycle.energy,
    meters: cycle.meters,
    sentOut: cycle.sentOut,
    lines: cycle.settlement?.lines ?? null,
    whyNotSettled: cycle.whyNotSettled,
    facing: cycle.facing,
    banks: cycle.settlement?.banks ?? null,
    payouts: cycle.settlement?.payouts ?? null,
    billedDueCents: cycle.billedDueCents,
    oursDueCents: cycle.oursDueCents,
    withoutRoof:
      cycle.withoutRoof === null
        ? null
        : {
            amountCents: cycle.withoutRoof.amountCents,
            method: cycle.withoutRoof.method,
            useWh: cycle.withoutRoof.useWh,
            working: cycle.withoutRoof.working,
          },
    asItWas: cycle.asItWas,
    checks: cycle.checks,
    addedCents: cycle.addedCents,
    loanPayments: cycle.loanPayments,
    entryIds: cycle.entries.map((entry) => entry.id),
  };
}

function sumBooks(ledger: Ledger): ByBook {
  const sums = Object.fromEntries(BOOKS.map((book) => [book, 0])) as Record<BookId, number>;
  for (const point of ledger.position.points) for (const book of BOOKS) sums[book] += point.books[book];
  return sums as ByBook;
}
