import { describe, expect, it } from 'vitest';
import { aprWorking, effectiveApr, type PaymentRun } from '#shared/books/apr.ts';
import { loanApr } from '#shared/books/loan-apr.ts';
import { cents, parseDollars } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { Exact, exact, usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { loanOf } from '../unit/books/facts.ts';
import { readVectors } from './vectors.ts';

/**
 * `apr_vectors.json`: the published examples of Regulation Z, 12 CFR 1026, Appendix J (c), each to the digits it is published with. Read in a public test file
 * that transcribes the regulator's page; the fractions of unit periods were derived from its dates.
 */
type AprVector = {
  id: string;
  source: string;
  advance: string;
  payments: { count: number; amount: string; firstUnitPeriods: number; fraction: string }[];
  unitPeriodsPerYear: number;
  apr: string;
};

const vectors = readVectors<AprVector>('apr_vectors.json');

describe('The annual percentage rate agrees with Regulation Z, Appendix J', () => {
  it('has vectors to check', () => {
    expect(vectors.length).toBeGreaterThan(0);
  });

  it.each(vectors.map((vector) => [vector.source, vector] as const))('%s', (_source, vector) => {
    const terms = {
      advanceCents: usd(vector.advance),
      payments: vector.payments.map(runOf),
      unitPeriodsPerYear: vector.unitPeriodsPerYear,
    };
    const apr = effectiveApr(terms) ?? new Exact(-1);
    const places = vector.apr.split('.')[1]?.length ?? 0;
    expect(apr.times(100).toFixed(places)).toBe(vector.apr);
    expect(evaluateWorking(aprWorking(terms, apr, 'The example')).eq(usdOf(terms.advanceCents))).toBe(true);
  });

  it('has the undocumented digits of (c)(1)(i) too: 9.6857 % (own computation with another solver)', () => {
    const payments = [{ count: 24, amountCents: cents(23_000), firstUnitPeriods: 1, parts: 0, of: 1 }];
    const apr = effectiveApr({ advanceCents: cents(500_000), payments, unitPeriodsPerYear: 12 });
    expect(apr?.times(100).toFixed(4)).toBe('9.6857');
  });
});

describe('The dealer fee as a finance charge', () => {
  // A cash price of 30,000 with 8,400 of dealer fee in a note of 38,400 at 4.99 % over 300 months: 7.6310 % (own computation with another solver).
  const solar = loanOf({
    principalCents: cents(3_840_000),
    dealerFeeCents: cents(840_000),
    annualRate: '0.0499',
    termMonths: 300,
    fundedOn: day('2024-06-15'),
    firstPaymentOn: day('2024-07-15'),
  });

  it('makes 4.99 % into 7.6310 %', () => {
    expect(
      exact(loanApr(solar, solar.dealerFeeCents)?.apr ?? '0')
        .times(100)
        .toFixed(4),
    ).toBe('7.6310');
  });

  it('leaves the contract’s own rate where there is none, to what rounding the payments gathers', () => {
    const own = exact(loanApr(solar, cents(0))?.apr ?? '0');
    expect(own.minus('0.0499').abs().lt('0.000005')).toBe(true);
  });
});

/** A payment run of a vector, its fraction "19/30" as parts and whole. */
function runOf({ count, amount, firstUnitPeriods, fraction }: AprVector['payments'][number]): PaymentRun {
  const [parts = '0', of = '1'] = fraction.split('/');
  return { count, amountCents: usd(amount), firstUnitPeriods, parts: Number(parts), of: Number(of) };
}

function usd(text: string) {
  const amount = parseDollars(text);
  if (amount === null) throw new Error(`not an amount: ${text}`);
  return amount;
}
