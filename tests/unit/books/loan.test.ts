import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { loanEntries, loanPayoff, loanSchedule, loanStateOn } from '#shared/books/loan.ts';
import { loanBook } from '#shared/books/loan-book.ts';
import { cents, sumCents } from '#shared/units/cents.ts';
import { addDays, addMonths, day } from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { loanOf, paymentOf } from './facts.ts';

describe('the loan', () => {
  it('is paid to schedule where no payment is recorded', () => {
    const rows = loanSchedule(loanOf());
    expect(rows).toHaveLength(240);
    expect(rows[0]).toMatchObject({ number: 1, on: '2024-07-15', paymentCents: 23_241, balanceCents: 2_994_234 });
    expect(rows.at(-1)).toMatchObject({ paymentCents: 23_213, balanceCents: 0 });
  });

  it('takes a recorded payment in place of the scheduled one of its month', () => {
    const rows = loanSchedule(loanOf({ payments: [paymentOf('2024-08-11', 300)] }));
    expect(rows[1]).toMatchObject({ number: 2, on: '2024-08-11', paymentCents: 30_000, recorded: true });
    expect(rows[1]?.interestCents).toBe(17_441);
    expect(rows[1]?.principalCents).toBe(12_559);
    expect(rows[2]).toMatchObject({ number: 3, on: '2024-09-15', recorded: false });
  });

  it('puts extra principal wholly to principal, keeps the payment and shortens the term', () => {
    const loan = loanOf({ payments: [paymentOf('2025-12-15', 5_232.41, 5_000)] });
    const rows = loanSchedule(loan);
    expect(rows[17]).toMatchObject({ number: 18, extraPrincipalCents: 500_000, balanceCents: 2_390_912 });
    expect(rows[18]?.paymentCents).toBe(23_241);
    expect(rows.length).toBeLessThan(200);
    const entries = loanEntries(loan, day('2025-12-31')).slice(-2);
    expect(entries.map((entry) => [entry.kind, entry.amountCents])).toEqual([
      ['payment', -23_241],
      ['extraPrincipal', -500_000],
    ]);
  });

  it('keeps the scheduled payment of a month whose only record is extra principal', () => {
    const loan = loanOf({ payments: [paymentOf('2024-08-20', 1_000, 1_000)] });
    expect(loanEntries(loan, day('2024-08-31')).map((entry) => [entry.date, entry.kind, entry.amountCents])).toEqual([
      ['2024-07-15', 'payment', -23_241],
      ['2024-08-15', 'payment', -23_241],
      ['2024-08-20', 'extraPrincipal', -100_000],
    ]);
  });

  it('leaves interest due after a missed payment, without interest on it, and pays it first', () => {
    const rows = loanSchedule(loanOf({ payments: [paymentOf('2024-07-15', 0)] }));
    expect(rows[0]).toMatchObject({ paymentCents: 0, principalCents: 0, unpaidInterestCents: 17_475 });
    expect(rows[1]).toMatchObject({
      interestCents: 23_241,
      principalCents: 0,
      unpaidInterestCents: 2 * 17_475 - 23_241,
    });
    // Two months of 174.75 are due with the second payment; 232.41 a month has caught up by the fifth.
    expect(rows.slice(2, 5).map((row) => [row.unpaidInterestCents, row.principalCents])).toEqual([
      [5_943, 0],
      [177, 0],
      [0, 5_589],
    ]);
    expect(rows.at(-1)?.balanceCents).toBe(0);
  });

  it('owes nothing more once it is paid off, and an overpayment is owed back', () => {
    const loan = loanOf({ payments: [paymentOf('2024-07-15', 31_000, 30_767.59)] });
    expect(loanSchedule(loan)).toHaveLength(1);
    const payoff = loanPayoff(loan, day('2024-12-01'));
    expect(payoff.amountCents).toBe(3_000_000 + 17_475 - 3_100_000);
    expect(evaluateWorking(payoff.working).eq(usdOf(payoff.amountCents))).toBe(true);
  });

  it('spreads a loan without interest evenly', () => {
    const rows = loanSchedule(loanOf({ annualRate: '0', termMonths: 36, principalCents: cents(1_000_000) }));
    expect(rows[0]?.paymentCents).toBe(27_778);
    expect(rows.at(-1)).toMatchObject({ number: 36, paymentCents: 27_770, balanceCents: 0 });
    const [entry] = loanEntries(loanOf({ annualRate: '0', termMonths: 36 }), day('2024-07-31'));
    expect(entry && evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
  });

  it('takes the balance and the interest of the days since to pay off', () => {
    const loan = loanOf();
    expect(loanPayoff(loan, day('2024-07-15')).amountCents).toBe(2_994_234);
    // 29,942.34 × 6.99 % × 10 / 360 = 58.138
    expect(loanPayoff(loan, day('2024-07-25')).amountCents).toBe(2_994_234 + 5_814);
    expect(loanPayoff(loan, day('2024-06-01')).amountCents).toBe(0);
  });

  it('stands before the payments of a day at its start and after them at its close', () => {
    const loan = loanOf();
    expect(loanStateOn(loan, day('2024-07-15'), 'before').payoffCents).toBe(3_017_475);
    expect(loanStateOn(loan, day('2024-07-15'), 'through').payoffCents).toBe(2_994_234);
  });
});

const anyLoan = fc
  .record({
    principal: fc.integer({ min: 100_000, max: 9_000_000 }),
    rate: fc.integer({ min: 0, max: 1_500 }),
    months: fc.integer({ min: 12, max: 300 }),
    payments: fc.array(
      fc.record({
        month: fc.integer({ min: 0, max: 60 }),
        late: fc.integer({ min: 0, max: 12 }),
        regular: fc.integer({ min: 0, max: 90_000 }),
        extra: fc.integer({ min: 0, max: 60_000 }),
      }),
      { maxLength: 8 },
    ),
  })
  .map(({ principal, rate, months, payments }) =>
    loanOf({
      principalCents: cents(principal),
      annualRate: `0.${String(rate).padStart(4, '0')}`,
      termMonths: months,
      payments: payments.map((one, index) => ({
        id: `p${index}`,
        on: addDays(addMonths(day('2024-07-15'), one.month), one.late),
        amountCents: cents(one.regular + one.extra),
        extraPrincipalCents: cents(one.extra),
        note: null,
        reamortize: false,
        documentId: null,
      })),
    }),
  );

describe('for any loan and any payments', () => {
  it('the principal of the schedule comes to the loan, less what is overpaid', () => {
    fc.assert(
      fc.property(anyLoan, (loan) => {
        const rows = loanSchedule(loan);
        const left = rows.at(-1)?.balanceCents ?? loan.principalCents;
        expect(sumCents(rows.map((row) => row.principalCents)) + left).toBe(loan.principalCents);
        expect(left).toBeLessThanOrEqual(0);
        for (const row of rows) expect(row.interestCents + row.principalCents).toBe(row.paymentCents);
      }),
    );
  });

  it('the principal in a payoff and the principal paid come to the loan on every day, and its working evaluates to it', () => {
    fc.assert(
      fc.property(anyLoan, fc.integer({ min: 0, max: 3_000 }), (loan, after) => {
        const on = addDays(loan.fundedOn, after);
        const state = loanStateOn(loan, on);
        const payoff = loanPayoff(loan, on);
        const made = loanBook(loan).steps.filter((step) => step.on <= on);
        const paid = sumCents(made.map((step) => step.principalCents));
        expect(payoff.amountCents - state.accruedCents - state.unpaidInterestCents + paid).toBe(loan.principalCents);
        expect(evaluateWorking(payoff.working).eq(usdOf(payoff.amountCents))).toBe(true);
      }),
    );
  });

  it('entries add up to what the schedule pays, and every working evaluates to its entry', () => {
    fc.assert(
      fc.property(anyLoan, (loan) => {
        const entries = loanEntries(loan, day('2100-01-01'));
        const paid = sumCents(loanSchedule(loan).map((row) => row.paymentCents));
        expect(-sumCents(entries.map((entry) => entry.amountCents))).toBe(paid);
        for (const entry of entries) expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
      }),
      { numRuns: 20 },
    );
  });
});
