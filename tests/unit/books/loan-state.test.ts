import { describe, expect, it } from 'vitest';
import { loanPayoff, loanSchedule, loanStateOn } from '#shared/books/loan.ts';
import { loanBook } from '#shared/books/loan-book.ts';
import { day } from '#shared/units/day.ts';
import { loanOf, paymentOf } from './facts.ts';

describe('what is owed on a day', () => {
  it('is nothing the day before the loan is funded, and the principal with no interest on the day', () => {
    const loan = loanOf({ promotion: { months: 6, annualRate: '0.01', payment: 'none' } });
    expect(loanStateOn(loan, day('2024-06-14'))).toMatchObject({
      paid: 0,
      balanceCents: 0,
      unpaidInterestCents: 0,
      payoffCents: 0,
      days: 0,
      annualRate: '0.01',
    });
    expect(loanStateOn(loan, day('2024-06-15'))).toMatchObject({ paid: 0, payoffCents: 3_000_000, accruedCents: 0 });
  });

  it('counts the day’s own payment at its close and not at its start', () => {
    const loan = loanOf();
    expect(loanStateOn(loan, day('2024-07-15'), 'before').paid).toBe(0);
    expect(loanStateOn(loan, day('2024-07-15'), 'through').paid).toBe(1);
    expect(loanStateOn(loan, day('2024-07-14'), 'through').paid).toBe(0);
    expect(loanStateOn(loan, day('2024-07-16'), 'before').paid).toBe(1);
  });
});

describe('a payoff in words', () => {
  it('adds the interest that was left unpaid to that of the days since', () => {
    const loan = loanOf({ promotion: { months: 6, annualRate: '0.0699', payment: 'none' } });
    // 174.75 of the first month and 87.38 of fifteen days.
    expect(loanPayoff(loan, day('2024-07-30')).working.words).toBe(
      '$30,000.00 of principal and $262.13 of interest for 15 days to 30 Jul 2024',
    );
  });
});

describe('the level payment at the start', () => {
  it('is worked out from what was lent and the interest that joined it, to the cent', () => {
    const start = (fundedOn: string) => loanBook(loanOf({ fundedOn: day(fundedOn) })).levels[0]?.balanceCents;
    expect(start('2024-06-15')).toBe(3_000_000);
    expect(start('2024-03-15')).toBe(3_052_425);
  });
});

describe('a loan that asks for interest alone to its last payment', () => {
  const promotion = { months: 60, annualRate: '0.0699', payment: 'interest' as const };

  it('is cleared by its last payment', () => {
    expect(loanSchedule(loanOf({ termMonths: 12, promotion })).at(-1)).toMatchObject({
      number: 12,
      paymentCents: 3_017_475,
      balanceCents: 0,
    });
  });

  it('and by the next one where the last was paid short', () => {
    const payments = [paymentOf('2025-06-15', 174.75)];
    expect(loanSchedule(loanOf({ termMonths: 12, promotion, payments })).at(-1)).toMatchObject({
      number: 13,
      paymentCents: 3_017_475,
      balanceCents: 0,
    });
    // Past the promotion there is no level payment either: what is owed is asked at once.
    const over = loanOf({ termMonths: 12, promotion: { ...promotion, months: 12 }, payments });
    expect(loanSchedule(over).at(-1)).toMatchObject({ number: 13, paymentCents: 3_017_475, balanceCents: 0 });
  });
});
