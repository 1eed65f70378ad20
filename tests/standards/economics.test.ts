import { irr as packageIrr, npv as packageNpv } from 'financial';
import { describe, expect, it } from 'vitest';
import {
  capitalRecovery,
  paybackYear,
  paybackYears,
  presentValue,
  rateOfReturn,
  ratesOfReturn,
  singlePresentValue,
  uniformPresentValue,
} from '#shared/position/economics.ts';
import { Exact, exact } from '#shared/units/rate.ts';

const sums = (values: readonly number[]) => values.map((value) => new Exact(value));
const fixed = (value: Exact | null, decimals: number) => value?.toDecimalPlaces(decimals).toNumber() ?? null;

/** 12,000 spent at once, 1,500 at the end of each of so many years. */
const saving = (years: number) => sums([-12_000, ...Array.from({ length: years }, () => 1_500)]);

describe('discount factors', () => {
  // NIST Handbook 135 (Fuller and Petersen, 1995) and its supplement NISTIR 85-3273 define both factors and print such tables; the tables themselves were not at
  // hand, so the digits are computed from the definitions.
  it.each([
    [1, 0.9709, 0.971],
    [5, 0.8626, 4.58],
    [10, 0.7441, 8.53],
    [20, 0.5537, 14.877],
    [25, 0.4776, 17.413],
    [30, 0.412, 19.6],
  ])('at 3 %% over %i years the single one is %f and the uniform one %f', (years, single, uniform) => {
    expect(fixed(singlePresentValue(exact('0.03'), years), 4)).toBe(single);
    expect(fixed(uniformPresentValue(exact('0.03'), years), 3)).toBe(uniform);
  });

  it('have as uniform factor the sum of the single ones, and the number of years at a rate of zero', () => {
    const rate = exact('0.047');
    const added = Array.from({ length: 17 }, (_, at) => singlePresentValue(rate, at + 1));
    expect(fixed(uniformPresentValue(rate, 17), 20)).toBe(
      fixed(
        added.reduce((sum, one) => sum.plus(one), new Exact(0)),
        20,
      ),
    );
    expect(uniformPresentValue(new Exact(0), 17).toNumber()).toBe(17);
  });

  it('capital recovery at 5 % over 25 years is 0.0709525 (definition d(1 + d)^n / ((1 + d)^n − 1), from memory; digits computed)', () => {
    expect(fixed(capitalRecovery(exact('0.05'), 25), 7)).toBe(0.0709525);
  });
});

describe('payback (ASTM E1121: when cumulative discounted net benefits just pay off the initial cost; digits computed from the definition)', () => {
  it('is 8 years for 12,000 and 1,500 a year without discount', () => {
    expect(paybackYears(new Exact(0), saving(20))?.toNumber()).toBe(8);
    expect(paybackYear(new Exact(0), saving(20))).toBe(8);
  });

  it.each([
    ['0.03', 10, 9.2875, 9.2844],
    ['0.05', 11, 10.4759, 10.4698],
  ])('at %s is reached in year %i, by share at %f, by the closed form at %f', (rate, year, interpolated, closed) => {
    expect(paybackYear(exact(rate), saving(20))).toBe(year);
    expect(fixed(paybackYears(exact(rate), saving(20)), 4)).toBe(interpolated);
    // n = −ln(1 − C·d / A) / ln(1 + d), for a level saving.
    const whole = new Exact(1).minus(exact(rate).times(12_000).div(1_500)).ln().negated();
    expect(fixed(whole.div(exact(rate).plus(1).ln()), 4)).toBe(closed);
  });

  it('is the lasting one: a later loss moves it, and one that is never made good leaves none', () => {
    expect(paybackYears(new Exact(0), sums([-100, 150, -100, 100]))?.toNumber()).toBe(2.5);
    expect(paybackYears(new Exact(0), sums([-100, 150, -100]))).toBeNull();
    expect(paybackYears(new Exact(0), sums([5, 5]))?.toNumber()).toBe(0);
    expect(paybackYear(new Exact(0), sums([-100]))).toBeNull();
  });
});

