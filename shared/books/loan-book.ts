import type { LoanFacts, LoanPayment } from '../facts/finance.ts';
import { type Cents, cents } from '../units/cents.ts';
import { addMonths, type Day, monthsBetween } from '../units/day.ts';
import { interestRule, levelPayment } from './interest.ts';

/** Months past the term that are looked at while a short last payment leaves something owing. */
const MONTHS_PAST_TERM = 600;

/** One payment of the loan: recorded, or as the schedule has it. */
export type LoanStep = {
  /** Payment number, 1 for the first; 0 for money paid before the first payment's month. */
  number: number;
  dueOn: Day;
  on: Day;
  /** Without extra principal. */
  regularCents: Cents;
  extraPrincipalCents: Cents;
  /** Interest this payment pays; the rest of the regular part is principal. */
  interestCents: Cents;
  principalCents: Cents;
  /** Principal owed before and after. */
  balanceBeforeCents: Cents;
  balanceCents: Cents;
  /** Interest due and not paid, before (this month's included) and after; it bears no interest itself. */
  interestDueCents: Cents;
  unpaidInterestCents: Cents;
  record: LoanPayment | null;
};

/** A month of the loan. `paymentCents` = `interestCents` + `principalCents`, extra principal included. */
export type LoanRow = {
  number: number;
  /** The day the month's last payment was made, or is due. */
  on: Day;
  dueOn: Day;
  paymentCents: Cents;
  interestCents: Cents;
  principalCents: Cents;
  extraPrincipalCents: Cents;
  balanceCents: Cents;
  unpaidInterestCents: Cents;
  recorded: boolean;
};

export type LoanBook = { levelCents: Cents; steps: LoanStep[]; rows: LoanRow[] };

const books = new WeakMap<LoanFacts, LoanBook>();

/**
 * The loan month by month, 30/360, from the first payment to the one that clears it. Records replace the scheduled payment of their calendar
 * month; a month without one is taken as paid to schedule, and a month whose records are extra principal alone keeps its scheduled payment.
 * A payment pays interest due first. Interest that a short or missing payment leaves stays due, apart from principal and without interest
 * on it (as simple-interest loans do: common practice, no source), and the next payment pays it first. Extra principal goes to principal
 * whole; the level payment stays and the term shortens. A balance below zero is an overpayment the lender owes back.
 */
export function loanBook(loan: LoanFacts): LoanBook {
  const known = books.get(loan);
  if (known) return known;
  const made = buildLoanBook(loan);
  books.set(loan, made);
  return made;
}

function buildLoanBook(loan: LoanFacts): LoanBook {
  const interest = interestRule(loan.annualRate);
  const levelCents = levelPayment(loan.principalCents, loan.annualRate, loan.termMonths);
  const records = recordsByMonth(loan);
  const lastRecorded = Math.max(-1, ...records.keys());
  const steps: LoanStep[] = [];
  const rows: LoanRow[] = [];
  let balance: number = loan.principalCents;
  let due = 0;

  function pay(number: number, dueOn: Day, on: Day, regular: number, extra: number, record: LoanPayment | null): void {
    const interestPaid = Math.max(0, Math.min(due, regular));
    const principal = regular - interestPaid + extra;
    steps.push({
      number,
      dueOn,
      on,
      regularCents: cents(regular),
      extraPrincipalCents: cents(extra),
      interestCents: cents(interestPaid),
      principalCents: cents(principal),
      balanceBeforeCents: cents(balance),
      balanceCents: cents(balance - principal),
      interestDueCents: cents(due),
      unpaidInterestCents: cents(due - interestPaid),
      record,
    });
    balance -= principal;
    due -= interestPaid;
  }

  const firstMonth = Math.min(0, ...records.keys());
  for (let month = firstMonth; month < loan.termMonths + MONTHS_PAST_TERM; month += 1) {
    if (balance <= 0 && due === 0 && month > lastRecorded) break;
    const number = Math.max(0, month + 1);
    const dueOn = addMonths(loan.firstPaymentOn, month);
    const made = records.get(month) ?? [];
    const before = steps.length;
    if (month >= 0 && balance > 0) due += interest.month(cents(balance));
    let scheduled = month >= 0 && (balance > 0 || due > 0) && !made.some(replacesSchedule);
    const payScheduled = () => {
      scheduled = false;
      const toClear = balance + due;
      const amount = month >= loan.termMonths - 1 ? toClear : Math.min(levelCents, toClear);
      if (amount > 0) pay(number, dueOn, dueOn, amount, 0, null);
    };
    for (const record of made) {
      if (scheduled && dueOn <= record.on) payScheduled();
      pay(
        number,
        dueOn,
        record.on,
        record.amountCents - record.extraPrincipalCents,
        record.extraPrincipalCents,
        record,
      );
    }
    if (scheduled) payScheduled();
    const ofMonth = steps.slice(before);
    if (ofMonth.length > 0) rows.push(rowOf(ofMonth));
  }
  return { levelCents, steps, rows };
}

/** Wholly extra principal is paid beside the month's payment, not in its place; a record of nothing says that the month was missed. */
function replacesSchedule(record: LoanPayment): boolean {
  return record.amountCents !== record.extraPrincipalCents || record.amountCents === 0;
}

function recordsByMonth(loan: LoanFacts): Map<number, LoanPayment[]> {
  const months = new Map<number, LoanPayment[]>();
  const inOrder = [...loan.payments].sort((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : 0));
  for (const record of inOrder) {
    const month = monthsBetween(loan.firstPaymentOn, record.on);
    const held = months.get(month);
    if (held) held.push(record);
    else months.set(month, [record]);
  }
  return months;
}

function rowOf(steps: readonly LoanStep[]): LoanRow {
  const last = steps.at(-1);
  if (last === undefined) throw new Error('a month of the loan has no payment');
  const total = (part: (step: LoanStep) => number) => cents(steps.reduce((sum, step) => sum + part(step), 0));
  return {
    number: last.number,
    on: last.on,
    dueOn: last.dueOn,
    paymentCents: total((step) => step.regularCents + step.extraPrincipalCents),
    interestCents: total((step) => step.interestCents),
    principalCents: total((step) => step.principalCents),
    extraPrincipalCents: total((step) => step.extraPrincipalCents),
    balanceCents: last.balanceCents,
    unpaidInterestCents: last.unpaidInterestCents,
    recorded: steps.some((step) => step.record !== null),
  };
}
