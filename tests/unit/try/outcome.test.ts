import { describe, expect, it } from 'vitest';
import { loanClearedOn } from '#shared/books/loan.ts';
import { loanBook } from '#shared/books/loan-book.ts';
import type { LoanFacts } from '#shared/facts/finance.ts';
import { projectFrom } from '#shared/position/project.ts';
import { outcomeOf } from '#shared/try/outcome.ts';
import { sumCents } from '#shared/units/cents.ts';
import { addMonths, day } from '#shared/units/day.ts';
import { loanOf, paymentOf } from '../books/facts.ts';
import { assuming, builtLedger } from '../position/built-basis.ts';

const { basis } = builtLedger({ cycles: 14 });
const from = basis.close.on;

function outcome(loans: LoanFacts[], endsOn: ReturnType<typeof day> | null = null, horizonMonths = 24) {
  const of = assuming(basis, { horizonMonths });
  const projected = projectFrom(of);
  if (!projected.ok) throw new Error(projected.why);
  const [loan = null, ...others] = loans;
  const otherLoans = others.map((other, at) => ({ id: `other-${at}`, kind: 'other' as const, loan: other }));
  return { ...outcomeOf({ ...of.facts, loan, otherLoans }, projected.projection, from, endsOn), ...projected };
}

const short = loanOf({ termMonths: 36 });
const long = loanOf();
const never = loanOf({
  termMonths: 1,
  payments: Array.from({ length: 601 }, (_, month) => paymentOf(addMonths(day('2024-07-15'), month), 0)),
});

describe('what a projection comes to', () => {
  it('has its last month’s settled today, and the bill avoided of the twelve whole months after the first', () => {
    const made = outcome([]);
    const { months } = made;
    expect(made.settledCents).toBe(months.at(-1)?.settledTodayCents);
    expect(made.firstYearAvoidedCents).toBe(sumCents(months.slice(1, 13).map((month) => month.books.billAvoided)));
    expect(outcome([], null, 13).firstYearAvoidedCents).not.toBeNull();
    expect(outcome([], null, 12).firstYearAvoidedCents).toBeNull();
  });

  it('is paid off when the last loan is, or on the day of a sale before that', () => {
    expect(outcome([short]).paidOffOn).toBe(loanClearedOn(short));
    expect(outcome([short, long]).paidOffOn).toBe(loanClearedOn(long));
    expect(outcome([long, short]).paidOffOn).toBe(loanClearedOn(long));
    expect(outcome([long, short], day('2028-05-05')).paidOffOn).toBe('2028-05-05');
    expect(outcome([short], day('2028-05-05')).paidOffOn).toBe(loanClearedOn(short));
  });

  it('is paid off never where a record never ends, save by a sale; and nothing is to be paid off without a loan', () => {
    expect(outcome([never]).paidOffOn).toBeNull();
    expect(outcome([never, short]).paidOffOn).toBeNull();
    expect(outcome([never, short], day('2028-05-05')).paidOffOn).toBe('2028-05-05');
    expect(outcome([], day('2028-05-05')).paidOffOn).toBeNull();
  });

  it('has the payments of all loans in force in the end, none for a loan that asks for interest alone to its last', () => {
    const promotion = { months: 60, annualRate: '0.0699', payment: 'interest' as const };
    const interestOnly = loanOf({ termMonths: 48, promotion });
    const levelOf = (loan: LoanFacts) => loanBook(loan).levels.at(-1)?.paymentCents ?? 0;
    expect(outcome([]).paymentCents).toBeNull();
    expect(outcome([short, long]).paymentCents).toBe(levelOf(short) + levelOf(long));
    expect(outcome([interestOnly]).paymentCents).toBe(0);
  });

  it('counts interest from the close, its day included, to the horizon or the sale, that day left out', () => {
    const onClose = loanOf({ fundedOn: addMonths(from, -1), firstPaymentOn: from });
    const interest = loanBook(onClose).steps.map((step) => step.interestCents);
    const until = outcome([onClose], addMonths(from, 3)).interestCents;
    expect(until).toBe(sumCents(interest.slice(0, 3)));
    const horizon = outcome([onClose]).months.at(-1)?.on ?? from;
    const before = loanBook(onClose).steps.filter((step) => step.on < horizon);
    expect(outcome([onClose]).interestCents).toBe(sumCents(before.map((step) => step.interestCents)));
  });
});
