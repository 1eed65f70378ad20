import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { loanClearedOn, loanEntries, loanPayoff, loanSchedule, loanStateOn } from '#shared/books/loan.ts';
import { loanBook } from '#shared/books/loan-book.ts';
import { prepaymentOutcomes } from '#shared/books/loan-outcomes.ts';
import type { LoanStep } from '#shared/books/loan-step.ts';
import type { LoanFacts } from '#shared/facts/finance.ts';
import { cents, sumCents } from '#shared/units/cents.ts';
import { addDays, addMonths, day } from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { anyContract, anyRecordedLoan } from './arbitrary-loan.ts';
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

/** A schedule of hundreds of months is worth many small examples, and slower than they are. */
const RUNS = Math.ceil(PROPERTY_RUNS / 4);
const FEW_RUNS = Math.ceil(PROPERTY_RUNS / 20);
const LONG = 60_000;

describe('for any contract, kept to schedule', () => {
  it(
    'the payments bring the principal, with the interest that joined it, to nothing within the term',
    () => {
      fc.assert(
        fc.property(anyContract, (loan) => {
          const rows = loanSchedule(loan);
          const joined = sumCents(rows.map((row) => row.capitalisedCents));
          expect(sumCents(rows.map((row) => row.principalCents))).toBe(loan.principalCents + joined);
          expect(rows.at(-1)).toMatchObject({ balanceCents: 0, unpaidInterestCents: 0 });
          expect(rows.at(-1)?.number).toBeLessThanOrEqual(loan.termMonths);
          expect(loanClearedOn(loan)).toBe(rows.at(-1)?.on);
        }),
        { numRuns: RUNS },
      );
    },
    LONG,
  );

  it(
    'level payments never raise the balance',
    () => {
      fc.assert(
        fc.property(anyContract, (contract) => {
          const balances = loanSchedule({ ...contract, dayCount: '30/360', promotion: null, assumedPrepayment: null })
            .filter(({ number }) => number > 0)
            .map(({ balanceCents }) => balanceCents);
          expect(balances).toEqual([...balances].sort((a, b) => b - a));
        }),
        { numRuns: RUNS },
      );
    },
    LONG,
  );

  it(
    'actual days of 365 cost what 30/360 costs, to what a month’s odd days can do',
    () => {
      fc.assert(
        fc.property(anyContract, (contract) => {
          const funded = { fundedOn: addMonths(contract.firstPaymentOn, -1), promotion: null, assumedPrepayment: null };
          const interest = (dayCount: LoanFacts['dayCount']) =>
            sumCents(loanSchedule({ ...contract, ...funded, dayCount }).map((row) => row.interestCents));
          const [by30, by365, by360] = [interest('30/360'), interest('actual/365'), interest('actual/360')];
          // A year is 360 of 360, 365.25 of 365 or 365.25 of 360 days; what a payment lacks is lent at the loan's own rate to the end of the term.
          const growth = (1 + Number(contract.annualRate) / 12) ** contract.termMonths;
          expect(Math.abs(by365 - by30)).toBeLessThanOrEqual(by30 * 0.01 * growth + contract.termMonths);
          expect(by360).toBeGreaterThanOrEqual(by365);
        }),
        { numRuns: RUNS },
      );
    },
    LONG,
  );

  it(
    'the more of an assumed prepayment is paid, the less the payment is afterwards, unless it is interest alone',
    () => {
      fc.assert(
        fc.property(anyContract, (contract) => {
          // A month whose interest rounds to nothing asks for nothing, so that the next payment may be a level one in one case alone.
          fc.pre(contract.promotion?.payment !== 'interest');
          const outcomes = prepaymentOutcomes(contract);
          expect(outcomes).toHaveLength(contract.assumedPrepayment === null ? 0 : 3);
          const next = outcomes.map((outcome) => outcome.next?.amountCents ?? 0);
          expect(next).toEqual([...next].sort((a, b) => a - b));
        }),
        { numRuns: RUNS },
      );
    },
    LONG,
  );
});

