import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { interestRule } from '#shared/books/interest.ts';
import { loanClearedOn } from '#shared/books/loan.ts';
import { loanBook } from '#shared/books/loan-book.ts';
import { workedRows } from '#shared/books/loan-rows.ts';
import { levelWorking } from '#shared/books/loan-workings.ts';
import { cents } from '#shared/units/cents.ts';
import { addMonths, day } from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { anyRecordedLoan } from './arbitrary-loan.ts';
import { loanOf, paymentOf } from './facts.ts';

describe('the rows of a schedule, worked', () => {
  it('point at the level payment they are, and say themselves what else they are', () => {
    const promotion = { months: 2, annualRate: '0.0699', payment: 'interest' as const };
    const payments = [paymentOf('2024-10-15', 232.41), paymentOf('2024-10-20', 500, 500)];
    const rows = workedRows(loanBook(loanOf({ promotion, payments, termMonths: 12 })));
    expect(rows.map(({ level, working }) => [level, working?.formula ?? null]).slice(0, 5)).toEqual([
      [null, 'interest'],
      [null, 'interest'],
      [0, null],
      [null, 'sum(paid)'],
      [0, null],
    ]);
    expect(rows.at(-1)?.working?.formula).toBe('(balance + interest)');
    expect(rows[3]?.working?.words).toBe('The 2 payments of the month added');
  });

  it('have no working where nothing was paid', () => {
    const promotion = { months: 2, annualRate: '0.0699', payment: 'none' as const };
    expect(workedRows(loanBook(loanOf({ promotion })))[0]).toMatchObject({ level: null, working: null });
  });

  it('evaluate to their payments for any loan and any record', () => {
    fc.assert(
      fc.property(anyRecordedLoan, (loan) => {
        const book = loanBook(loan);
        for (const { row, level, working } of workedRows(book)) {
          const one = level === null ? null : book.levels[level];
          const shown = one ? levelWorking(one) : working;
          if (shown === null) expect(row.refinanced || row.paymentCents === 0).toBe(true);
          else expect(evaluateWorking(shown).eq(usdOf(row.paymentCents))).toBe(true);
        }
      }),
      { numRuns: Math.ceil(PROPERTY_RUNS / 20) },
    );
  }, 60_000);
});

describe('interest', () => {
  it('is rounded half away from zero, for what is owed and for what is owed back', () => {
    expect(interestRule('0.06').month(cents(100))).toBe(1);
    expect(interestRule('0.06').month(cents(-100))).toBe(-1);
    expect(interestRule('-0.06').month(cents(100))).toBe(-1);
    expect(interestRule('1').days(cents(360), 1)).toBe(1);
  });
});

describe('the day a loan is cleared', () => {
  it('is not known where the record says that nothing was ever paid', () => {
    const payments = Array.from({ length: 601 }, (_, month) => paymentOf(addMonths(day('2024-07-15'), month), 0));
    expect(loanClearedOn(loanOf({ termMonths: 1, payments }))).toBeNull();
  });
});
