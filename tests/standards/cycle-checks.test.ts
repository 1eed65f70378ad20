import { describe, expect, it } from 'vitest';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { sunIsUp } from '#shared/metering/sun.ts';
import { USUAL_DAYS } from '#shared/reconcile/cycle-length.ts';
import { addDays, day } from '#shared/units/day.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';
import { sunlitFile } from '#tests/support/sunlit-file.ts';

const MINUTE = 60_000;
const MS_PER_DAY = 86_400_000;
const RADIANS = Math.PI / 180;

/**
 * Sunrise by the low-precision equations of "General Solar Position Calculations" (NOAA Global Monitoring Division; from memory): fractional
 * year, equation of time and declination by Spencer's series, zenith 90.833° ("the approximate correction for atmospheric refraction at sunrise and
 * sunset, and the size of the solar disk"), sunrise = 720 − 4 (longitude + ha) − eqtime minutes of the UTC day.
 */
function sunriseMinutes(dayOfYear: number, latitude: number, longitude: number): number {
  const turn = ((2 * Math.PI) / 365) * (dayOfYear - 1);
  const equation =
    229.18 *
    (0.000075 +
      0.001868 * Math.cos(turn) -
      0.032077 * Math.sin(turn) -
      0.014615 * Math.cos(2 * turn) -
      0.040849 * Math.sin(2 * turn));
  const declination =
    0.006918 -
    0.399912 * Math.cos(turn) +
    0.070257 * Math.sin(turn) -
    0.006758 * Math.cos(2 * turn) +
    0.000907 * Math.sin(2 * turn) -
    0.002697 * Math.cos(3 * turn) +
    0.00148 * Math.sin(3 * turn);
  const lat = latitude * RADIANS;
  const hourAngle = Math.acos(
    Math.cos(90.833 * RADIANS) / (Math.cos(lat) * Math.cos(declination)) - Math.tan(lat) * Math.tan(declination),
  );
  return 720 - 4 * (longitude + hourAngle / RADIANS) - equation;
}

describe('the sun’s rise agrees with NOAA’s equations', () => {
  it.each([
    [18.2, -66.5],
    [33.4, -112.1],
    [44.6, -124.0],
    [-33.9, -70.7],
  ])('to five minutes through a year at %f, %f', (latitude, longitude) => {
    const place = { latitude, longitude };
    let compared = 0;
    for (let at = 1; at <= 365; at += 7) {
      const sunrise = Date.UTC(2026, 0, 1) + (at - 1) * MS_PER_DAY + sunriseMinutes(at, latitude, longitude) * MINUTE;
      expect([at, sunIsUp(place, sunrise - 5 * MINUTE), sunIsUp(place, sunrise + 5 * MINUTE)]).toEqual([
        at,
        false,
        true,
      ]);
      compared += 1;
    }
    expect(compared).toBeGreaterThan(50);
  });
});

describe('the checks of net-metering.md §4 and §5', () => {
  it('§4 "days": 27 ≤ D ≤ 35, else flag (common practice, no source beyond the page)', () => {
    expect(USUAL_DAYS).toEqual({ least: 27, most: 35 });
  });

  it('§5: "P_t = 0 from dusk to dawn" (energy conservation), "ignore <0.5% of nameplate": half a per cent by night counts, less does not', () => {
    const from = day('2026-01-14');
    const facts = buildHousehold({ start: from, cycles: 1 });
    const watts = facts.house.arrays.reduce((sum, one) => sum + one.modules * one.moduleWatts, 0);
    const least = Math.ceil(watts * 0.005);
    const file = sunlitFile({
      channel: 'production',
      from,
      to: addDays(from, 31),
      minutes: 60,
      place: { latitude: 41.2, longitude: -72.1 },
      timeZone: 'America/New_York',
      watts: 9000,
      hoursAhead: 0,
    });
    const atMidnight = (wh: number) =>
      file.map((one) => ({ ...one, values: one.values.map((v, at) => (at === 0 ? wh : v)) }));
    const verdict = (wh: number) =>
      computeLedger({ ...facts, intervals: atMidnight(wh) }, { today: BUILT_TODAY }).cycles[0]?.checks.find(
        (one) => one.key === 'productionAtNight:production',
      )?.verdict;
    expect([verdict(0), verdict(least - 1), verdict(least)]).toEqual(['agrees', 'agrees', 'differs']);
  });
});