describe('for any loan and any record', () => {
  it(
    'what is owed, with the principal paid, less what joined it and what the lender’s balances changed, is what was lent; on every day',
    () => {
      fc.assert(
        fc.property(anyRecordedLoan, fc.integer({ min: 0, max: 3_000 }), (loan, after) => {
          const on = addDays(loan.fundedOn, after);
          const state = loanStateOn(loan, on);
          const payoff = loanPayoff(loan, on);
          const made = loanBook(loan).steps.filter((step) => step.on <= on && step.segment === state.segment);
          const total = (part: (step: LoanStep) => number) => made.reduce((sum, step) => sum + part(step), 0);
          const beside = state.accruedCents + state.unpaidInterestCents + state.feeCents;
          expect(payoff.amountCents - beside).toBe(state.balanceCents);
          expect(
            state.balanceCents +
              total((step) => step.principalCents) -
              total((step) => step.capitalisedCents) -
              total((step) => step.driftCents),
          ).toBe(state.segment.principalCents);
          expect(evaluateWorking(payoff.working).eq(usdOf(payoff.amountCents))).toBe(true);
        }),
        { numRuns: RUNS },
      );
    },
    LONG,
  );

  it(
    'steps follow one another by day and by balance, and come to an end',
    () => {
      fc.assert(
        fc.property(anyRecordedLoan, (loan) => {
          const { steps, rows } = loanBook(loan);
          const [first] = steps;
          if (first?.kind !== 'paidOff') expect(first?.balanceBeforeCents).toBe(loan.principalCents);
          for (const [at, step] of steps.entries()) {
            const before = steps[at - 1];
            if (before) {
              expect(step.on >= before.on).toBe(true);
              if (step.kind !== 'opened') expect(step.balanceBeforeCents).toBe(before.balanceCents);
            }
            expect(step.regularCents + step.extraPrincipalCents).toBe(
              step.kind === 'payment' ? step.interestCents + step.principalCents : 0,
            );
            expect(step.unpaidInterestCents).toBeGreaterThanOrEqual(0);
          }
          for (const row of rows) expect(row.interestCents + row.principalCents).toBe(row.paymentCents);
          expect(steps.at(-1)?.balanceCents).toBeLessThanOrEqual(0);
        }),
        { numRuns: RUNS },
      );
    },
    LONG,
  );

  it(
    'entries add up to the money that moved, each has an id of its own, and every working evaluates to its entry',
    () => {
      fc.assert(
        fc.property(anyRecordedLoan, (loan) => {
          const entries = loanEntries(loan, day('2200-01-01'));
          const moved = sumCents(loanBook(loan).steps.map((step) => step.cashCents));
          expect(sumCents(entries.map((entry) => entry.amountCents))).toBe(moved);
          expect(new Set(entries.map(({ id }) => id)).size).toBe(entries.length);
          for (const entry of entries) expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
        }),
        { numRuns: FEW_RUNS },
      );
    },
    LONG,
  );

  it(
    'a refinance moves what is owed and cash alike: the day’s cash less the day’s payoff is changed by its costs and fee alone',
    () => {
      fc.assert(
        fc.property(anyRecordedLoan, (loan) => {
          for (const [at, opened] of loanBook(loan).steps.entries()) {
            const closing = loanBook(loan).steps[at - 1];
            if (opened.kind !== 'opened' || closing === undefined) continue;
            const owedBefore = closing.balanceBeforeCents + closing.interestDueCents;
            const costs = opened.refinance?.costsCents ?? 0;
            expect(opened.cashCents - opened.balanceCents).toBe(-owedBefore - closing.feeCents - costs);
          }
        }),
        { numRuns: RUNS },
      );
    },
    LONG,
  );

  it(
    'the same loan gives the same book',
    () => {
      fc.assert(
        fc.property(anyRecordedLoan, (loan) => {
          expect(loanBook({ ...loan })).toEqual(loanBook(loan));
          expect(loanBook(loan)).toBe(loanBook(loan));
        }),
        { numRuns: FEW_RUNS },
      );
    },
    LONG,
  );

  it(
    'a re-amortized loan never runs past its term',
    () => {
      fc.assert(
        fc.property(anyRecordedLoan, (recorded) => {
          const payments = recorded.payments.map((one) => ({
            ...one,
            amountCents: one.extraPrincipalCents,
            reamortize: true,
          }));
          const rows = loanSchedule({ ...recorded, payments, balances: [], refinances: [] });
          expect(Math.max(...rows.filter((row) => !row.recorded).map(({ number }) => number))).toBeLessThanOrEqual(
            recorded.termMonths,
          );
        }),
        { numRuns: RUNS },
      );
    },
    LONG,
  );
});
