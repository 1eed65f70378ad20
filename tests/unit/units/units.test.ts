import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cents, dollarsText, parseDollars, splitCents, sumCents } from '#shared/units/cents.ts';
import { addDays, addMonths, day, daysBetween, monthsBetween, parseDay } from '#shared/units/day.ts';
import { kwhText, parseKwh, wh } from '#shared/units/energy.ts';
import { decimalTextOf, Exact, exact, roundToCents, usdOf } from '#shared/units/rate.ts';

describe('cents', () => {
  it('reads money as statements print it', () => {
    for (const [text, amount] of [
      ['83.86', 8386],
      ['$1,204.5', 120450],
      ['−20.14', -2014],
      ['-20.14', -2014],
      ['20.14 CR', -2014],
      ['(3.10)', -310],
      ['.53', 53],
      ['7', 700],
    ] as const) {
      expect(parseDollars(text)).toBe(amount);
    }
    for (const text of ['', 'abc', '1.234', '12,34x', '--3', '$']) expect(parseDollars(text)).toBeNull();
  });

  it('writes and reads the same amount', () => {
    fc.assert(
      fc.property(fc.integer({ min: -1e11, max: 1e11 }), (amount) => {
        expect(parseDollars(dollarsText(cents(amount)))).toBe(amount === 0 ? 0 : amount);
      }),
      { numRuns: 1000 },
    );
  });

  it('splits a total into parts that add up to it', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -1e9, max: 1e9 }),
        fc.array(fc.integer({ min: 1, max: 1000 }), { minLength: 1, maxLength: 12 }),
        (total, weights) => {
          const parts = splitCents(cents(total), weights);
          expect(sumCents(parts)).toBe(total === 0 ? 0 : total);
        },
      ),
      { numRuns: 1000 },
    );
  });

  it('refuses a fraction', () => {
    expect(() => cents(0.5)).toThrow(RangeError);
  });

  it('rounds half away from zero, once', () => {
    expect(roundToCents(new Exact('0.125'))).toBe(13);
    expect(roundToCents(new Exact('-0.125'))).toBe(-13);
    expect(roundToCents(new Exact('0.125'), 'halfEven')).toBe(12);
    expect(roundToCents(exact('498').times(exact('0.1684')))).toBe(8386);
    expect(usdOf(cents(8386)).toString()).toBe('83.86');
  });

  it('shows a quotient without end to six decimals', () => {
    expect(decimalTextOf(new Exact(1).div(3))).toBe('0.333333');
    expect(decimalTextOf(new Exact('470.5'))).toBe('470.5');
  });
});

describe('energy', () => {
  it('reads and writes kWh', () => {
    expect(parseKwh('1,284.5')).toBe(1284500);
    expect(parseKwh('0.0005')).toBe(1);
    expect(parseKwh('−3')).toBe(-3000);
    expect(parseKwh('x')).toBeNull();
    fc.assert(
      fc.property(fc.integer({ min: -1e9, max: 1e9 }), (amount) => {
        expect(parseKwh(kwhText(wh(amount)))).toBe(amount === 0 ? 0 : amount);
      }),
    );
  });
});

describe('days', () => {
  it('knows which dates exist', () => {
    expect(parseDay('2024-02-29')).toBe('2024-02-29');
    for (const text of ['2023-02-29', '2024-13-01', '2024-1-1', '', 'soon']) expect(parseDay(text)).toBeNull();
  });

  it('adds months to the last day of a shorter month', () => {
    expect(addMonths(day('2024-01-31'), 1)).toBe('2024-02-29');
    expect(addMonths(day('2024-11-30'), 3)).toBe('2025-02-28');
    expect(addMonths(day('2024-03-15'), -3)).toBe('2023-12-15');
    expect(monthsBetween(day('2024-11-30'), day('2025-02-01'))).toBe(3);
  });

  it('counts days forth and back', () => {
    fc.assert(
      fc.property(fc.integer({ min: -20000, max: 40000 }), fc.integer({ min: -2000, max: 2000 }), (start, count) => {
        const from = addDays(day('1970-01-01'), start);
        expect(daysBetween(from, addDays(from, count))).toBe(count === 0 ? 0 : count);
      }),
      { numRuns: 1000 },
    );
  });
});
