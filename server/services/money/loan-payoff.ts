import type { PayoffView } from '#shared/api/money-loan.ts';
import { loanPayoff, loanStateOn } from '#shared/books/loan.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { cents } from '#shared/units/cents.ts';
import type { Day } from '#shared/units/day.ts';
import type { Deps } from '../../deps.ts';
import { fieldFault } from '../field-fault.ts';
import { ledgerOf } from '../ledger-of.ts';

/** What it takes to pay the loan off at the close of a day, past or to come, payments taken as made to schedule. */
export function viewPayoff(deps: Pick<Deps, 'db' | 'clock'>, householdId: string, on: Day | null): Result<PayoffView> {
  const { loan } = ledgerOf(deps, householdId).facts;
  if (loan === null) return fail('not-found', 'No loan is entered.');
  if (on === null) return fail('invalid-fields', null, [fieldFault('on', 'Write a date that exists.')]);
  if (on < loan.fundedOn) {
    return fail('invalid-fields', null, [fieldFault('on', 'The loan was not funded yet on this day.')]);
  }
  const state = loanStateOn(loan, on);
  return succeed({
    on,
    payoff: loanPayoff(loan, on),
    balanceCents: state.balanceCents,
    interestCents: cents(state.unpaidInterestCents + state.accruedCents),
    days: state.days,
    feeCents: state.feeCents,
  });
}
