import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { IntervalChannel, IntervalDay } from '#shared/facts/papers.ts';
import { type Shares, splitEnergy } from '#shared/metering/energy-split.ts';
import { hourlyProfileOf } from '#shared/metering/hourly-profile.ts';
import { cellsOf, hoursBetween, periodHours, weighHours } from '#shared/metering/period-hours.ts';
import { useByPeriod } from '#shared/metering/use-by-period.ts';
import { calendarSchema, type PlanCalendar } from '#shared/settlement/plan.ts';
import { addDays, day, daysBetween } from '#shared/units/day.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';

const CALENDAR: PlanCalendar = calendarSchema.parse({
  seasons: [
    { id: 'summer', from: '06-01', to: '09-30' },
    { id: 'winter', from: '10-01', to: '05-31' },
  ],
  periods: [
    { id: 'peak', when: [{ season: 'summer', days: 'weekday', from: '15:30', to: '20:00' }] },
    { id: 'rest', when: 'rest' },
  ],
});
const HOUR = hoursBetween(0, 0);

const weights = fc
  .array(fc.nat(1_000_000), { minLength: 3, maxLength: 3 })
  .map((drawn) => (drawn.some((weight) => weight > 0) ? drawn : [1, 0, 0]));
const millionths = fc.array(fc.integer({ min: 0, max: 1_000_000 }), { minLength: 3, maxLength: 3 });
const anyShares: fc.Arbitrary<Shares> = fc.record({
  present: fc.constant([true, true, true]),
  import: fc.option(weights),
  export: weights,
  self: weights,
  use: weights,
  cancels: fc.record({ hour: millionths, '15min': millionths }),
});
const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);

describe('a month’s energy by period', () => {
  it('adds up to the month, part by part use = import + production − export, and netting keeps import − export', () => {
    const amount = fc.nat(3_000_000);
    fc.assert(
      fc.property(amount, amount, amount, anyShares, (importWh, exportWh, self, shares) => {
        const energy = { importWh, exportWh, productionWh: exportWh + self, useWh: importWh + self };
        const split = splitEnergy(energy, shares);
        for (const key of ['importWh', 'exportWh', 'productionWh', 'useWh'] as const) {
          expect(sum(split[key])).toBe(energy[key]);
          expect(split[key].every((part) => Number.isSafeInteger(part) && part >= 0)).toBe(true);
        }
        for (const [at, used] of split.useWh.entries()) {
          expect(used).toBe(Number(split.importWh[at]) + Number(split.productionWh[at]) - Number(split.exportWh[at]));
          for (const block of ['hour', '15min'] as const) {
            const part = split.netted[block].parts[at] ?? { importWh: -1, exportWh: -1 };
            expect(part.importWh - part.exportWh).toBe(Number(split.importWh[at]) - Number(split.exportWh[at]));
            expect(Math.min(part.importWh, part.exportWh)).toBeGreaterThanOrEqual(0);
          }
        }
      }),
      { numRuns: PROPERTY_RUNS },
    );
  });

  it('is shared in exact proportion', () => {
    const shares: Shares = {
      present: [true, true],
      import: [1, 3],
      export: [0, 1],
      self: [1, 1],
      use: [1, 1],
      cancels: { hour: [0, 500_000], '15min': [0, 0] },
    };
    const split = splitEnergy({ importWh: 100, exportWh: 50, productionWh: 71, useWh: 121 }, shares);
    expect(split).toMatchObject({ importWh: [25, 75], exportWh: [0, 50], productionWh: [11, 60], useWh: [36, 85] });
    expect(split.netted.hour).toEqual({
      total: { importWh: 75, exportWh: 25 },
      parts: [
        { importWh: 25, exportWh: 0 },
        { importWh: 50, exportWh: 25 },
      ],
    });
  });

  it('keeps production by period when export is taken away, and gives import nowhere to go its use', () => {
    const shares: Shares = {
      present: [true, true],
      import: null,
      export: [0, 1],
      self: [0, 1],
      use: [1, 1],
      cancels: { hour: [0, 0], '15min': [0, 0] },
    };
    const cut = splitEnergy({ importWh: 10, exportWh: 0, productionWh: 90, useWh: 50 }, shares);
    expect(cut).toMatchObject({ exportWh: [0, 0], productionWh: [0, 90], importWh: [10, 0], useWh: [10, 40] });
    expect(splitEnergy({ importWh: 0, exportWh: 0, productionWh: 0, useWh: 0 }, shares).importWh).toEqual([0, 0]);
  });
});

