import { fail, type Result, succeed } from '#shared/problem.ts';
import type { Deps } from '../../deps.ts';
import { type Cell, csvText } from '../csv-text.ts';
import { ledgerOf } from '../ledger-of.ts';
import { mortgageSchedule } from './mortgage-view.ts';

const HEAD: Cell[] = [
  'Payment',
  'Due',
  'Amount',
  'Interest',
  'Principal',
  'Extra principal',
  'Balance',
  'Balance by the initial schedule',
  'Stated by the lender',
  'Drift from the computed balance',
];

/** The mortgage's schedule as a table. */
export function mortgageScheduleCsv(
  deps: Pick<Deps, 'db' | 'clock'>,
  householdId: string,
): Result<{ fileName: string; contentType: string; body: string }> {
  const { facts, today } = ledgerOf(deps, householdId);
  if (facts.mortgage === null) return fail('not-found', 'No mortgage is entered.');
  const rows = mortgageSchedule(facts.mortgage, today).map((row): Cell[] => [
    row.number,
    row.on,
    { cents: row.paymentCents },
    { cents: row.interestCents },
    { cents: row.principalCents },
    { cents: row.extraPrincipalCents },
    { cents: row.balanceCents },
    { cents: row.initialCents },
    row.stated ? 'yes' : '',
    row.stated ? { cents: row.driftCents } : null,
  ]);
  return succeed({
    fileName: `mortgage-schedule-${today}.csv`,
    contentType: 'text/csv; charset=utf-8',
    body: csvText([HEAD, ...rows]),
  });
}