describe('net present value and internal rate of return', () => {
  it.each([
    ['0.03', 10316.21],
    ['0.05', 6693.32],
  ])('the saving of 20 years at %s is worth %f (computed from the definition)', (rate, value) => {
    expect(fixed(presentValue(exact(rate), saving(20)), 2)).toBe(value);
  });

  it('npv(0.08, [−40000, 5000, 8000, 12000, 30000]) is 3065.22267 (numpy-financial docstring; the first sum undiscounted)', () => {
    expect(fixed(presentValue(exact('0.08'), sums([-40_000, 5_000, 8_000, 12_000, 30_000])), 5)).toBe(3065.22267);
  });

  it('the saving of 20 years returns 10.9298 % (computed from the definition)', () => {
    expect(fixed(rateOfReturn(saving(20)), 6)).toBe(0.109298);
  });

  // numpy-financial docstrings of irr.
  it.each([
    [[-100, 39, 59, 55, 20], 5, 0.28095],
    [[-100, 0, 0, 74], 4, -0.0955],
    [[-100, 100, 0, -7], 4, -0.0833],
    [[-100, 100, 0, 7], 5, 0.06206],
    [[-5, 10.5, 1, -8, 1], 4, 0.0886],
  ])('irr(%j) is among the rates to %i decimals: %f', (flows, decimals, rate) => {
    expect(ratesOfReturn(sums(flows)).map((one) => fixed(one, decimals))).toContain(rate);
  });

  it('gives no rate where none or several fit', () => {
    expect(ratesOfReturn(sums([-100, 230, -132])).map((one) => fixed(one, 6))).toEqual([0.1, 0.2]);
    expect(rateOfReturn(sums([-100, 230, -132]))).toBeNull();
    expect(rateOfReturn(sums([-100]))).toBeNull();
    expect(rateOfReturn(sums([0, 0]))).toBeNull();
  });

  it.each([
    [[-30_000, 2_100, 2_150, 9_900, 2_200, 2_250, 2_300, 2_400, 2_500, 2_600, 2_700, 2_800, 2_900, 3_000]],
    [[-12_000, ...Array.from({ length: 25 }, (_, at) => 900 + 25 * at)]],
    [[-5_400, 4_000, 1_200, 900, 800]],
  ])('agrees with the package `financial` 0.2.4 (a port of numpy-financial) on %j', (flows) => {
    expect(rateOfReturn(sums(flows))?.toNumber()).toBeCloseTo(packageIrr(flows), 10);
    for (const rate of [0.01, 0.03, 0.085]) {
      expect(presentValue(new Exact(rate), sums(flows)).toNumber()).toBeCloseTo(packageNpv(rate, flows), 6);
    }
  });
});

describe('levelized cost of a kWh', () => {
  // NREL/TP-462-5173 (Short, Packey and Holt, March 1995): present worth of costs over discounted output; its own numeric examples could not be checked, so the
  // digits are computed from the definition.
  const costs = sums([24_000, ...Array.from({ length: 25 }, () => 150)]);
  const output = (kept: string) => [
    new Exact(0),
    ...Array.from({ length: 25 }, (_, at) => exact(kept).pow(at).times(9_000)),
  ];
  const rate = exact('0.05');

  it.each([
    ['0.995', 0.215809],
    ['1', 0.205873],
  ])('24,000 and 150 a year over 9,000 kWh that keep %s a year, 25 years at 5 %%, is %f', (kept, expected) => {
    expect(fixed(presentValue(rate, costs).div(presentValue(rate, output(kept))), 6)).toBe(expected);
  });

  it('has the present worths it is made of: 26,114.09 over 121,005.477 kWh', () => {
    expect(fixed(presentValue(rate, costs), 2)).toBe(26114.09);
    expect(fixed(presentValue(rate, output('0.995')), 3)).toBe(121005.477);
  });

  it('without degradation or upkeep is the cost times the capital recovery factor over a year’s output', () => {
    const plain = presentValue(rate, sums([24_000])).div(presentValue(rate, output('1')));
    expect(fixed(plain, 12)).toBe(fixed(capitalRecovery(rate, 25).times(24_000).div(9_000), 12));
  });
});
