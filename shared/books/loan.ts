import type { LoanFacts } from '../facts/finance.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import { type Cents, cents, negateCents } from '../units/cents.ts';
import { addMonths, type Day } from '../units/day.ts';
import type { Working } from '../working.ts';
import type { UnplacedEntry } from './book.ts';
import { plainInput, stated, usdInput, usdListInput } from './inputs.ts';
import { days360, interestRule } from './interest.ts';
import { type LoanRow, type LoanStep, loanBook } from './loan-book.ts';

export { levelPayment } from './interest.ts';
export type { LoanRow } from './loan-book.ts';

const TERMS = stated('Loan terms as entered');

/** The loan's months, recorded payments in place of scheduled ones; see `loanBook`. */
export function loanSchedule(loan: LoanFacts): LoanRow[] {
  return loanBook(loan).rows;
}

/** Whether payments dated on the day itself count as made: `through` at its close, `before` at its start. */
export type PaymentsOfTheDay = 'through' | 'before';

export type LoanState = {
  /** Principal owed. */
  balanceCents: Cents;
  /** Interest due and not paid. */
  unpaidInterestCents: Cents;
  /** Days of 30/360 since the month the last payment paid for, and the interest of them. */
  days: number;
  accruedCents: Cents;
  payoffCents: Cents;
  /** How many of the loan's payments have been made. */
  paid: number;
};

/** What is owed on a day. Nothing is owed before the loan is funded. */
export function loanStateOn(loan: LoanFacts, on: Day, payments: PaymentsOfTheDay = 'through'): LoanState {
  const zero = cents(0);
  if (on < loan.fundedOn) {
    return { balanceCents: zero, unpaidInterestCents: zero, days: 0, accruedCents: zero, payoffCents: zero, paid: 0 };
  }
  const { steps } = loanBook(loan);
  const paid = stepsMade(steps, on, payments);
  const last = steps[paid - 1];
  const balanceCents = last?.balanceCents ?? loan.principalCents;
  const unpaidInterestCents = last?.unpaidInterestCents ?? zero;
  const paidThrough = last && last.number > 0 ? last.dueOn : addMonths(loan.firstPaymentOn, -1);
  const days = balanceCents > 0 ? Math.max(0, days360(paidThrough, on)) : 0;
  const accruedCents = days === 0 ? zero : interestRule(loan.annualRate).days(balanceCents, days);
  const payoffCents = cents(balanceCents + unpaidInterestCents + accruedCents);
  return { balanceCents, unpaidInterestCents, days, accruedCents, payoffCents, paid };
}

/**
 * What it takes to pay the loan off on a day: principal, interest due and not paid, and the interest accrued since the last month paid for
 * (30/360 days, rounded to the cent). A lender's own quote for the day is the one to pay by.
 */
export function loanPayoff(loan: LoanFacts, on: Day, payments: PaymentsOfTheDay = 'through'): Figure {
  const state = loanStateOn(loan, on, payments);
  const paid = loanBook(loan).steps.slice(0, state.paid);
  const funded = on >= loan.fundedOn;
  const words = funded
    ? `${sayMoney(state.balanceCents)} of principal and ${sayMoney(cents(state.unpaidInterestCents + state.accruedCents))} of interest for ${state.days} days to ${sayDate(on)}`
    : 'The loan was not yet funded';
  const working: Working = {
    words,
    formula: funded
      ? 'principal - sum(paid) + unpaid + roundCents((principal - sum(paid)) * rate * days / 360)'
      : 'principal',
    inputs: [
      usdInput('principal', 'Principal', funded ? loan.principalCents : cents(0), TERMS),
      ...(funded
        ? [
            usdListInput(
              'paid',
              `Principal paid in ${paid.length} payments`,
              paid.map((step) => step.principalCents),
              stated('Loan schedule'),
            ),
            usdInput('unpaid', 'Interest due and not paid', state.unpaidInterestCents, stated('Loan schedule')),
            plainInput('rate', 'Rate a year', loan.annualRate, 'fraction', TERMS),
            plainInput('days', 'Days since, 30 a month', String(state.days), 'days', stated('30/360 days')),
          ]
        : []),
    ],
    unit: 'USD',
    basis: 'computed',
  };
  return { amountCents: state.payoffCents, working };
}

