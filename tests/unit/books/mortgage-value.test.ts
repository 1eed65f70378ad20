import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { amortize } from '#shared/books/amortize.ts';
import {
  amortizationMidpoint,
  lastPaymentBy,
  mortgageBalanceAfter,
  mortgageBook,
  paymentReaching,
} from '#shared/books/mortgage-balance.ts';
import { insuranceEnds } from '#shared/books/mortgage-ends.ts';
import { governingEnd, insuranceEntries } from '#shared/books/mortgage-insurance.ts';
import { premiumOn } from '#shared/books/mortgage-premium.ts';
import { latestValue, ltvPercent, monthsSinceStart, mortgageBalanceOn } from '#shared/books/mortgage-value.ts';
import type { Appraisal, LenderBalance } from '#shared/facts/finance.ts';
import { cents, sumCents } from '#shared/units/cents.ts';
import { addMonths, day } from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { mortgageOf } from './facts.ts';

const FAR = day('2100-01-01');
const stated = (on: string, dollars: number): LenderBalance => ({
  id: on,
  on: day(on),
  balanceCents: cents(dollars * 100),
  documentId: null,
});
const valued = (on: string, dollars: number, how: Appraisal['how'] = 'appraisal'): Appraisal => ({
  id: on,
  on: day(on),
  valueCents: cents(dollars * 100),
  how,
  documentId: null,
});

describe('the mortgage as paid', () => {
  it('is its schedule where nothing else is stated, extra principal included', () => {
    fc.assert(
      fc.property(
        fc.record({
          principalCents: fc.integer({ min: 1_000_000, max: 90_000_000 }),
          rate: fc.integer({ min: 0, max: 900 }),
          termMonths: fc.integer({ min: 12, max: 360 }),
          extra: fc.integer({ min: 0, max: 60_000 }),
        }),
        ({ principalCents, rate, termMonths, extra }) => {
          const annualRate = `0.${String(rate).padStart(4, '0')}`;
          const mortgage = mortgageOf({
            principalCents: cents(principalCents),
            annualRate,
            termMonths,
            extraPrincipalMonthlyCents: cents(extra),
          });
          const plain = amortize({
            principalCents: cents(principalCents),
            annualRate,
            months: termMonths,
            events: [],
            extraMonthlyCents: cents(extra),
          });
          expect(mortgageBook(mortgage).actual.map(({ stated: _s, driftCents: _d, ...row }) => row)).toEqual(
            plain.rows,
          );
        },
      ),
      { numRuns: 100 },
    );
  });

  it('takes a stated balance in the place of the computed one from its month on, and shows the drift', () => {
    const mortgage = mortgageOf({ balances: [stated('2025-06-15', 330_000)] });
    const plain = mortgageBook(mortgageOf()).actual;
    const row = mortgageBook(mortgage).actual[12];
    expect(row).toMatchObject({ number: 13, balanceCents: 33_000_000 });
    expect(row?.driftCents).toBe(33_000_000 - (plain[12]?.balanceCents ?? 0));
    expect(mortgageBook(mortgage).actual.slice(0, 12)).toEqual(plain.slice(0, 12));
    // The next month's interest is on the stated balance: 330,000 × 6.75 % / 12 = 1,856.25.
    expect(mortgageBook(mortgage).actual[13]?.interestCents).toBe(185_625);
    expect(mortgageBook(mortgage).actual.at(-1)?.balanceCents).toBe(0);
  });

  it('takes the later of two statements in one month, and one before the first payment as the opening', () => {
    const twice = mortgageOf({ balances: [stated('2025-06-28', 329_000), stated('2025-06-02', 330_000)] });
    expect(mortgageBalanceAfter(twice, 13)).toBe(32_900_000);
    const early = mortgageOf({ balances: [stated('2024-05-20', 341_000), stated('2024-05-03', 342_000)] });
    expect(mortgageBalanceAfter(early, 0)).toBe(34_100_000);
    expect(mortgageBalanceOn(early, day('2024-05-10')).amountCents).toBe(34_200_000);
    expect(mortgageBalanceOn(early, day('2024-05-25')).amountCents).toBe(34_100_000);
  });

  it('takes either of two statements of one day, and reaches every share at once where nothing was ever owed', () => {
    const same = mortgageOf({ balances: [stated('2025-06-15', 330_000), stated('2025-06-15', 330_000)] });
    expect(mortgageBalanceAfter(same, 13)).toBe(33_000_000);
    const none = mortgageOf({ balances: [stated('2024-05-20', 0)] });
    expect(mortgageBook(none).actual).toEqual([]);
    expect(paymentReaching(none, mortgageBook(none).actual, '0.80')).toBe(0);
    expect(mortgageBalanceAfter(none, 5)).toBe(0);
  });

  it('counts a payment on its due day, whatever the day of the month', () => {
    const mid = mortgageOf({ firstPaymentOn: day('2024-06-15') });
    expect([day('2024-06-14'), day('2024-06-15'), day('2024-07-14')].map((on) => lastPaymentBy(mid, on))).toEqual([
      0, 1, 1,
    ]);
    expect(lastPaymentBy(mid, FAR)).toBe(360);
  });

  it('has the middle of an odd term half a month after a payment', () => {
    expect(amortizationMidpoint(mortgageOf({ termMonths: 181 }))).toEqual({
      on: '2031-11-16',
      payment: 90,
      firstOfNextMonth: '2031-12-01',
    });
  });

  it('ends where a statement says nothing is owed', () => {
    const paid = mortgageOf({ balances: [stated('2026-02-10', 0)] });
    expect(mortgageBook(paid).actual).toHaveLength(21);
    expect(mortgageBalanceAfter(paid, 300)).toBe(0);
  });

  it('brings the request date forward by what the lender states, and never the automatic one', () => {
    const ahead = mortgageOf({ balances: [stated('2026-01-20', 288_000)] });
    const ends = insuranceEnds(ahead);
    expect(ends[0]).toMatchObject({ rule: 'request80', on: '2026-01-01', by: 'actual payments' });
    expect(ends[1]).toMatchObject({ rule: 'automatic78', on: '2035-12-01', source: '12 U.S.C. 4902(b)' });
    expect(paymentReaching(ahead, mortgageBook(ahead).actual, '0.80')).toBe(20);
  });
});

