import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { IntervalDay } from '#shared/facts/papers.ts';
import { addDays, type Day, day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { type SunlitFile, sunlitFile } from '#tests/support/sunlit-file.ts';
import { check, checksOf } from './built-checks.ts';

const PLACE = { latitude: 41.2, longitude: -72.1 };

function file(from: Day, change: Partial<SunlitFile> = {}): IntervalDay[] {
  return sunlitFile({
    channel: 'production',
    from,
    to: addDays(from, 31),
    minutes: 15,
    place: PLACE,
    timeZone: 'America/New_York',
    watts: 9000,
    hoursAhead: 0,
    ...change,
  });
}

function house(start: string, change: Partial<SunlitFile> = {}): HouseholdFacts {
  const from = day(start);
  return { ...buildHousehold({ start: from, cycles: 1 }), intervals: file(from, change) };
}

/** One step of the first day with other energy in it. */
function withStep(facts: HouseholdFacts, at: number, wh: number | null): HouseholdFacts {
  const [first, ...others] = facts.intervals;
  if (!first) throw new Error('no intervals');
  return {
    ...facts,
    intervals: [{ ...first, values: first.values.map((old, i) => (i === at ? wh : old)) }, ...others],
  };
}

const found = (facts: HouseholdFacts, channel = 'production') => check(facts, 0, `productionAtNight:${channel}`);

describe('production while the sun is down', () => {
  test.each(['2025-06-14', '2025-12-14', '2026-03-01', '2025-10-20'])(
    'is nothing in a file with the right clock, clock changes included: from %s',
    (start) => {
      const one = found(house(start));
      expect([one.verdict, one.stated]).toEqual(['agrees', '0']);
    },
  );

  test.each([
    ['2025-06-14', -1, /The file’s clock is 1 hour behind: looks like daylight-saving time left out\./],
    ['2025-12-14', 1, /The file’s clock is 1 hour ahead: looks like daylight-saving time kept on past its end\./],
    ['2025-06-14', 4, /The file’s clock is 4 hours ahead: looks like UTC taken for local time\./],
    ['2025-12-14', 5, /The file’s clock is 5 hours ahead: looks like UTC taken for local time\./],
    ['2025-06-14', 3, /The file’s clock is 3 hours ahead\./],
    ['2025-06-14', -12, /The file’s clock is 12 hours behind\./],
  ])('from %s with the clock %i hours off is found by trying', (start, hoursAhead, words) => {
    const one = found(house(start, { hoursAhead }));
    expect(one.verdict).toBe('differs');
    expect(one.cause).toMatch(words);
    expect(one.advice).toMatch(/upload the file again/);
  });

  test('is told of the monitoring too, by its own file', () => {
    const facts = house('2025-06-14', { channel: 'monitor', hoursAhead: 4 });
    expect(checksOf(facts, 0).filter((one) => one.check === 'productionAtNight').length).toBe(1);
    expect(found(facts, 'monitor').title).toMatch(/monitoring file$/);
    expect(found(facts, 'monitor').verdict).toBe('differs');
  });

  test('a stray reading at midnight is no clock: no whole number of hours explains it', () => {
    const one = found(withStep(house('2025-06-14'), 2, 2500));
    expect([one.verdict, one.stated]).toEqual(['differs', '2.5']);
    expect(one.cause).toMatch(/^2\.5 kWh in the dark on 1 day, the first 14 Jun 2025\. No whole number of hours/);
  });

  test('below half a per cent of the nameplate it is a sensor’s idle count: 57.4 W of 11.48 kW', () => {
    // 11,480 W × 0.5 % × a quarter-hour = 14.35 Wh.
    expect(found(withStep(house('2025-06-14'), 2, 14)).verdict).toBe('agrees');
    expect(found(withStep(house('2025-06-14'), 2, 15)).stated).toBe('0.015');
  });

  test('goes by the inverters’ rating where the modules are not known, and by the highest step where neither is', () => {
    const facts = house('2025-06-14');
    const noModules = { ...facts, house: { ...facts.house, arrays: [] } };
    // 9,600 W × 0.5 % × a quarter-hour = 12 Wh.
    expect(found(withStep(noModules, 2, 11)).verdict).toBe('agrees');
    expect(found(withStep(noModules, 2, 12)).verdict).toBe('differs');
    const neither = { ...noModules, house: { ...noModules.house, inverterAcWatts: null } };
    // The brightest quarter-hour makes a little under 2,160 Wh; 0.5 % of it is more than 10.
    expect(found(withStep(neither, 2, 10)).verdict).toBe('agrees');
    expect(found(withStep(neither, 2, 11)).verdict).toBe('differs');
    expect(found(withStep(neither, 2, null)).verdict).toBe('agrees');
  });

  test('a step counts from one step after the sun is down: 20:28 on 14 June, so from a quarter to nine', () => {
    // The step from 20:30 is dark but within one step of light; so is the one from 20:15.
    expect(found(withStep(house('2025-06-14'), 82, 500)).verdict).toBe('agrees');
    expect(found(withStep(house('2025-06-14'), 83, 500)).stated).toBe('0.5');
  });

  test('a missing reading, a missing day and a night of zeros count for nothing', () => {
    const facts = withStep(house('2025-06-14'), 2, null);
    const gappy = { ...facts, intervals: facts.intervals.filter((_, at) => at !== 4) };
    expect(found(gappy).verdict).toBe('agrees');
    const zeros = { ...facts, intervals: facts.intervals.map((one) => ({ ...one, values: one.values.map(() => 0) })) };
    expect(found(zeros).verdict).toBe('agrees');
  });

  test('has nothing to compare without coordinates, and asks for the place', () => {
    const facts = house('2025-06-14');
    const one = found({ ...facts, house: { ...facts.house, latitude: null } });
    expect([one.verdict, one.advice]).toEqual(['nothing-to-compare', 'Enter the house’s place in set-up.']);
  });

  test('has nothing to compare where steps are longer than an hour, and is not asked without a file', () => {
    const daily = buildHousehold({ intervals: { channels: ['production'], minutes: 1440 } });
    expect(found(daily).verdict).toBe('nothing-to-compare');
    expect(checksOf(buildHousehold(), 0).some((one) => one.check === 'productionAtNight')).toBe(false);
  });
});