/** Cash entries of the loan through a day: `payment` for the regular part, `extraPrincipal` for what was paid beyond it. */
export function loanEntries(loan: LoanFacts, through: Day): UnplacedEntry[] {
  const { steps, levelCents } = loanBook(loan);
  const level = levelWorking(loan, levelCents);
  const entries: UnplacedEntry[] = [];
  for (const step of steps.slice(0, stepsMade(steps, through, 'through'))) {
    if (step.record === null) {
      const isLevel = step.regularCents === levelCents;
      entries.push({
        ...common(step, `loan-${step.number}`, 'payment'),
        label: `Loan payment ${step.number} of ${loan.termMonths}, as scheduled`,
        amountCents: negateCents(step.regularCents),
        working: isLevel ? level : clearingWorking(loan, step),
      });
      continue;
    }
    const record = stated(`Loan payment of ${sayDate(step.on)}, as entered`);
    if (step.regularCents !== 0) {
      entries.push({
        ...common(step, `loan-${step.record.id}`, 'payment'),
        label: step.number > 0 ? `Loan payment ${step.number} of ${loan.termMonths}` : 'Loan payment before the first',
        amountCents: negateCents(step.regularCents),
        working: {
          words: `${sayMoney(step.regularCents)} paid: ${sayMoney(step.interestCents)} interest, the rest principal`,
          formula: '-(paid - extra)',
          inputs: [
            usdInput('paid', 'Paid', step.record.amountCents, record),
            usdInput('extra', 'Of it extra principal', step.extraPrincipalCents, record),
          ],
          unit: 'USD',
          basis: 'entered',
        },
      });
    }
    if (step.extraPrincipalCents !== 0) {
      entries.push({
        ...common(step, `loan-${step.record.id}-extra`, 'extraPrincipal'),
        label: 'Extra principal',
        amountCents: negateCents(step.extraPrincipalCents),
        working: {
          words: `${sayMoney(step.extraPrincipalCents)} paid beyond the regular payment, all of it principal`,
          formula: '-extra',
          inputs: [usdInput('extra', 'Extra principal', step.extraPrincipalCents, record)],
          unit: 'USD',
          basis: 'entered',
        },
      });
    }
  }
  return entries;
}

function common(step: LoanStep, id: string, kind: string) {
  return { id, date: step.on, book: 'loan', kind, basis: 'cash', estimated: false } as const;
}

function levelWorking(loan: LoanFacts, levelCents: Cents): Working {
  const zeroRate = /^-?0*(\.0*)?$/.test(loan.annualRate);
  return {
    words: `Level payment of ${sayMoney(levelCents)} over ${loan.termMonths} months`,
    formula: zeroRate
      ? '-roundCents(principal / months)'
      : '-roundCents(principal * (rate / 12) / (1 - pow(1 + rate / 12, -months)))',
    inputs: [
      usdInput('principal', 'Principal', loan.principalCents, TERMS),
      ...(zeroRate ? [] : [plainInput('rate', 'Rate a year', loan.annualRate, 'fraction', TERMS)]),
      plainInput('months', 'Term', String(loan.termMonths), 'months', TERMS),
    ],
    unit: 'USD',
    basis: 'computed',
  };
}

function clearingWorking(loan: LoanFacts, step: LoanStep): Working {
  return {
    words: `The last ${sayMoney(step.balanceBeforeCents)} of principal and ${sayMoney(step.interestDueCents)} of interest`,
    formula: '-(balance + interest)',
    inputs: [
      usdInput('balance', 'Principal left', step.balanceBeforeCents, stated('Loan schedule')),
      usdInput('interest', `Interest due at ${loan.annualRate}`, step.interestDueCents, stated('Loan schedule')),
    ],
    unit: 'USD',
    basis: 'computed',
  };
}

/** How many payments are made by a day; they are in order of their dates. */
function stepsMade(steps: readonly LoanStep[], on: Day, payments: PaymentsOfTheDay): number {
  let low = 0;
  let high = steps.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    const date = steps[middle]?.on ?? on;
    if (date < on || (payments === 'through' && date === on)) low = middle + 1;
    else high = middle;
  }
  return low;
}
