import type { LoanScheduleRow, LoanView } from '#shared/api/money-loan.ts';
import { stated, usdInput } from '#shared/books/inputs.ts';
import { loanClearedOn, loanPayoff } from '#shared/books/loan.ts';
import { loanApr } from '#shared/books/loan-apr.ts';
import { type LoanBook, loanBook, payoffOf } from '#shared/books/loan-book.ts';
import { loanInterest, prepaymentOutcomes } from '#shared/books/loan-outcomes.ts';
import { workedRows } from '#shared/books/loan-rows.ts';
import type { LoanStep } from '#shared/books/loan-step.ts';
import { levelWorking, restWorking } from '#shared/books/loan-workings.ts';
import { isOfSolarLoan } from '#shared/books/other-money.ts';
import type { LoanFacts } from '#shared/facts/finance.ts';
import { sayDate } from '#shared/ledger/say.ts';
import type { Figure } from '#shared/position/position.ts';
import { sumOfEntries } from '#shared/position/sums.ts';
import { cents, sumCents, ZERO_CENTS } from '#shared/units/cents.ts';
import { addMonths, type Day } from '#shared/units/day.ts';
import type { Deps } from '../../deps.ts';
import { ledgerOf } from '../ledger-of.ts';

/** The solar loan as it stands today: its figures, its contract's outcomes, the lender's own balances, the schedule. */
export function viewLoan(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): { loan: LoanView | null } {
  const { facts, ledger, today } = ledgerOf(deps, householdId);
  const { loan } = facts;
  if (loan === null) return { loan: null };
  const book = loanBook(loan);
  const schedule = scheduleOf(book, today);
  const assumed = loan.assumedPrepayment;
  return {
    loan: {
      facts: loan,
      next: nextPayment(book, today),
      payoff: loanPayoff(loan, today),
      payoffOn: today,
      paid: sumOfEntries('Paid for the loan', ledger.entries.filter(isOfSolarLoan)),
      interestPaidCents: sumCents(schedule.filter(({ past }) => past).map(({ interestCents }) => interestCents)),
      clearedOn: loanClearedOn(loan),
      interest: loanInterest(book.steps),
      apr: loanApr(loan, ZERO_CENTS),
      aprWithFee: loan.dealerFeeCents > 0 ? loanApr(loan, loan.dealerFeeCents) : null,
      outcomes: prepaymentOutcomes(loan),
      prepaymentOn: assumed === null ? null : addMonths(loan.firstPaymentOn, assumed.byPayment - 1),
      balances: lenderBalances(loan, book),
      refinances: refinancesOf(book),
      levels: book.levels.map((level) => ({
        segment: level.segment.index,
        fromNumber: level.fromNumber,
        reason: level.reason,
        amountCents: level.paymentCents,
        working: levelWorking(level),
      })),
      schedule,
    },
  };
}

/** The schedule's rows as the screen and the table take them. */
export function scheduleOf(book: LoanBook, today: Day): LoanScheduleRow[] {
  return workedRows(book).map(({ row, level, working }) => ({
    segment: row.segment,
    number: row.number,
    on: row.on,
    payment: { amountCents: row.paymentCents, working, level },
    interestCents: row.interestCents,
    principalCents: row.principalCents,
    extraPrincipalCents: row.extraPrincipalCents,
    capitalisedCents: row.capitalisedCents,
    driftCents: row.driftCents,
    balanceCents: row.balanceCents,
    unpaidInterestCents: row.unpaidInterestCents,
    recorded: row.recorded,
    refinanced: row.refinanced,
    past: row.on <= today,
  }));
}

/** The next payment to schedule after a day; null once none is left. */
export function nextPayment({ steps }: LoanBook, today: Day): LoanView['next'] {
  const step = steps.find(({ kind, record, on }) => kind === 'payment' && record === null && on > today);
  if (step === undefined) return null;
  const working = step.level === null ? restWorking(step) : levelWorking(step.level);
  return { on: step.on, payment: { amountCents: step.regularCents, working } };
}

/** Each of the lender's balances with what ours was just before it took ours' place. */
function lenderBalances(loan: LoanFacts, { steps }: LoanBook): LoanView['balances'] {
  const inOrder = [...loan.balances].sort((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : 0));
  const taken = steps.filter(({ kind }) => kind === 'lender');
  return inOrder.flatMap(({ id, on, balanceCents }, at) => {
    const step = taken[at];
    return step === undefined ? [] : [{ id, on, balanceCents, ours: oursBefore(step) }];
  });
}

function oursBefore(step: LoanStep): Figure {
  return {
    amountCents: step.balanceBeforeCents,
    working: {
      words: `Principal by this schedule at the close of ${sayDate(step.on)}: the lender’s balance less what it changed`,
      formula: 'lender - drift',
      inputs: [
        usdInput('lender', 'By the lender', step.balanceCents, stated('The lender’s balance as entered')),
        usdInput('drift', 'Lender less ours', step.driftCents, stated('Loan schedule')),
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}

function refinancesOf({ steps }: LoanBook): LoanView['refinances'] {
  return steps.flatMap((step, at) => {
    const opened = steps[at + 1];
    if (step.kind !== 'paidOff' || step.refinance === null || opened === undefined) return [];
    const { id, principalCents, costsCents } = step.refinance;
    const source = stated('Refinance as entered');
    const payoff: Figure = {
      amountCents: payoffOf(step),
      working: {
        words: `Principal, interest to ${sayDate(step.on)} and the contract’s fee`,
        formula: 'principal + interest + fee',
        inputs: [
          usdInput('principal', 'Principal', step.principalCents, stated('Loan schedule')),
          usdInput('interest', 'Interest due and accrued', step.interestCents, stated('Loan schedule')),
          usdInput('fee', 'Fee for the payoff', step.feeCents, stated('Loan terms as entered')),
        ],
        unit: 'USD',
        basis: 'computed',
      },
    };
    const cash: Figure = {
      amountCents: cents(principalCents - payoffOf(step) - costsCents),
      working: {
        words: 'The new loan less the payoff of the old one and the costs paid in cash',
        formula: 'principal - payoff - costs',
        inputs: [
          usdInput('principal', 'The new loan', principalCents, source),
          usdInput('payoff', 'Payoff of the old loan', payoffOf(step), stated('Loan schedule')),
          usdInput('costs', 'Costs', costsCents, source),
        ],
        unit: 'USD',
        basis: 'computed',
      },
    };
    return [{ id, payoff, cash }];
  });
}