describe('the hours of a calendar', () => {
  it('are shared to the minute, by season, weekdays and weekends as 5 to 2', () => {
    const june = periodHours(CALENDAR, day('2026-05-30'), day('2026-06-03'));
    const minutes = weighHours(june ?? [], HOUR);
    expect(minutes).toEqual([2 * 5 * 270, 4 * 7 * 1440 - 2 * 5 * 270]);
    expect(june?.[0]?.[15]).toBe(30 * 2 * 5);
    expect(periodHours(CALENDAR, day('2026-01-01'), day('2026-02-01'))?.[0]).toEqual(new Array(48).fill(0));
  });

  it('are none where one lies in no period, and all in one part without periods', () => {
    const gap = { ...CALENDAR, periods: CALENDAR.periods.slice(0, 1) };
    expect(periodHours(gap, day('2026-06-01'), day('2026-07-01'))).toBeNull();
    const plain = { ...CALENDAR, periods: [] };
    expect(cellsOf(plain)).toEqual([null]);
    expect(weighHours(periodHours(plain, day('2026-06-01'), day('2026-06-02')) ?? [], HOUR)).toEqual([7 * 1440]);
  });

  it('from one to another go past midnight', () => {
    expect(sum(hoursBetween(22, 2))).toBe(8);
    expect(sum(hoursBetween(2, 22))).toBe(40);
  });
});

/** Days from the first of January 2026 of equal values in steps of so many minutes. */
function readings(
  channel: IntervalChannel,
  days: number,
  minutes: number,
  value: (step: number) => number | null,
): IntervalDay[] {
  return Array.from({ length: days }, (_, at) => ({
    channel,
    day: addDays(day('2026-01-01'), at),
    minutes: minutes as IntervalDay['minutes'],
    values: Array.from({ length: 1440 / minutes }, (_, step) => value(step)),
    documentId: null,
  }));
}

