import type { LoanFacts, LoanPayment } from '../facts/finance.ts';
import type { Figure } from '../position/position.ts';
import { keptAt } from '../settlement/place.ts';
import { type Cents, cents, sumCents, ZERO_CENTS } from '../units/cents.ts';
import { addMonths, type Day, yearOf } from '../units/day.ts';
import type { Working } from '../working.ts';
import { stated, usdListInput } from './inputs.ts';
import { loanBook } from './loan-book.ts';
import type { LoanStep } from './loan-step.ts';
import { levelWorking, restWorking } from './loan-workings.ts';

/** What becomes of a loan whose payment takes a prepayment for granted, if so much of it is paid. */
export type PrepaymentOutcome = {
  prepaid: 'whole' | 'part' | 'nothing';
  prepaidCents: Cents;
  /** The payment after the one it is due by; null where none is left. */
  next: Figure | null;
  /** All interest from funding to the end, what joined the principal included. */
  interest: Figure;
  clearedOn: Day;
};

/**
 * Three ways the assumed prepayment can go: paid whole, in part (half of it unless `partCents` says how much), or not at all. Regular payments are as recorded
 * through that day; extra principal, lender's balances and refinances are left out, so that the three differ in the prepayment alone. It is paid with the
 * payment it is due by. None where the contract takes no prepayment for granted.
 */
export function prepaymentOutcomes(loan: LoanFacts, partCents: Cents | null = null): PrepaymentOutcome[] {
  const { assumedPrepayment: assumed } = loan;
  if (assumed === null) return [];
  const part = partCents ?? cents(Math.floor(assumed.amountCents / 2));
  return [
    outcomeOf(loan, 'whole', assumed.amountCents, assumed.byPayment),
    outcomeOf(loan, 'part', part, assumed.byPayment),
    outcomeOf(loan, 'nothing', ZERO_CENTS, assumed.byPayment),
  ];
}

function outcomeOf(
  loan: LoanFacts,
  prepaid: PrepaymentOutcome['prepaid'],
  prepaidCents: Cents,
  byPayment: number,
): PrepaymentOutcome {
  const dueOn = addMonths(loan.firstPaymentOn, byPayment - 1);
  const regular = loan.payments
    .filter((payment) => payment.amountCents !== payment.extraPrincipalCents)
    .map((payment): LoanPayment => {
      const amountCents = cents(payment.amountCents - payment.extraPrincipalCents);
      return { ...payment, amountCents, extraPrincipalCents: ZERO_CENTS, reamortize: false };
    });
  const prepayment: LoanPayment = {
    id: `assumed-${prepaid}`,
    on: dueOn,
    amountCents: prepaidCents,
    extraPrincipalCents: prepaidCents,
    note: null,
    reamortize: false,
    documentId: null,
  };
  const payments = prepaidCents === 0 ? regular : [...regular, prepayment];
  const { steps } = loanBook({ ...loan, payments, balances: [], refinances: [] });
  const next = steps.find((step) => step.kind === 'payment' && step.number > byPayment);
  return {
    prepaid,
    prepaidCents,
    next: next === undefined ? null : { amountCents: next.regularCents, working: workingOf(next) },
    interest: loanInterest(steps),
    clearedOn: keptAt(steps, steps.length - 1).on,
  };
}

function workingOf(step: LoanStep): Working {
  return step.level === null ? restWorking(step) : levelWorking(step.level);
}

/** All interest of a loan, what joined the principal included, by calendar year. */
export function loanInterest(steps: readonly LoanStep[]): Figure {
  const years = new Map<number, Cents>();
  for (const step of steps) {
    const year = yearOf(step.on);
    years.set(year, cents((years.get(year) ?? 0) + step.interestCents + step.capitalisedCents));
  }
  const amounts = [...years.values()];
  return {
    amountCents: sumCents(amounts),
    working: {
      words: `Interest of every payment, from ${Math.min(...years.keys())} to ${Math.max(...years.keys())}`,
      formula: 'sum(interest)',
      inputs: [usdListInput('interest', 'Interest by year', amounts, stated('Loan schedule'))],
      unit: 'USD',
      basis: 'computed',
    },
  };
}
