import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import { wh } from '#shared/units/energy.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { check } from './built-checks.ts';

/** A house whose estimate is 1,000 kWh for the first cycle's 30 days and the same for every day of the year, and which made so much. */
function making(
  kwh: number,
  facts = buildHousehold({ change: (cycle) => ({ ...cycle, productionKwh: kwh }) }),
): HouseholdFacts {
  const even = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31].map((days) => wh(days * 33_334 - days));
  return { ...facts, house: { ...facts.house, expectedMonthlyWh: even } };
}

const found = (facts: HouseholdFacts, index = 0) => check(facts, index, 'productionExpected:');

describe('production against the estimate', () => {
  test.each([
    [1000, 'agrees'],
    [750, 'agrees'],
    [749, 'differs'],
    [1250, 'differs'],
    [1249, 'agrees'],
  ])('of 999.99 kWh: %i kWh made %s, a quarter either way', (kwh, verdict) => {
    const one = found(making(kwh));
    expect([one.verdict, one.found]).toEqual([verdict, '999.99']);
  });

  test('in a dark month it may lie apart by 15 % of an average month’s days', () => {
    // Expected 100 kWh of December’s 31 days; the other months make 12,000, so that 30 days are about 995 kWh and 15 % of them 149.
    const facts = making(0);
    const dark = facts.house.expectedMonthlyWh?.map((_, at) => wh(at === 5 || at === 6 ? 100_000 : 1_200_000)) ?? [];
    const one = found({ ...facts, house: { ...facts.house, expectedMonthlyWh: dark } });
    expect(one.verdict).toBe('agrees');
    expect(Number(one.tolerance)).toBeGreaterThan(140);
  });

  test('too little says by how much and, without a file, looks no further', () => {
    const one = found(making(600));
    expect(one.cause).toBe('Made 40 % below the estimate of 1,000 kWh.');
    expect(one.advice).toMatch(/licensed electrician/);
  });

  test('too little names the days of the file that stood still beside days that made something', () => {
    const facts = making(
      600,
      buildHousehold({
        intervals: { channels: ['production', 'monitor'], minutes: 60 },
        change: (cycle) => ({ ...cycle, productionKwh: 600 }),
      }),
    );
    const still = new Set(['2025-06-20', '2025-06-21', '2025-06-22', '2025-06-25', '2025-06-28', '2025-07-01']);
    const dead = {
      ...facts,
      intervals: facts.intervals.map((one) =>
        one.channel === 'production' && still.has(one.day) ? { ...one, values: one.values.map(() => 0) } : one,
      ),
    };
    const one = found(dead);
    expect(one.cause).toMatch(
      /Next to nothing on 6 days: 20 Jun, 21 Jun, 22 Jun, 25 Jun, 28 Jun and more\. The monitoring counts 600 kWh\.$/,
    );
  });

  test('too little on every day alike is snow, shade, dirt or a part that stands still', () => {
    const facts = making(
      600,
      buildHousehold({
        intervals: { channels: ['monitor'], minutes: 60 },
        change: (cycle) => ({ ...cycle, productionKwh: 600 }),
      }),
    );
    const missing = { ...facts, intervals: facts.intervals.filter((one) => one.day !== '2025-06-20') };
    expect(found(missing).cause).toMatch(/No day of the file stands out.*\.$/);
  });

  test('days of the file without a reading are no still days', () => {
    const facts = making(
      600,
      buildHousehold({
        intervals: { channels: ['monitor'], minutes: 60 },
        change: (cycle) => ({ ...cycle, productionKwh: 600 }),
      }),
    );
    const silent = {
      ...facts,
      intervals: facts.intervals.map((one) =>
        one.day === '2025-06-20' ? { ...one, values: one.values.map(() => null) } : one,
      ),
    };
    expect(found(silent).cause).toMatch(/No day of the file stands out/);
  });

  test('the monitoring’s count is told beside it only where its file is complete', () => {
    const facts = making(
      600,
      buildHousehold({
        intervals: { channels: ['production'], minutes: 60 },
        change: (cycle) => ({ ...cycle, productionKwh: 600 }),
      }),
    );
    expect(found(facts).cause).toMatch(/No day of the file stands out.*one string or inverter less\.$/);
  });

  test('a single day that stood still is named by itself', () => {
    const facts = making(
      600,
      buildHousehold({
        intervals: { channels: ['production'], minutes: 60 },
        change: (cycle) => ({ ...cycle, productionKwh: 600 }),
      }),
    );
    const dead = {
      ...facts,
      intervals: facts.intervals.map((one) =>
        one.day === '2025-06-20' ? { ...one, values: one.values.map(() => 0) } : one,
      ),
    };
    expect(found(dead).cause).toMatch(/Next to nothing on 1 day: 20 Jun\.$/);
  });

  test('too much points at the multiplier and at the estimate', () => {
    expect(found(making(2000)).cause).toMatch(
      /^Made 100 % above the estimate of 1,000 kWh\. A production meter’s multiplier/,
    );
  });

  test('an estimate of nothing gives no per cent', () => {
    const facts = making(600);
    const none = { ...facts, house: { ...facts.house, expectedMonthlyWh: Array.from({ length: 12 }, () => wh(0)) } };
    expect(found(none).cause).toMatch(/^Made above the estimate of 0 kWh\./);
  });

  test('ages with the roof: the second year is expected to make half a per cent less', () => {
    const facts = making(1000, buildHousehold({ cycles: 13, change: (cycle) => ({ ...cycle, productionKwh: 1000 }) }));
    expect(found(facts, 12).found).toBe('994.99');
  });

  test('is nothing to compare without the production or without an estimate', () => {
    const facts = making(1000);
    const without = {
      ...facts,
      statements: facts.statements.map((one) => ({
        ...one,
        productionWh: null,
        reads: one.reads.filter((read) => read.channel !== 'production'),
      })),
    };
    expect(found(without).verdict).toBe('nothing-to-compare');
    const none = found({ ...facts, house: { ...facts.house, expectedMonthlyWh: null } });
    expect([none.verdict, none.stated]).toEqual(['nothing-to-compare', '1000']);
  });
});