describe('the mean day of the readings', () => {
  const since = day('2025-01-01');

  it('has weekdays and weekends of each month, and what cancels in hours and quarter-hours', () => {
    const profile = hourlyProfileOf(
      [
        ...readings('import', 31, 15, (step) => (step % 2 === 0 ? 200 : 0)),
        ...readings('export', 31, 15, (step) => (step % 2 === 1 ? 100 : 0)),
        ...readings('production', 31, 15, (step) => (step === 48 ? 900 : 100)),
      ],
      since,
    );
    expect(profile?.months[0]?.import).toEqual(new Array(48).fill(40));
    expect(profile?.months[6]).toEqual(profile?.months[0]);
    expect(profile?.months[0]?.self?.[12]).toBe(100);
    expect(profile?.cancels).toEqual({ hour: new Array(12).fill(1_000_000), '15min': new Array(12).fill(0) });
  });

  it('is none from too few days, from days with gaps, without export, in other steps, and from before the day asked for', () => {
    const both = (days: number, minutes = 60) => [
      ...readings('import', days, minutes, () => 100),
      ...readings('export', days, minutes, () => 100),
    ];
    expect(hourlyProfileOf(both(19), since)).toBeNull();
    expect(hourlyProfileOf(both(31, 1440), since)).toBeNull();
    expect(hourlyProfileOf(both(31), day('2026-02-01'))).toBeNull();
    expect(
      hourlyProfileOf(
        readings('import', 31, 60, () => 100),
        since,
      ),
    ).toBeNull();
    const gaps = readings('export', 31, 60, (step) => (step === 3 ? null : 100));
    expect(hourlyProfileOf([...readings('import', 31, 60, () => 100), ...gaps], since)).toBeNull();
    const uneven = [...readings('import', 31, 60, () => 100), ...readings('export', 31, 15, () => 100)];
    expect(hourlyProfileOf(uneven, since)).toBeNull();
  });

  it('knows no quarter-hours from hours, no self-use without production, and takes the monitor where there is no meter', () => {
    const flows = [...readings('import', 59, 60, () => 100), ...readings('export', 59, 60, () => 0)];
    const hourly = hourlyProfileOf(flows, since);
    expect(hourly?.cancels).toEqual({ hour: new Array(12).fill(0), '15min': null });
    expect(hourly?.months[0]?.self).toBeNull();
    const monitored = hourlyProfileOf([...flows, ...readings('monitor', 31, 60, () => 300)], since);
    // February has readings of import alone: its self-use is that of all months.
    expect(monitored?.months.map((month) => month.self?.[0])).toEqual(new Array(12).fill(30));
  });

  it('takes a weekend from all months where a month has none of its own', () => {
    const weekdays = [...readings('import', 60, 60, () => 100), ...readings('export', 60, 60, () => 50)].filter(
      ({ day: date }) =>
        daysBetween(day('2026-01-01'), date) < 31 || ![2, 3].includes(daysBetween(day('2026-01-01'), date) % 7),
    );
    expect(hourlyProfileOf(weekdays, since)?.months[1]?.import).toEqual(new Array(48).fill(10));
  });
});

describe('the use of a past cycle by period', () => {
  const span = { from: day('2026-06-01'), to: day('2026-07-01') };
  const split = {
    importWh: [10, 30],
    exportWh: [0, 20],
    selfWh: [5, 15],
    cancels: { hour: null, '15min': null },
  };

  it('is as measured where the cycle was split by these periods', () => {
    const energy = { importWh: 40, exportWh: 20, productionWh: 40 };
    expect(useByPeriod(CALENDAR, span, 60, { split, calendar: CALENDAR, energy })).toEqual({
      byPeriod: { peak: 15, rest: 45 },
      estimated: false,
    });
    // The same periods written again are the same periods.
    const again = structuredClone(CALENDAR);
    expect(useByPeriod(again, span, 60, { split, calendar: CALENDAR, energy })?.estimated).toBe(false);
  });

  it('is an estimate where production has no hours, where the periods are others, or nothing is known', () => {
    const energy = { importWh: 40, exportWh: 20, productionWh: 40 };
    const known = { split: { ...split, selfWh: null }, calendar: CALENDAR, energy };
    expect(useByPeriod(CALENDAR, span, 60, known)?.estimated).toBe(true);
    expect(useByPeriod(CALENDAR, span, 40, { ...known, energy: null })?.estimated).toBe(false);
    const other = { ...CALENDAR, seasons: [] };
    expect(useByPeriod(CALENDAR, span, 60, { split, calendar: other, energy })?.estimated).toBe(true);
    const none = useByPeriod(CALENDAR, span, 7_000, { split: null, calendar: CALENDAR, energy: null });
    expect(none?.estimated).toBe(true);
    expect(sum(Object.values(none?.byPeriod ?? {}))).toBe(7_000);
  });

  it('leaves out a period without hours, and is none without periods', () => {
    const winter = { from: day('2026-01-01'), to: day('2026-02-01') };
    const known = { split: null, calendar: CALENDAR, energy: null };
    expect(useByPeriod(CALENDAR, winter, 50, known)?.byPeriod).toEqual({ rest: 50 });
    expect(useByPeriod({ ...CALENDAR, periods: [] }, span, 50, known)).toBeNull();
  });
});
