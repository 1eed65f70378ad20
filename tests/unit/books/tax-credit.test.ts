import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { creditExpected } from '#shared/books/credit-expected.ts';
import {
  carryCredit,
  creditEntries,
  creditLine1,
  creditLinesOf,
  creditParts,
  creditStillToCome,
} from '#shared/books/tax-credit.ts';
import type { CreditCost } from '#shared/facts/finance.ts';
import { cents, sumCents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { creditOf, creditYear } from './facts.ts';

const TODAY = day('2026-12-01');
const costs = (...given: [CreditCost['treatment'], number][]): CreditCost[] =>
  given.map(([treatment, amount], index) => ({
    id: `c${index}`,
    label: treatment,
    amountCents: cents(amount),
    treatment,
    reason: null,
    placedInServiceOn: null,
    documentId: null,
  }));

describe('the tax credit', () => {
  it('goes over three returns, each using no more than its limit', () => {
    expect(
      creditLinesOf(creditOf()).map((line) => [line.taxYear, line.line13Cents, line.line15Cents, line.line16Cents]),
    ).toEqual([
      [2024, 1_107_000, 415_000, 692_000],
      [2025, 692_000, 505_000, 187_000],
      [2026, 187_000, 187_000, 0],
    ]);
  });

  it('counts what qualifies less what reduces it, and never what is left out', () => {
    expect(creditLine1(costs(['qualified', 2_750_000], ['reduction', 250_000], ['leftOut', 900_000]), '1')).toBe(
      2_500_000,
    );
    expect(creditLine1(costs(['qualified', 100_000], ['reduction', 250_000]), '1')).toBe(0);
  });

  it('counts the home’s share under 80 %, and all of it from 80 % on (26 U.S.C. 25D(e)(7))', () => {
    expect(creditLine1(costs(['qualified', 2_400_000]), '0.60')).toBe(1_440_000);
    expect(creditLine1(costs(['qualified', 2_400_000]), '0.7999')).toBe(1_919_800);
    expect(creditLine1(costs(['qualified', 2_400_000]), '0.8')).toBe(2_400_000);
  });

  it('rounds each line to whole dollars, half up', () => {
    const [line] = carryCredit(cents(0), [
      { taxYear: 2024, line1Cents: cents(3_000_150), rate: '0.30', limitCents: cents(400_049) },
    ]);
    expect(line).toMatchObject({ line1Cents: 3_000_200, line6bCents: 900_100, line14Cents: 400_000 });
  });

  it('gives at most $2,000 for a year from 2006 to 2008 (from memory)', () => {
    const [line] = carryCredit(cents(0), [
      { taxYear: 2007, line1Cents: cents(2_000_000), rate: '0.30', limitCents: cents(900_000) },
    ]);
    expect(line?.line6bCents).toBe(200_000);
  });

  it('leaves 15 and 16 unknown without a limit, and everything carried after it', () => {
    const lines = creditLinesOf(
      creditOf({ years: [creditYear(2024, 415_000, {}), creditYear(2025, null, {}), creditYear(2026, 100_000, {})] }),
    );
    expect(lines.map((line) => [line.line12Cents, line.line13Cents, line.line15Cents, line.line16Cents])).toEqual([
      [0, 1_107_000, 415_000, 692_000],
      [692_000, 692_000, null, null],
      [null, null, null, null],
    ]);
  });

  it('carries over a year that is not listed, and puts years in order', () => {
    const lines = creditLinesOf(creditOf({ years: [creditYear(2026, 900_000, {}), creditYear(2024, 415_000, {})] }));
    expect(lines.map((line) => [line.taxYear, line.line12Cents])).toEqual([
      [2024, 0],
      [2026, 692_000],
    ]);
  });

  it('adds the year placed in service when the owner has not listed it', () => {
    const lines = creditLinesOf(creditOf({ years: [] }));
    expect(lines).toMatchObject([{ taxYear: 2024, line6bCents: 1_107_000, line15Cents: null }]);
  });

  it('earns nothing when completed after 2025, whenever it was paid (P.L. 119-21 §70506)', () => {
    const credit = creditOf({ placedInServiceOn: day('2026-01-14'), years: [creditYear(2025, 500_000, {})] });
    expect(creditLinesOf(credit)).toMatchObject([{ taxYear: 2025, line1Cents: 0, line15Cents: 0, line16Cents: 0 }]);
    expect(creditStillToCome(credit, TODAY).amountCents).toBe(0);
  });

  it('is cash on the refund’s day, or on the filing’s where it only lowered the tax', () => {
    const entries = creditEntries(creditOf(), TODAY);
    expect(entries.map((entry) => [entry.date, entry.amountCents, entry.kind])).toEqual([
      ['2025-03-28', 415_000, 'refund'],
      ['2026-03-02', 505_000, 'lessTax'],
    ]);
    for (const entry of entries) expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
  });

  it('is still to come less what was received, in its three parts', () => {
    const credit = creditOf();
    expect(creditStillToCome(credit, day('2024-05-01')).amountCents).toBe(0);
    expect(creditParts(credit, day('2024-12-31'))).toEqual({
      notYetFiledCents: 1_107_000,
      awaitedCents: 0,
      carriedForwardCents: 0,
    });
    expect(creditParts(credit, day('2025-03-20'))).toEqual({
      notYetFiledCents: 0,
      awaitedCents: 415_000,
      carriedForwardCents: 692_000,
    });
    expect(creditParts(credit, TODAY)).toEqual({ notYetFiledCents: 0, awaitedCents: 0, carriedForwardCents: 187_000 });
  });

  it('is expected for planned years with a limit: the next 15 April, or tomorrow if that is past', () => {
    expect(creditExpected(creditOf(), TODAY)).toEqual([{ taxYear: 2026, on: '2027-04-15', amountCents: 187_000 }]);
    expect(creditExpected(creditOf(), day('2027-06-01'))[0]?.on).toBe('2027-06-02');
  });
});

describe('the source of a limit', () => {
  const sourceOf = (changes: Partial<ReturnType<typeof creditYear>>) => {
    const year = creditYear(2024, 415_000, { status: 'filed', filedOn: day('2025-03-10'), ...changes });
    const papers = [{ id: 'r', fileName: 'return 2024.pdf' }];
    return creditEntries(creditOf({ years: [year] }), TODAY, papers)[0]?.working.inputs[1]?.source;
  };

  it('is the kept return, else who typed it and from what', () => {
    expect(sourceOf({ documentId: 'r' })).toMatchObject({ kind: 'document', fileName: 'return 2024.pdf' });
    expect(sourceOf({ limitFrom: 'the worksheet' })).toMatchObject({
      name: 'Limit as entered by Priya, from the worksheet',
    });
    expect(sourceOf({ typedBy: null })).toMatchObject({ name: 'Limit as entered' });
  });

  it('is asked of no year that is not listed', () => {
    expect(creditEntries(creditOf({ years: [] }), TODAY)).toEqual([]);
    expect(creditExpected(creditOf({ years: [] }), TODAY)).toEqual([]);
  });
});

describe('the day on which the money is expected', () => {
  const expected = (changes: Partial<ReturnType<typeof creditYear>>, limit: number | null = 415_000) =>
    creditExpected(creditOf({ years: [creditYear(2025, limit, changes)] }), TODAY).filter(
      ({ taxYear }) => taxYear === 2025,
    );
  const before2025 = creditOf({ placedInServiceOn: day('2025-05-22') });

  it('is the day stated where one is, also when it is still to come', () => {
    const years = [creditYear(2025, 415_000, { status: 'filed', asRefund: true, refundOn: day('2027-01-20') })];
    expect(creditExpected({ ...before2025, years }, TODAY)[0]?.on).toBe('2027-01-20');
    const lessTax = [creditYear(2025, 415_000, { status: 'filed', filedOn: day('2027-02-01') })];
    expect(creditExpected({ ...before2025, years: lessTax }, TODAY)[0]?.on).toBe('2027-02-01');
    const awaited = [creditYear(2025, 415_000, { status: 'filed', filedOn: day('2026-03-01'), asRefund: true })];
    expect(creditExpected({ ...before2025, years: awaited }, TODAY)[0]?.on).toBe('2026-12-02');
  });

  it('is none without a limit, or where nothing is used', () => {
    expect(expected({}, null)).toEqual([]);
    expect(expected({}, 0)).toEqual([]);
  });
});

const anyCredit = fc
  .record({
    cost: fc.integer({ min: 0, max: 9_000_000 }),
    limits: fc.array(fc.integer({ min: 0, max: 900_000 }), { minLength: 1, maxLength: 6 }),
    received: fc.integer({ min: 0, max: 6 }),
  })
  .map(({ cost, limits, received }) =>
    creditOf({
      costs: costs(['qualified', cost]),
      years: limits.map((limit, index) =>
        creditYear(2024 + index, limit, {
          status: index < received ? 'filed' : 'planned',
          filedOn: index < received ? day(`${2025 + index}-03-01`) : null,
        }),
      ),
    }),
  );

describe('for any cost and any limits', () => {
  it('what is used and what is carried at the end come to what was earned', () => {
    fc.assert(
      fc.property(anyCredit, (credit) => {
        const lines = creditLinesOf(credit);
        const used = sumCents(lines.map((line) => line.line15Cents ?? cents(0)));
        expect(used + (lines.at(-1)?.line16Cents ?? 0)).toBe(sumCents(lines.map((line) => line.line6bCents)));
      }),
    );
  });

  it('what was received and the three parts still to come add up to what was earned, on every day', () => {
    fc.assert(
      fc.property(anyCredit, fc.integer({ min: 2024, max: 2031 }), (credit, year) => {
        const on = day(`${year}-06-30`);
        const received = sumCents(creditEntries(credit, on).map((entry) => entry.amountCents));
        const parts = creditParts(credit, on);
        const stillToCome = creditStillToCome(credit, on);
        expect(parts.notYetFiledCents + parts.awaitedCents + parts.carriedForwardCents).toBe(stillToCome.amountCents);
        expect(Math.min(parts.notYetFiledCents, parts.awaitedCents, parts.carriedForwardCents)).toBeGreaterThanOrEqual(
          0,
        );
        expect(received + stillToCome.amountCents).toBe(
          sumCents(creditLinesOf(credit).map((line) => line.line6bCents)),
        );
        expect(evaluateWorking(stillToCome.working).eq(usdOf(stillToCome.amountCents))).toBe(true);
      }),
    );
  });
});
