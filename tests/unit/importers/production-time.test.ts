import { describe, expect, it } from 'vitest';
import { zoneClock } from '#server/importers/zone-clock.ts';
import { readProduction } from './fixtures.ts';

const pad = (number: number) => String(number).padStart(2, '0');
const wall = (seconds: number) => new Date(seconds * 1000).toISOString().slice(0, 16).replace('T', ' ');

/** Values that differ at every step and keep rising and falling, as energy does. */
const energyAt = (at: number) => 100 + ((at * 389) % 1009);

/** A file of wall-clock stamps for every step from one UTC instant to another, as a logger in New York writes them. */
function localFile(
  fromUtc: string,
  steps: number,
  minutes: number,
  shiftSteps = 0,
  offset: number | null = null,
): string {
  const start = Date.parse(fromUtc) / 1000;
  const zone = zoneClock('America/New_York');
  const rows = Array.from({ length: steps }, (_, at) => {
    const utc = start + (at + shiftSteps) * minutes * 60;
    return `${wall(utc + (offset ?? zone.offsetAt(utc)))},${energyAt(at)}`;
  });
  return `Time,Import (Wh)\n${rows.join('\n')}\n`;
}

const read = (text: string) => readProduction(text, { channel: 'import' });
/** The first `count` values, in true time order. */
const inOrder = (count: number) => Array.from({ length: count }, (_, at) => energyAt(at));

describe('days on which the clocks change are whole', () => {
  it.each([5, 15, 30, 60])('autumn, steps of %i minutes: 25 hours, the repeated hour in file order', (minutes) => {
    const steps = (25 * 60) / minutes;
    const reading = read(localFile('2025-11-02T04:00:00Z', steps, minutes));
    expect(reading.days).toEqual([{ channel: 'import', day: '2025-11-02', minutes, values: inOrder(steps) }]);
    expect([reading.missingSteps, reading.faults, reading.doubts]).toEqual([0, [], []]);
  });

  it.each([5, 15, 30, 60])('spring, steps of %i minutes: 23 hours', (minutes) => {
    const steps = (23 * 60) / minutes;
    const reading = read(localFile('2026-03-08T05:00:00Z', steps, minutes));
    expect(reading.days).toEqual([{ channel: 'import', day: '2026-03-08', minutes, values: inOrder(steps) }]);
    expect([reading.missingSteps, reading.faults, reading.doubts]).toEqual([0, [], []]);
  });

  it('with stamps at the end of their step', () => {
    for (const [start, steps, day] of [
      ['2025-11-02T04:00:00Z', 100, '2025-11-02'],
      ['2026-03-08T05:00:00Z', 92, '2026-03-08'],
    ] as const) {
      const reading = read(localFile(start, steps, 15, 1));
      expect(reading.mapping.stamp).toBe('end');
      expect(reading.days).toEqual([{ channel: 'import', day, minutes: 15, values: inOrder(steps) }]);
      expect(reading.doubts.map((doubt) => doubt.field)).toEqual(['stamp']);
    }
  });

  it('with the newest row first', () => {
    const [header, ...rows] = localFile('2025-11-02T04:00:00Z', 25, 60).trimEnd().split('\n');
    const reading = read(`${[header, ...rows.reverse()].join('\n')}\n`);
    expect(reading.days[0]?.values).toEqual(inOrder(25));
  });

  it('an hour that repeats and is in the file once is read as the first, and said', () => {
    const [header, ...rows] = localFile('2025-11-02T04:00:00Z', 25, 60).trimEnd().split('\n');
    const reading = read(`${[header, ...rows.filter((_, at) => at !== 2)].join('\n')}\n`);
    expect(reading.days[0]?.values.slice(0, 4)).toEqual([energyAt(0), energyAt(1), null, energyAt(3)]);
    expect(reading.doubts.map((doubt) => doubt.field)).toEqual(['timeZone']);
  });

  it('a clock that stays on standard time all year is found out in spring', () => {
    const reading = read(localFile('2026-03-08T05:00:00Z', 23 * 4, 15, 0, -5 * 3600));
    expect(reading.mapping.timeZone).toBe('Etc/GMT+5');
    expect(reading.days).toEqual([{ channel: 'import', day: '2026-03-08', minutes: 15, values: inOrder(92) }]);
  });

  it('a stated offset wins over the zone', () => {
    const text = localFile('2025-11-02T04:00:00Z', 25, 60, 0, 0).replaceAll(/(\d\d:\d\d),/g, '$1Z,');
    expect(read(text).days).toEqual([{ channel: 'import', day: '2025-11-02', minutes: 60, values: inOrder(25) }]);
  });
});

