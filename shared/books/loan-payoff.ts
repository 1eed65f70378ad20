import type { LoanFacts } from '../facts/finance.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import { cents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { WorkingInput } from '../working.ts';
import { plainInput, stated, usdInput, usdListInput } from './inputs.ts';
import { dayRule } from './loan-accrual.ts';
import { loanBook } from './loan-book.ts';
import { type LoanState, loanStateOn, type PaymentsOfTheDay } from './loan-state.ts';
import type { LoanStep } from './loan-step.ts';
import { LOAN_TERMS } from './loan-workings.ts';

const SCHEDULE = stated('Loan schedule');

/**
 * What it takes to pay the loan off on a day: principal, interest due and not paid, the interest accrued since it was last counted (rounded to the cent), and
 * the contract's fee. A lender's own quote for the day is the one to pay by.
 */
export function loanPayoff(loan: LoanFacts, on: Day, payments: PaymentsOfTheDay = 'through'): Figure {
  const state = loanStateOn(loan, on, payments);
  if (on < loan.fundedOn) {
    return {
      amountCents: state.payoffCents,
      working: {
        words: 'The loan was not yet funded',
        formula: 'principal',
        inputs: [usdInput('principal', 'Principal', state.balanceCents, LOAN_TERMS)],
        unit: 'USD',
        basis: 'computed',
      },
    };
  }
  const steps = loanBook(loan)
    .steps.slice(0, state.paid)
    .filter((step) => step.segment === state.segment);
  const { inputs, owed } = principalOwed(state, steps);
  const year = dayRule(state.segment.dayCount).yearDays;
  inputs.push(
    usdInput('unpaid', 'Interest due and not paid', state.unpaidInterestCents, SCHEDULE),
    plainInput('rate', 'Rate a year', state.annualRate, 'fraction', LOAN_TERMS),
    plainInput('days', daysLabel(state), String(state.days), 'days', stated(`${state.segment.dayCount} days`)),
  );
  const interest = `unpaid + roundCents((${owed}) * rate * days / ${year})`;
  const hasFee = state.feeCents !== 0;
  if (hasFee) inputs.push(usdInput('fee', 'Fee for the payoff', state.feeCents, LOAN_TERMS));
  const interestCents = cents(state.unpaidInterestCents + state.accruedCents);
  const fee = hasFee ? `, a fee of ${sayMoney(state.feeCents)}` : '';
  return {
    amountCents: state.payoffCents,
    working: {
      words: `${sayMoney(state.balanceCents)} of principal and ${sayMoney(interestCents)} of interest for ${state.days} days to ${sayDate(on)}${fee}`,
      formula: `${owed} + ${interest}${hasFee ? ' + fee' : ''}`,
      inputs,
      unit: 'USD',
      basis: 'computed',
    },
  };
}

/** Principal less what was paid of it, with interest that joined it and what the lender's balances changed, where there is any. */
function principalOwed(state: LoanState, steps: readonly LoanStep[]): { inputs: WorkingInput[]; owed: string } {
  const payments = steps.filter((step) => step.kind === 'payment');
  const inputs = [
    usdInput('principal', 'Principal', state.segment.principalCents, LOAN_TERMS),
    usdListInput(
      'paid',
      `Principal paid in ${payments.length} payments`,
      payments.map((step) => step.principalCents),
      SCHEDULE,
    ),
  ];
  const parts = ['principal - sum(paid)'];
  const joined = steps.filter((step) => step.capitalisedCents !== 0).map((step) => step.capitalisedCents);
  if (joined.length > 0) {
    inputs.push(usdListInput('joined', 'Interest that joined the principal', joined, SCHEDULE));
    parts.push('sum(joined)');
  }
  const drift = steps.filter((step) => step.driftCents !== 0).map((step) => step.driftCents);
  if (drift.length > 0) {
    const label = 'Lender’s balances less this schedule’s';
    inputs.push(usdListInput('drift', label, drift, stated('The lender’s balances as entered')));
    parts.push('sum(drift)');
  }
  return { inputs, owed: parts.join(' + ') };
}

function daysLabel({ segment }: LoanState): string {
  return segment.dayCount === '30/360' ? 'Days since, 30 a month' : 'Days since the last payment';
}
