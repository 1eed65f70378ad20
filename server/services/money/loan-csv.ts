import type { LoanScheduleRow } from '#shared/api/money-loan.ts';
import { loanBook } from '#shared/books/loan-book.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import type { Deps } from '../../deps.ts';
import { type Cell, csvText } from '../csv-text.ts';
import { ledgerOf } from '../ledger-of.ts';
import { scheduleOf } from './loan-view.ts';

const HEAD: Cell[] = [
  'Loan',
  'Payment',
  'Date',
  'Amount',
  'Interest',
  'Principal',
  'Of it extra principal',
  'Interest that joined the principal',
  'Lender’s balance less ours',
  'Balance',
  'Interest due and not paid',
  'State',
];

/** The loan's schedule as a table, one row a month. */
export function loanScheduleCsv(
  deps: Pick<Deps, 'db' | 'clock'>,
  householdId: string,
): Result<{ fileName: string; contentType: string; body: string }> {
  const { facts, today } = ledgerOf(deps, householdId);
  if (facts.loan === null) return fail('not-found', 'No loan is entered.');
  const book = loanBook(facts.loan);
  const lenders = book.segments.map(({ lender }) => lender);
  const rows = scheduleOf(book, today).map((row): Cell[] => [
    lenders[row.segment] ?? '',
    row.number,
    row.on,
    { cents: row.payment.amountCents },
    { cents: row.interestCents },
    { cents: row.principalCents },
    { cents: row.extraPrincipalCents },
    { cents: row.capitalisedCents },
    { cents: row.driftCents },
    { cents: row.balanceCents },
    { cents: row.unpaidInterestCents },
    stateOf(row),
  ]);
  return succeed({
    fileName: `loan-schedule-${today}.csv`,
    contentType: 'text/csv; charset=utf-8',
    body: csvText([HEAD, ...rows]),
  });
}

function stateOf(row: LoanScheduleRow): string {
  if (row.refinanced) return 'paid off by a new loan';
  if (row.recorded) return 'as entered';
  return row.past ? 'taken as paid to schedule' : 'to come';
}
