import { getTimes } from 'suncalc';
import { describe, expect, test } from 'vitest';
import { hoursFromUtc, lightsBetween, midnights, placeOf, sunIsUp } from '#shared/metering/sun.ts';
import { day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';

const HARBOUR = { latitude: 41.2, longitude: -72.1 };
const MINUTE = 60_000;
const HOUR = 60 * MINUTE;

describe('the sun over the house', () => {
  test.each([
    [HARBOUR, '2026-03-20'],
    [HARBOUR, '2026-12-21'],
    [{ latitude: 64.8, longitude: -147.7 }, '2026-06-10'],
    [{ latitude: -33.9, longitude: 151.2 }, '2026-01-15'],
  ])('is down a minute before it rises and up a minute after: %o on %s', (place, on) => {
    const { sunrise, sunset } = getTimes(new Date(`${on}T12:00:00Z`), place.latitude, place.longitude);
    if (sunrise === null || sunset === null) throw new Error('a day without sunrise');
    expect(sunIsUp(place, sunrise.getTime() - MINUTE)).toBe(false);
    expect(sunIsUp(place, sunrise.getTime() + MINUTE)).toBe(true);
    expect(sunIsUp(place, sunset.getTime() - MINUTE)).toBe(true);
    expect(sunIsUp(place, sunset.getTime() + MINUTE)).toBe(false);
  });

  test('gives one daylight a day, none in a polar night, all of it in a polar day', () => {
    const from = Date.parse('2026-06-20T00:00:00Z');
    const lights = lightsBetween(HARBOUR, from, from + 48 * HOUR);
    expect(lights.length).toBeGreaterThanOrEqual(4);
    expect(lights.every(({ rise, set }) => set - rise > 15 * HOUR && set - rise < 15.3 * HOUR)).toBe(true);
    const north = { latitude: 71.3, longitude: -156.8 };
    expect(lightsBetween(north, Date.parse('2026-12-15T00:00:00Z'), Date.parse('2026-12-16T00:00:00Z'))).toEqual([]);
    const summer = lightsBetween(north, from, from + 24 * HOUR);
    expect(summer.every(({ rise, set }) => set - rise === 24 * HOUR)).toBe(true);
  });

  test('stands nowhere until both coordinates are known', () => {
    const { house } = buildHousehold();
    expect(placeOf(house)).toEqual(HARBOUR);
    expect(placeOf({ ...house, latitude: null })).toBeNull();
    expect(placeOf({ ...house, longitude: null })).toBeNull();
  });
});

describe('midnights', () => {
  const zone = 'America/New_York';

  test('are a day apart, but for the nights the clock is changed', () => {
    const even = midnights(day('2026-01-01'), day('2026-02-01'), zone);
    expect(even.length).toBe(31);
    expect(new Date(even[30] ?? 0).toISOString()).toBe('2026-01-31T05:00:00.000Z');
    const spring = midnights(day('2026-03-06'), day('2026-03-11'), zone);
    expect(spring.slice(1).map((at, i) => (at - (spring[i] ?? 0)) / HOUR)).toEqual([24, 24, 23, 24]);
    const autumn = midnights(day('2026-10-30'), day('2026-11-04'), zone);
    expect(autumn.slice(1).map((at, i) => (at - (autumn[i] ?? 0)) / HOUR)).toEqual([24, 24, 25, 24]);
  });

  test('of a year, in which the clock goes there and back, are right in the middle of it', () => {
    const year = midnights(day('2026-01-01'), day('2027-01-01'), zone);
    expect(new Date(year[181] ?? 0).toISOString()).toBe('2026-07-01T04:00:00.000Z');
  });

  test('stand so many hours from UTC', () => {
    expect([hoursFromUtc(day('2026-01-05'), zone), hoursFromUtc(day('2026-07-05'), zone)]).toEqual([-5, -4]);
    expect(hoursFromUtc(day('2026-07-05'), 'UTC')).toBe(0);
  });
});
