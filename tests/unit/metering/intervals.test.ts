import { describe, expect, test } from 'vitest';
import type { IntervalDay } from '#shared/facts/papers.ts';
import { cycleIntervals, midnightUtc } from '#shared/metering/cycle-intervals.ts';
import { indexIntervals, intervalEnergy } from '#shared/metering/interval-index.ts';
import { addDays, type Day, day } from '#shared/units/day.ts';
import { evaluateWorking } from '#shared/working-formula.ts';

const FROM = day('2026-03-01');
const TO = day('2026-03-31');

function hours(channel: IntervalDay['channel'], on: Day, values: (number | null)[]): IntervalDay {
  return { channel, day: on, minutes: 60, values, documentId: 'doc' };
}

function month(change: (on: Day, at: number) => (number | null)[] | null): IntervalDay[] {
  return Array.from({ length: 30 }, (_, at) => addDays(FROM, at)).flatMap((on, at) => {
    const values = change(on, at);
    return values === null ? [] : [hours('export', on, values)];
  });
}

const FILES = [
  {
    id: 'doc',
    fileName: 'export.csv',
    kind: 'production' as const,
    sha256: '0',
    size: 1,
    uploadedOn: TO,
    uploadedBy: 'Priya',
  },
];

describe('interval data over a cycle', () => {
  test('add up the local days in [from, to) and leave out the day of the later read', () => {
    const days = [...month(() => Array(24).fill(100)), hours('export', TO, Array(24).fill(9999))];
    const found = intervalEnergy(indexIntervals(days, FILES), 'export', FROM, TO);
    expect(found?.figure.wh).toBe(30 * 2400);
    expect(found?.complete).toBe(true);
    expect(found?.figure.coverage).toBe(1);
    expect(found && evaluateWorking(found.figure.working).toString()).toBe('72');
  });

  test('a day of 23 hours is a whole day', () => {
    const days = month((on) => Array(on === '2026-03-08' ? 23 : 24).fill(100));
    const found = intervalEnergy(indexIntervals(days, FILES), 'export', FROM, TO);
    expect(found?.figure.coverage).toBe(1);
    expect(found?.complete).toBe(true);
  });

  test('a missing day leaves them incomplete and is counted', () => {
    const found = intervalEnergy(
      indexIntervals(
        month((_, at) => (at < 3 ? null : Array(24).fill(100))),
        FILES,
      ),
      'export',
      FROM,
      TO,
    );
    expect(found?.complete).toBe(false);
    expect(found?.missingDays).toBe(3);
    expect(found?.figure.coverage).toBe(0.9);
  });

  test('a missing reading is neither zero nor the end of the day', () => {
    const found = intervalEnergy(
      indexIntervals(
        month((_, at) => [at === 4 ? null : 100, ...Array(23).fill(100)]),
        FILES,
      ),
      'export',
      FROM,
      TO,
    );
    expect(found?.missingSteps).toBe(1);
    expect(found?.figure.coverage).toBe(0.9986);
    expect(found?.complete).toBe(false);
  });

  test('no data is nothing, not zero', () => {
    expect(intervalEnergy(indexIntervals([], FILES), 'export', FROM, TO)).toBeNull();
    expect(
      intervalEnergy(
        indexIntervals(
          month(() => Array(24).fill(null)),
          FILES,
        ),
        'export',
        FROM,
        TO,
      ),
    ).toBeNull();
  });
});

describe('steps handed to a settlement', () => {
  test('begin at local midnight, also across a change of clocks', () => {
    expect(midnightUtc(day('2026-03-08'), 'America/New_York')).toBe('2026-03-08T05:00:00.000Z');
    expect(midnightUtc(day('2026-03-09'), 'America/New_York')).toBe('2026-03-09T04:00:00.000Z');
    expect(midnightUtc(day('2026-11-02'), 'America/Los_Angeles')).toBe('2026-11-02T08:00:00.000Z');
  });

  test('are withheld when a reading is missing, rather than filled with zero', () => {
    const whole = month(() => Array(24).fill(100));
    const both = [...whole, ...whole.map((one) => ({ ...one, channel: 'import' as const }))];
    expect(cycleIntervals(indexIntervals(both, FILES), FROM, TO, 'UTC')?.exportWh).toHaveLength(720);
    const holed = both.map((one, at) => (at === 3 ? { ...one, values: [null, ...one.values.slice(1)] } : one));
    expect(cycleIntervals(indexIntervals(holed, FILES), FROM, TO, 'UTC')).toBeNull();
  });
});
