import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { estimateOf, expectedWh } from '#shared/metering/expected-production.ts';
import { addDays, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';

/** A thousand Wh a day in every month of a common year. */
const EVEN = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31].map((days) => wh(days * 1000));
const estimate = { monthlyWh: EVEN, switchOn: day('2024-08-14'), degradation: '0.005' };

describe('what a roof is expected to make', () => {
  test.each([
    ['a whole month, as estimated', '2025-01-01', '2025-02-01', 31_000],
    ['the days of two months, each by its own', '2025-01-30', '2025-02-03', 4_000],
    ['a leap February, its estimate over 29 days', '2024-02-01', '2024-03-01', 28_000],
    ['no days, nothing', '2025-01-30', '2025-01-30', 0],
    ['the day before the first birthday, at full strength', '2025-08-13', '2025-08-14', 1_000],
    ['the first birthday, a year older', '2025-08-14', '2025-08-15', 995],
    ['two birthdays on, twice aged', '2026-08-14', '2026-08-15', 990],
    ['before switch-on, not younger than new', '2023-08-20', '2023-08-21', 1_000],
  ])('%s', (_, from, to, expected) => {
    expect(expectedWh(estimate, day(from), day(to))).toBe(expected);
  });

  test('parts of a span add up to it, to the rounding of each', () => {
    fc.assert(
      fc.property(fc.nat(2000), fc.nat(400), fc.nat(400), (start, first, second) => {
        const from = addDays(day('2024-08-14'), start);
        const between = addDays(from, first);
        const to = addDays(between, second);
        const parts = expectedWh(estimate, from, between) + expectedWh(estimate, between, to);
        expect(Math.abs(parts - expectedWh(estimate, from, to))).toBeLessThanOrEqual(1);
      }),
      { numRuns: PROPERTY_RUNS },
    );
  });

  test('is not known without an estimate, or before the roof is on', () => {
    expect(estimateOf({ expectedMonthlyWh: null, switchOn: day('2024-08-14') }, '0.005')).toBeNull();
    expect(estimateOf({ expectedMonthlyWh: EVEN, switchOn: null }, '0.005')).toBeNull();
    expect(estimateOf({ expectedMonthlyWh: EVEN, switchOn: day('2024-08-14') }, '0.005')).toEqual(estimate);
  });
});
