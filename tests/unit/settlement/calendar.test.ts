import { describe, expect, test } from 'vitest';
import { isWeekend, periodAt, periodExists, sameCells, seasonChanges, seasonOf } from '#shared/settlement/calendar.ts';
import { calendarSchema, type PlanCalendar } from '#shared/settlement/plan.ts';
import { day } from '#shared/units/day.ts';
import { TWO_SEASONS } from './plans.ts';

function calendar(part: object): PlanCalendar {
  return calendarSchema.parse(part);
}

describe('seasons', () => {
  const of = calendar({ seasons: TWO_SEASONS });

  test('hold both their yearly days and may wrap the new year', () => {
    const days = ['2026-05-31', '2026-06-01', '2026-09-30', '2026-10-01', '2026-12-31', '2027-01-01'];
    expect(days.map((date) => seasonOf(of, day(date)))).toEqual([
      'winter',
      'summer',
      'summer',
      'winter',
      'winter',
      'winter',
    ]);
  });

  test('leave days outside every season without one', () => {
    expect(
      seasonOf(calendar({ seasons: [{ id: 'summer', from: '06-01', to: '06-30' }] }), day('2026-07-01')),
    ).toBeNull();
    expect(seasonOf(calendar({}), day('2026-07-01'))).toBeNull();
  });

  test('know a leap day', () => {
    const february = calendar({ seasons: [{ id: 'late', from: '02-29', to: '03-10' }] });
    expect(seasonOf(february, day('2028-02-29'))).toBe('late');
    expect(seasonOf(february, day('2026-02-28'))).toBeNull();
    expect(seasonOf(february, day('2026-03-01'))).toBe('late');
  });

  test('change on the days strictly inside a cycle, also over the new year', () => {
    expect(seasonChanges(of, day('2026-05-17'), day('2026-06-16'))).toEqual(['2026-06-01']);
    expect(seasonChanges(of, day('2026-06-01'), day('2026-07-01'))).toEqual([]);
    expect(seasonChanges(of, day('2026-05-02'), day('2026-06-01'))).toEqual([]);
    expect(seasonChanges(of, day('2026-12-16'), day('2027-01-16'))).toEqual([]);
    const gap = calendar({ seasons: [{ id: 'short', from: '12-24', to: '01-02' }] });
    expect(seasonChanges(gap, day('2026-12-16'), day('2027-01-16'))).toEqual(['2026-12-24', '2027-01-03']);
  });
});

describe('time-of-use periods', () => {
  const of = calendar({
    seasons: TWO_SEASONS,
    periods: [
      { id: 'peak', when: [{ season: 'summer', days: 'weekday', from: '16:00', to: '21:00' }] },
      {
        id: 'night',
        when: [
          { days: 'all', from: '21:00', to: '24:00' },
          { days: 'all', from: '00:00', to: '06:00' },
        ],
      },
      { id: 'rest', when: 'rest' },
    ],
    holidays: { dates: ['2026-07-03'], as: 'weekend' },
  });
  const at = (date: string, clock: string) =>
    periodAt(of, day(date), Number(clock.slice(0, 2)) * 60 + Number(clock.slice(3)));

  test('begin at their first minute and end before their last, and run to 24:00', () => {
    expect([
      at('2026-07-01', '15:59'),
      at('2026-07-01', '16:00'),
      at('2026-07-01', '20:59'),
      at('2026-07-01', '21:00'),
    ]).toEqual(['rest', 'peak', 'peak', 'night']);
    expect([at('2026-07-01', '23:59'), at('2026-07-02', '00:00'), at('2026-07-02', '06:00')]).toEqual([
      'night',
      'night',
      'rest',
    ]);
  });

  test('know weekends, holidays and seasons', () => {
    expect(at('2026-07-04', '17:00')).toBe('rest');
    expect(at('2026-07-03', '17:00')).toBe('rest');
    expect(at('2026-12-01', '17:00')).toBe('rest');
    expect([
      isWeekend(of, day('2026-07-03')),
      isWeekend(of, day('2026-07-05')),
      isWeekend(of, day('2026-07-06')),
    ]).toEqual([true, true, false]);
  });

  test('may count a holiday on a weekend as a weekday', () => {
    const worked = calendar({ holidays: { dates: ['2026-07-04'], as: 'weekday' } });
    expect(isWeekend(worked, day('2026-07-04'))).toBe(false);
  });

  test('take the first that matches, and nothing in a gap without a rest', () => {
    const two = calendar({
      periods: [
        { id: 'first', when: [{ days: 'all', from: '08:00', to: '12:00' }] },
        { id: 'second', when: [{ days: 'all', from: '10:00', to: '14:00' }] },
      ],
    });
    expect([600, 720, 840].map((minute) => periodAt(two, day('2026-07-01'), minute))).toEqual([
      'first',
      'second',
      null,
    ]);
  });

  test('exist in the seasons in which they have hours', () => {
    const [peak, night, rest] = of.periods;
    if (!peak || !night || !rest) throw new Error('three periods');
    expect([peak, night, rest].map((period) => periodExists(period, 'winter'))).toEqual([false, true, true]);
  });

  test('are the same in two calendars that say the same, whatever their holidays and labels', () => {
    const again = structuredClone(of);
    const labelled = { ...again, periods: again.periods.map((period) => ({ ...period, label: 'Other words' })) };
    const holidays = { dates: [day('2026-07-04')], as: 'weekend' as const };
    expect([of, again, again, { ...labelled, holidays }].map((other) => sameCells(of, other))).toEqual([
      true,
      true,
      true,
      true,
    ]);
    expect(sameCells(of, { ...of, periods: of.periods.slice(1) })).toBe(false);
  });
});
