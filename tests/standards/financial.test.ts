import { fv, ipmt, irr, nper, npv, pmt, ppmt, pv, rate } from 'financial';
import { describe, expect, it } from 'vitest';
import { amortize } from '#shared/books/amortize.ts';
import { effectiveApr } from '#shared/books/apr.ts';
import { days360, interestRule, levelPayment } from '#shared/books/interest.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';

/**
 * Loan arithmetic against the numpy-financial docstrings (repository of May 2025) and the npm package `financial` 0.2.4, a port of it. Both work in
 * floating point and round nothing, so a schedule rounded each month may differ from them by the cents its rounding gathers.
 */
const LOANS = [
  { principal: 200_000, rate: '0.075', months: 180 },
  { principal: 30_000, rate: '0.0699', months: 240 },
  { principal: 24_000, rate: '0.0399', months: 300 },
  { principal: 36_000, rate: '0.0549', months: 180 },
  { principal: 342_000, rate: '0.0675', months: 360 },
  { principal: 5_000, rate: '0', months: 24 },
] as const;

describe('Loan arithmetic agrees with numpy-financial and its port', () => {
  it('reproduces the documented figures with the package itself, so that it may stand as a witness', () => {
    // numpy-financial docstrings: pmt, nper, fv, pv, irr, npv, ipmt, ppmt; its test suite: rate.
    expect(pmt(0.075 / 12, 12 * 15, 200_000)).toBeCloseTo(-1854.0247200054619, 10);
    expect(nper(0.07 / 12, -150, 8000)).toBeCloseTo(64.07335, 5);
    expect(fv(0.05 / 12, 120, -100, -100)).toBeCloseTo(15692.928894335755, 8);
    expect(pv(0.05 / 12, 120, -100, 15692.93)).toBeCloseTo(-100.000671316, 8);
    expect(irr([-100, 39, 59, 55, 20])).toBeCloseTo(0.28095, 5);
    expect(irr([-100, 0, 0, 74])).toBeCloseTo(-0.0955, 4);
    expect(irr([-100, 100, 0, -7])).toBeCloseTo(-0.0833, 4);
    expect(irr([-100, 100, 0, 7])).toBeCloseTo(0.06206, 5);
    expect(irr([-5, 10.5, 1, -8, 1])).toBeCloseTo(0.0886, 4);
    expect(npv(0.08, [-40_000, 5000, 8000, 12_000, 30_000])).toBeCloseTo(3065.22267, 5);
    expect(rate(10, 0, -3500, 10_000)).toBeCloseTo(0.1107, 4);
    expect(ipmt(0.0824 / 12, 1, 12, 2500)).toBeCloseTo(-17.17, 2);
    expect(ppmt(0.0824 / 12, 1, 12, 2500)).toBeCloseTo(-200.58, 2);
  });

  it('pays 8,000 at 7 % off with 150 a month in the 65th payment: nper is 64.07335 (numpy-financial docstring)', () => {
    const level = levelPayment(cents(800_000), '0.07', 480);
    const { rows } = amortize({
      principalCents: cents(800_000),
      annualRate: '0.07',
      months: 480,
      events: [],
      extraMonthlyCents: cents(15_000 - level),
    });
    const last = rows.at(-1);
    expect(last?.number).toBe(65);
    // The 65th payment holds the 0.07335 of a payment that nper leaves, and no more than its own interest beside: within a dollar.
    const paid = (last?.paymentCents ?? 0) + (last?.extraPrincipalCents ?? 0);
    expect(Math.abs(paid - 0.07335 * 15_000)).toBeLessThanOrEqual(100);
  });

  it('finds rate(10, 0, −3500, 10000) = 0.1107 and irr([−100, 39, 59, 55, 20]) = 0.28095 as rates a unit period (numpy-financial)', () => {
    const run = (amount: number, firstUnitPeriods: number) => ({
      count: 1,
      amountCents: cents(amount * 100),
      firstUnitPeriods,
      parts: 0,
      of: 1,
    });
    const rateOf = (advance: number, payments: ReturnType<typeof run>[]) =>
      Number(effectiveApr({ advanceCents: cents(advance * 100), payments, unitPeriodsPerYear: 1 }));
    expect(rateOf(3500, [run(10_000, 10)])).toBeCloseTo(0.1107, 4);
    expect(rateOf(3500, [run(10_000, 10)])).toBeCloseTo(rate(10, 0, -3500, 10_000), 9);
    expect(rateOf(100, [run(39, 1), run(59, 2), run(55, 3), run(20, 4)])).toBeCloseTo(0.28095, 5);
    expect(rateOf(100, [run(39, 1), run(59, 2), run(55, 3), run(20, 4)])).toBeCloseTo(irr([-100, 39, 59, 55, 20]), 9);
  });

  it.each(LOANS)('leaves after each payment what fv says, within its own rounding: $principal at $rate', (loan) => {
    const i = Number(loan.rate) / 12;
    const { rows, paymentCents } = amortize({
      principalCents: cents(loan.principal * 100),
      annualRate: loan.rate,
      months: loan.months,
      events: [],
    });
    for (const row of rows.slice(0, -1)) {
      const expected = -fv(i, row.number, -paymentCents / 100, loan.principal) * 100;
      // Interest is off by half a cent a month, and what it leaves grows with the balance.
      const gathered = i === 0 ? 0 : (0.5 * ((1 + i) ** row.number - 1)) / i;
      expect(Math.abs(row.balanceCents - expected)).toBeLessThanOrEqual(gathered + 0.01);
    }
  });

  it('has the documented payment: pmt(0.075/12, 180, 200000) = −1854.0247 (numpy-financial docstring)', () => {
    expect(levelPayment(cents(20_000_000), '0.075', 180)).toBe(185_402);
  });

  it.each(LOANS)('has the level payment of the package for $principal at $rate over $months', (loan) => {
    const expected = -pmt(Number(loan.rate) / 12, loan.months, loan.principal);
    expect(levelPayment(cents(loan.principal * 100), loan.rate, loan.months)).toBe(Math.round(expected * 100));
  });

  it.each(LOANS)(
    'has the package’s interest and principal of each month within its own rounding: $principal at $rate',
    (loan) => {
      const { rows } = amortize({
        principalCents: cents(loan.principal * 100),
        annualRate: loan.rate,
        months: loan.months,
        events: [],
      });
      expect(rows).toHaveLength(loan.months);
      for (const row of rows.slice(0, -1)) {
        const interest = -ipmt(Number(loan.rate) / 12, row.number, loan.months, loan.principal) * 100;
        const principal = -ppmt(Number(loan.rate) / 12, row.number, loan.months, loan.principal) * 100;
        // Payment and interest are each off by half a cent at most, so the balance by ((1 + i)^n − 1) / i cents, and its interest by i times that.
        const bound = (1 + Number(loan.rate) / 12) ** row.number;
        expect(Math.abs(row.interestCents - interest)).toBeLessThanOrEqual(bound);
        expect(Math.abs(row.principalCents - principal)).toBeLessThanOrEqual(bound + 0.5);
      }
    },
  );

  it('has the documented schedule of 2,500 at 8.24 % over 12 months (numpy-financial ipmt docstring)', () => {
    const { rows, totalInterestCents } = amortize({
      principalCents: cents(250_000),
      annualRate: '0.0824',
      months: 12,
      events: [],
    });
    const documented = [
      { number: 1, interest: 1_717, principal: 20_058, balance: 229_942 },
      { number: 6, interest: 1_018, principal: 20_756, balance: 127_566 },
      { number: 12, interest: 149, principal: 21_626, balance: 0 },
    ];
    for (const { number, interest, principal, balance } of documented) {
      const row = rows[number - 1];
      // The docstring rounds only what it prints; the cents that months of rounding gather end in the last payment.
      const gathered = number === 12 ? 6 : 1;
      expect(Math.abs((row?.interestCents ?? 0) - interest)).toBeLessThanOrEqual(1);
      expect(Math.abs((row?.principalCents ?? 0) - principal)).toBeLessThanOrEqual(gathered);
      expect(Math.abs((row?.balanceCents ?? 0) - balance)).toBeLessThanOrEqual(gathered);
    }
    expect(Math.abs(totalInterestCents - 11_298)).toBeLessThanOrEqual(6);
  });

  it('has ppmt(0.1/12, 1, 60, 55000) = −710.25 and ipmt(0.1/12, 1, 24, 2000) = −16.67 (numpy-financial tests)', () => {
    const first = (principal: number, months: number) =>
      amortize({ principalCents: cents(principal * 100), annualRate: '0.1', months, events: [] }).rows[0];
    // 1,168.59 − 458.33 with both rounded is 710.26; without rounding 1,168.587 − 458.333 = 710.25.
    expect(first(55_000, 60)?.principalCents).toBe(71_026);
    expect(first(2_000, 24)?.interestCents).toBe(1_667);
  });

  it('accrues a 30/360 month as one twelfth of a year (own computation: 30,000 at 6.99 % is 174.75)', () => {
    const interest = interestRule('0.0699');
    expect(interest.month(cents(3_000_000))).toBe(17_475);
    expect(interest.days(cents(3_000_000), 30)).toBe(17_475);
  });

  it('counts 30 days in every month (30/360 US; common practice, no source)', () => {
    expect(days360(day('2026-01-15'), day('2026-02-15'))).toBe(30);
    expect(days360(day('2026-01-31'), day('2026-02-28'))).toBe(30);
    expect(days360(day('2026-02-28'), day('2026-03-31'))).toBe(30);
    expect(days360(day('2026-01-15'), day('2027-01-15'))).toBe(360);
    expect(days360(day('2026-01-15'), day('2026-01-31'))).toBe(15);
  });
});
