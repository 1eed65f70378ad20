import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  compare,
  exactText,
  lesser,
  minus,
  plus,
  priced,
  pricedExactly,
  qtyOfText,
  qtyText,
  rateOf,
  roundedCents,
  roundToWhole,
  scaled,
  sizeOf,
  times,
  whOfQty,
} from '#shared/settlement/quantity.ts';
import { Exact } from '#shared/units/rate.ts';

const rates = fc
  .tuple(fc.bigInt({ min: -(10n ** 9n), max: 10n ** 9n }), fc.integer({ min: 4, max: 9 }))
  .map(([digits, scale]) => new Exact(digits.toString()).div(new Exact(10).pow(scale)).toFixed(scale));

/** Cents by whole numbers of any size, from the definition alone: half away from zero, or half to even. */
function byBigInt(n: number, d: number, rate: string, rounding: 'halfUp' | 'halfEven'): number {
  const [whole = '0', decimals = ''] = rate.split('.');
  const top = BigInt(n) * BigInt(whole + decimals);
  const bottom = BigInt(d) * 10n ** BigInt(decimals.length + 1);
  const size = top < 0n ? -top : top;
  const rest = size % bottom;
  let cents = size / bottom;
  if (2n * rest > bottom || (2n * rest === bottom && (rounding === 'halfUp' || cents % 2n === 1n))) cents += 1n;
  const signed = Number(top < 0n ? -cents : cents);
  return signed === 0 ? 0 : signed;
}

describe('quantity × rate in cents', () => {
  test.each(['halfUp', 'halfEven'] as const)(
    'whole numbers, exact decimals and the definition agree (%s)',
    (rounding) => {
      fc.assert(
        fc.property(
          fc.integer({ min: -9 * 10 ** 7, max: 9 * 10 ** 7 }),
          fc.integer({ min: 1, max: 400 }),
          rates,
          (n, d, rate) => {
            const expected = byBigInt(n, d, rate, rounding);
            expect(priced(n, d, rateOf(rate), rounding)).toBe(expected);
            expect(pricedExactly(n, d, rate, rounding)).toBe(expected);
          },
        ),
        { numRuns: 2000 },
      );
    },
  );

  test.each(['halfUp', 'halfEven'] as const)('every half cent comes out the same both ways (%s)', (rounding) => {
    // n thousandths at 0.01 over d = 20·k are n / (2·k·100) cents: ties abound.
    fc.assert(
      fc.property(
        fc.integer({ min: -5000, max: 5000 }),
        fc.integer({ min: 1, max: 40 }),
        fc.integer({ min: 0, max: 4 }),
        (half, d, scale) => {
          const rate = rateOf(new Exact(5).div(new Exact(10).pow(scale)).toFixed(scale));
          const n = half * d * 10 ** scale;
          expect(priced(n, d, rate, rounding)).toBe(byBigInt(n, d, rate.text, rounding));
          expect(pricedExactly(n, d, rate.text, rounding)).toBe(byBigInt(n, d, rate.text, rounding));
        },
      ),
    );
  });

  test('stays right where a product no longer fits a safe whole number', () => {
    const n = 123_456_789;
    for (const rate of ['0.168432112345', '1234.000000000001']) {
      expect(priced(n, 31, rateOf(rate), 'halfUp')).toBe(byBigInt(n, 31, rate, 'halfUp'));
    }
    expect(priced(1_000_000, 1, rateOf('0.123456789012'), 'halfUp')).toBe(12346);
    expect(() => priced(1000, 1, rateOf('123456789012.123456789012'), 'halfUp')).toThrow(/more than any house/);
    expect(() => priced(10 ** 12, 1, rateOf('100000'), 'halfUp')).toThrow(/more than any house/);
  });

  test('never gives a negative zero', () => {
    expect(Object.is(priced(-1, 1, rateOf('0.01'), 'halfUp'), 0)).toBe(true);
  });
});

describe('quantities', () => {
  const amounts = fc.oneof(
    fc.integer(),
    fc.maxSafeInteger(),
    fc.integer().map((value) => new Exact(value).div(7)),
  );

  test('add, subtract and compare as exact numbers, past what a safe whole number holds', () => {
    fc.assert(
      fc.property(amounts, amounts, (a, b) => {
        expect(compare(plus(a, b), plus(b, a))).toBe(0);
        expect(new Exact(plus(a, b)).eq(new Exact(a).plus(b))).toBe(true);
        expect(new Exact(minus(a, b)).eq(new Exact(a).minus(b))).toBe(true);
        expect(Math.sign(compare(a, b))).toBe(new Exact(a).cmp(b));
        expect(compare(lesser(a, b), a)).toBeLessThanOrEqual(0);
      }),
    );
  });

  test('are read from text and written back as the same number', () => {
    const texts = fc
      .tuple(fc.integer(), fc.integer({ min: 0, max: 999_999_999 }))
      .map(([whole, part]) => `${whole}.${String(part).padStart(9, '0')}`);
    fc.assert(
      fc.property(texts, (text) => {
        expect(new Exact(qtyText(qtyOfText(text))).eq(text)).toBe(true);
        expect(new Exact(exactText(qtyOfText(text))).eq(text)).toBe(true);
      }),
    );
    expect([qtyText(0), qtyText(-500), qtyText(498_500), qtyText(-1_000)]).toEqual(['0', '-0.5', '498.5', '-1']);
  });

  test('that are too large for whole numbers are multiplied exactly all the same', () => {
    const large = 3_000_000_007;
    expect(times(large, large).toString()).toBe('9000000042000000049');
    expect(exactText(times(large, large))).toBe('9000000042000000.049');
  });

  test('are scaled and rounded to whole units half away from zero', () => {
    expect(scaled(543_000, 600)).toBe(325_800);
    expect(roundToWhole(times(543_000, 600), 1000)).toBe(326_000);
    expect([
      roundToWhole(500, 1),
      roundToWhole(-500, 1),
      roundToWhole(499, 1),
      roundToWhole(new Exact('2500.5'), 1),
    ]).toEqual([1000, -1000, 0, 3000]);
  });

  test('have a size without a sign, and cents and Wh rounded half away from zero', () => {
    expect([sizeOf(-500), sizeOf(500), String(sizeOf(new Exact('-0.5')))]).toEqual([500, 500, '0.5']);
    expect([roundedCents(1230), roundedCents(1235), roundedCents(-1235), roundedCents(1234)]).toEqual([
      123, 124, -124, 123,
    ]);
    expect(roundedCents(new Exact('1234.999'))).toBe(123);
    expect([whOfQty(1234), whOfQty(new Exact('1234.5')), whOfQty(new Exact('-1234.5'))]).toEqual([1234, 1235, -1235]);
  });

  test('at a rate of more decimals than whole numbers hold are priced exactly', () => {
    // 1,000 kWh × $0.1234500000000001 is a little more than $123.45 and rounds to it; half a cent and a trace more rounds up.
    expect(priced(1_000_000, 1, rateOf('0.1234500000000001'), 'halfUp')).toBe(12_345);
    expect(priced(1000, 1, rateOf('0.0050000000000000001'), 'halfEven')).toBe(1);
    expect(priced(1000, 1, rateOf('0.005'), 'halfEven')).toBe(0);
  });
});
