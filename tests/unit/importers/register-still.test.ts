import { describe, expect, it } from 'vitest';
import { readProductionCsv } from '#server/importers/production-csv.ts';

const HOUR = 3600;
const START = 1_751_601_600;

/** Hourly readings of a register in Wh over three days, then one more so many seconds later that has not moved. */
function stillFor(seconds: number): string {
  const readings = Array.from({ length: 72 }, (_, at) => `${START + at * HOUR},${1000 + at * 10}`);
  return ['epoch,total wh', ...readings, `${START + 71 * HOUR + seconds},${1000 + 710}`].join('\n');
}

function daysAfter(seconds: number): number {
  const read = readProductionCsv(
    { fileName: 'register.csv', bytes: new TextEncoder().encode(stillFor(seconds)) },
    { mapping: null, channel: 'import', timeZone: 'America/New_York', acWatts: null, dcWatts: null },
  );
  if (!read.ok) throw new Error(read.problem.detail ?? read.problem.code);
  expect(read.value.mapping.quantity).toBe('register');
  expect(read.value.totalWh).toBe(710);
  return read.value.days.length;
}

describe('a register that has not moved', () => {
  it('gave nothing over a gap of days: those steps are zero', () => {
    expect(daysAfter(5 * 24 * HOUR)).toBeGreaterThan(daysAfter(HOUR) + 3);
  });

  it('is left missing over more than a year, as one wrong date must not make a century of zeros', () => {
    expect(daysAfter(254 * 365 * 24 * HOUR)).toBe(daysAfter(HOUR));
  });
});
