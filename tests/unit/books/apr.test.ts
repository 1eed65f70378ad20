import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { aprWorking, effectiveApr, type PaymentRun } from '#shared/books/apr.ts';
import { loanApr } from '#shared/books/loan-apr.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { Exact, exact, usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { anyContract } from './arbitrary-loan.ts';
import { loanOf } from './facts.ts';

const runOf = (amount: number, count = 1, firstUnitPeriods = 1): PaymentRun => ({
  count,
  amountCents: cents(amount),
  firstUnitPeriods,
  parts: 0,
  of: 1,
});
const aprOf = (advance: number, ...payments: PaymentRun[]) =>
  effectiveApr({ advanceCents: cents(advance), payments, unitPeriodsPerYear: 12 });

describe('the annual percentage rate', () => {
  it('is nothing where the payments come to the advance alone, and none where they do not come to it', () => {
    const terms = { advanceCents: cents(120_000), payments: [runOf(10_000, 12)], unitPeriodsPerYear: 12 };
    const apr = effectiveApr(terms) ?? new Exact(1);
    expect(apr.lt('1e-14')).toBe(true);
    expect(evaluateWorking(aprWorking(terms, apr, 'A loan without interest')).eq(usdOf(terms.advanceCents))).toBe(true);
    expect(aprOf(120_000, runOf(9_999, 12))).toBeNull();
  });

  it('is none beyond a thousand percent a unit period', () => {
    expect(aprOf(100, runOf(1_000_000))).toBeNull();
  });

  it('is twelve times what one payment a month later asks beyond the advance', () => {
    expect(aprOf(100_000, runOf(101_000))?.toDecimalPlaces(12).toString()).toBe('0.12');
  });

  it('proves itself for any loan: at it the payments are worth the advance, and a fee inside the principal raises it', () => {
    fc.assert(
      fc.property(anyContract, fc.integer({ min: 0, max: 30 }), (loan, percent) => {
        const own = loanApr(loan, cents(0));
        const withFee = loanApr(loan, cents(Math.floor((loan.principalCents * percent) / 100)));
        expect(own && evaluateWorking(own.proof.working).eq(usdOf(own.proof.amountCents))).not.toBe(false);
        if (own === null || withFee === null) return;
        expect(evaluateWorking(withFee.proof.working).eq(usdOf(withFee.proof.amountCents))).toBe(true);
        expect(exact(withFee.apr).gte(own.apr)).toBe(true);
      }),
      { numRuns: Math.ceil(PROPERTY_RUNS / 20) },
    );
  }, 60_000);

  it('is proved by as few inputs as there are runs of one amount', () => {
    const names = (loan: ReturnType<typeof loanOf>) =>
      loanApr(loan, cents(0))?.proof.working.inputs.map(({ name, label }) => `${name}: ${label}`);
    expect(names(loanOf())).toEqual(['i: Rate a unit period', 'p1: 239 payments of', 'p2: One payment']);
    const promotion = { months: 6, annualRate: '0.0699', payment: 'interest' as const };
    expect(names(loanOf({ promotion }))?.slice(1, 3)).toEqual(['p1: 6 payments of', 'p2: 233 payments of']);
  });

  it('of a loan that is all fee is not known', () => {
    expect(loanApr(loanOf(), cents(3_000_000))).toBeNull();
  });

  it('of a loan without interest, whose last payment is trued down by cents, is nothing', () => {
    expect(loanApr(loanOf({ annualRate: '0', termMonths: 36 }), cents(0))?.apr).toBe('0');
  });

  it('counts the days before the first whole month as so many thirtieths', () => {
    // 30,000 for a month and 15 days at 1 % a month: 30,000 × 1.005 × 1.01.
    const loan = loanOf({
      annualRate: '0.12',
      termMonths: 1,
      fundedOn: day('2024-05-31'),
      firstPaymentOn: day('2024-07-15'),
    });
    expect(
      exact(loanApr(loan, cents(0))?.apr ?? '0')
        .minus('0.12')
        .abs()
        .lt('0.00001'),
    ).toBe(true);
  });

  it('leaves a month without a payment out of the runs', () => {
    const promotion = { months: 6, annualRate: '0.0699', payment: 'none' as const };
    const apr = exact(loanApr(loanOf({ promotion }), cents(0))?.apr ?? '0');
    // Interest that joined the principal without interest on it for six months: a little less than the note's rate.
    expect(apr.lt('0.0699') && apr.gt('0.0695')).toBe(true);
  });

  it('is none where a negative rate pays back less than was lent', () => {
    expect(loanApr(loanOf({ annualRate: '-0.01' }), cents(0))).toBeNull();
  });
});