describe('the balance on a day', () => {
  it('is the principal, or the last statement by then, less the principal of the payments since', () => {
    const mortgage = mortgageOf({ balances: [stated('2025-06-15', 330_000)] });
    for (const on of ['2024-05-01', '2024-06-01', '2025-06-10', '2025-06-15', '2025-07-01', '2029-01-31']) {
      const figure = mortgageBalanceOn(mortgage, day(on));
      expect(evaluateWorking(figure.working).eq(usdOf(figure.amountCents)), on).toBe(true);
    }
    expect(mortgageBalanceOn(mortgage, day('2025-06-10')).amountCents).toBe(mortgageBalanceAfter(mortgageOf(), 13));
    expect(mortgageBalanceOn(mortgage, day('2025-06-15')).amountCents).toBe(33_000_000);
    expect(mortgageBalanceOn(mortgage, day('2025-07-01')).amountCents).toBe(mortgageBalanceAfter(mortgage, 14));
  });

  it('names the paper it was typed from', () => {
    const balance = { ...stated('2025-06-15', 330_000), documentId: 'd1' };
    const papers = [{ id: 'd1', fileName: 'statement.pdf' }];
    const figure = mortgageBalanceOn(mortgageOf({ balances: [balance] }), day('2025-08-01'), papers);
    expect(figure.working.inputs[0]?.source).toMatchObject({ kind: 'document', documentId: 'd1' });
  });
});

describe('the value of the home', () => {
  const mortgage = mortgageOf({
    appraisals: [
      valued('2026-01-10', 450_000, 'ownEstimate'),
      valued('2025-03-01', 420_000),
      valued('2024-09-01', 390_000),
      valued('2027-01-01', 1),
    ],
  });

  it('is the last one stated by the day; the owner’s own estimate is no evidence', () => {
    expect(latestValue(mortgage, day('2026-06-01'))?.valueCents).toBe(45_000_000);
    expect(latestValue(mortgage, day('2026-06-01'), true)?.valueCents).toBe(42_000_000);
    expect(latestValue(mortgage, day('2024-08-31'))).toBeNull();
  });

  it('sets the balance in percent, to two decimals and never downwards', () => {
    expect(ltvPercent(cents(28_800_000), cents(36_000_000))).toBe('80');
    expect(ltvPercent(cents(28_800_001), cents(36_000_000))).toBe('80.01');
  });

  it('counts whole months since the loan began, a month before its first payment', () => {
    expect(monthsSinceStart(mortgageOf(), day('2024-05-01'))).toBe(0);
    expect(monthsSinceStart(mortgageOf(), day('2026-04-30'))).toBe(23);
    expect(monthsSinceStart(mortgageOf(), day('2026-05-01'))).toBe(24);
    expect(monthsSinceStart(mortgageOf(), day('2024-04-30'))).toBe(-1);
    const mid = mortgageOf({ firstPaymentOn: day('2024-06-15') });
    expect(monthsSinceStart(mid, day('2026-05-14'))).toBe(23);
    expect(monthsSinceStart(mid, day('2026-05-15'))).toBe(24);
  });
});