describe('local days are cut in the household’s zone', () => {
  it('a file in UTC begins and ends within a day', () => {
    const rows = Array.from(
      { length: 48 },
      (_, hour) => `2025-06-${pad(1 + Math.floor(hour / 24))}T${pad(hour % 24)}:00Z,${energyAt(hour)}`,
    );
    const reading = read(`Time,Import (Wh)\n${rows.join('\n')}\n`);
    expect(reading.days.map((day) => [day.day, day.values.filter((value) => value !== null).length])).toEqual([
      ['2025-05-31', 4],
      ['2025-06-01', 24],
      ['2025-06-02', 20],
    ]);
    expect(reading.missingSteps).toBe(0);
  });

  it('a day given as one figure keeps its written date', () => {
    const text = 'Date,Import (kWh)\n2025-11-01T00:00:00Z,10\n2025-11-02T00:00:00Z,11\n2025-11-03T00:00:00Z,12\n';
    expect(read(text).days.map((day) => [day.day, day.values[0]])).toEqual([
      ['2025-11-01', 10_000],
      ['2025-11-02', 11_000],
      ['2025-11-03', 12_000],
    ]);
  });

  it('a day given at local midnight with its offset does, too, over the change of the clocks', () => {
    const text = 'Date,Import (kWh)\n2025-11-01T04:00:00Z,10\n2025-11-02T04:00:00Z,11\n2025-11-03T05:00:00Z,12\n';
    expect(read(text).days.map((day) => day.day)).toEqual(['2025-11-01', '2025-11-02', '2025-11-03']);
  });
});

describe('stamps a little off their step', () => {
  it('are on time within a minute, and stand a whole file past it by a doubt', () => {
    const late = (second: string) =>
      Array.from({ length: 24 }, (_, hour) => `2025-06-03 ${pad(hour)}:${hour % 2 ? second : '00:00'},5`);
    expect(read(`Time,Import (Wh)\n${late('00:40').join('\n')}\n`).missingSteps).toBe(0);
    const seven = Array.from({ length: 24 }, (_, hour) => `2025-06-03 ${pad(hour)}:07,5`);
    const reading = read(`Time,Import (Wh)\n${seven.join('\n')}\n`);
    expect([reading.days[0]?.values.length, reading.totalWh]).toEqual([24, 120]);
    expect(reading.doubts.map((doubt) => doubt.field)).toEqual(['stamp']);
  });
});

describe('a zone’s clock', () => {
  const start = Date.UTC(2025, 0, 1) / 86_400_000;
  it('knows which wall-clock times happen once, twice and never', () => {
    const zone = zoneClock('America/New_York');
    const at = (text: string) => Date.parse(`${text}Z`) / 1000;
    expect(zone.kindOf(at('2025-07-01T12:00'))).toBe('once');
    expect(zone.kindOf(at('2025-11-02T01:30'))).toBe('twice');
    expect(zone.kindOf(at('2025-11-02T02:00'))).toBe('once');
    expect(zone.kindOf(at('2025-03-09T02:30'))).toBe('gap');
    expect(zone.kindOf(at('2025-03-09T03:00'))).toBe('once');
    expect(zone.toUtc(at('2025-03-09T02:30'), false)).toBe(at('2025-03-09T07:30'));
  });

  it.each(['America/New_York', 'America/Denver', 'Pacific/Honolulu', 'Etc/GMT+7', 'Australia/Lord_Howe'])(
    'agrees with Intl at every hour of a year in %s',
    (name) => {
      const zone = zoneClock(name);
      const format = new Intl.DateTimeFormat('sv-SE', { timeZone: name, dateStyle: 'short', timeStyle: 'medium' });
      for (let hour = 0; hour < 365 * 24; hour += 1) {
        const utc = start * 86_400 + hour * 3600;
        const local = Date.parse(`${format.format(utc * 1000).replace(' ', 'T')}Z`) / 1000;
        expect(utc + zone.offsetAt(utc)).toBe(local);
        const second = zone.kindOf(local) === 'twice' && zone.toUtc(local, false) !== utc;
        expect(zone.toUtc(local, second)).toBe(utc);
      }
    },
  );
});