describe('what each end rests on', () => {
  it('is the share of the original value in whole cents downwards, and its working says so', () => {
    for (const value of [36_000_000, 36_000_033, 35_999_999, 1]) {
      for (const end of insuranceEnds(mortgageOf({ originalValueCents: cents(value) }))) {
        if (end.most === null) continue;
        expect(evaluateWorking(end.most.working).eq(usdOf(end.most.amountCents))).toBe(true);
        const share = end.rule === 'request80' ? 80 : 78;
        expect(end.most.amountCents * 100).toBeLessThanOrEqual(value * share);
        expect((end.most.amountCents + 1) * 100).toBeGreaterThan(value * share);
      }
    }
  });

  it('names its section, and none for the owner’s own day or an FHA loan', () => {
    expect(insuranceEnds(mortgageOf()).map((end) => end.source)).toEqual([
      '12 U.S.C. 4901(2), 4902(a)',
      '12 U.S.C. 4902(b)',
      '12 U.S.C. 4902(c)',
      null,
    ]);
    for (const kind of ['fha', 'va'] as const) {
      expect(insuranceEnds(mortgageOf({ kind })).every((end) => end.source === null && end.on === null)).toBe(true);
    }
    expect(insuranceEnds(mortgageOf({ kind: 'va' }))[0]?.words).toContain('no monthly mortgage insurance');
  });

  it('never comes where the schedule does not reach it, and is at the start where the loan began below', () => {
    const low = mortgageOf({ principalCents: cents(20_000_000) });
    expect(insuranceEnds(low)[0]).toMatchObject({ payment: 0 });
    expect(governingEnd(low).payment).toBe(0);
    expect(insuranceEntries(low, FAR)).toEqual([]);
  });
});

describe('the end that counts', () => {
  it('is the prudent one of a mortgage without insurance stated, and the appreciation’s when it is chosen and dated', () => {
    expect(governingEnd(mortgageOf({ insurance: null })).rule).toBe('request80');
    const chosen = mortgageOf({}, { endRule: 'appreciation', appreciationOn: day('2036-02-10') });
    expect(governingEnd(chosen)).toMatchObject({ rule: 'appreciation', payment: 141 });
  });

  it('of an FHA loan at or under 90 % is no later than its term', () => {
    const short = mortgageOf({ kind: 'fha', termMonths: 120, principalCents: cents(30_000_000) });
    expect(governingEnd(short).payment).toBe(120);
  });
});

describe('a premium that changes', () => {
  const premiums = [
    { from: day('2027-01-01'), premiumMonthlyCents: cents(9_000) },
    { from: day('2026-01-01'), premiumMonthlyCents: cents(12_000) },
  ];

  it('is the last that has begun, else the one it started with', () => {
    const mortgage = mortgageOf({ premiums });
    expect(premiumOn(mortgage, day('2025-12-31'))).toBe(14_250);
    expect(premiumOn(mortgage, day('2026-01-01'))).toBe(12_000);
    expect(premiumOn(mortgage, day('2030-01-01'))).toBe(9_000);
    expect(premiumOn(mortgageOf({ insurance: null, premiums }), day('2030-01-01'))).toBe(0);
  });

  it('of nothing makes no entry', () => {
    const free = mortgageOf({ premiums: [{ from: day('2026-01-01'), premiumMonthlyCents: cents(0) }] });
    expect(insuranceEntries(free, FAR).map((entry) => entry.date)).toEqual([
      '2025-09-01',
      '2025-10-01',
      '2025-11-01',
      '2025-12-01',
    ]);
  });

  it('sums as each month’s own premium, and a month without one has no entry', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.integer({ min: 0, max: 140 }), fc.integer({ min: 0, max: 20_000 })), { maxLength: 6 }),
        (changes) => {
          const mortgage = mortgageOf({
            premiums: changes.map(([months, amount]) => ({
              from: addMonths(day('2024-06-01'), months),
              premiumMonthlyCents: cents(amount),
            })),
          });
          const entries = insuranceEntries(mortgage, FAR);
          const months = Array.from({ length: 127 - 15 }, (_, index) => addMonths(day('2025-09-01'), index));
          expect(sumCents(entries.map((entry) => entry.amountCents))).toBe(
            sumCents(months.map((on) => premiumOn(mortgage, on))),
          );
          expect(entries.every((entry) => entry.amountCents > 0)).toBe(true);
          for (const entry of entries) {
            expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
          }
        },
      ),
      { numRuns: 60 },
    );
  });
});
