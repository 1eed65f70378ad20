import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { zoneClock } from '#server/importers/zone-clock.ts';
import { kwhText, wh } from '#shared/units/energy.ts';
import { readProduction } from './fixtures.ts';

const RUNS = { numRuns: 200 };
const iso = (seconds: number) => new Date(seconds * 1000).toISOString().slice(0, 16).replace('T', ' ');

/** A start (a local midnight, or any step of a day), a step, and energies that rise and fall from step to step. */
const series = fc.record({
  day: fc.integer({ min: 0, max: 365 * 6 }),
  minutes: fc.constantFrom(5, 15, 30, 60),
  values: fc.array(fc.integer({ min: 0, max: 5000 }), { minLength: 30, maxLength: 250 }),
  explicit: fc.boolean(),
});

const zone = zoneClock('America/New_York');

/** Wall-clock stamps of a run of steps that begins at a local midnight. */
function stamps(day: number, minutes: number, count: number, explicit: boolean): string[] {
  const start = zone.toUtc((18_262 + day) * 86_400, false);
  return Array.from({ length: count }, (_, at) => {
    const utc = start + at * minutes * 60;
    return explicit ? `${iso(utc)}Z` : iso(utc + zone.offsetAt(utc));
  });
}

const sum = (values: readonly (number | null)[]) => values.reduce<number>((total, value) => total + (value ?? 0), 0);

describe('what is written is what is read', () => {
  it('energy by step: every value, in order, on any day of the year, adds up to the written total', () => {
    fc.assert(
      fc.property(series, ({ day, minutes, values, explicit }) => {
        // A zero start and finish keep the series from looking like a running total.
        const energies = [7, ...values, 3, 5, 2];
        const times = stamps(day, minutes, energies.length, explicit);
        const text = `Time,Import (kWh)\n${energies.map((value, at) => `${times[at]},${kwhText(wh(value))}`).join('\n')}\n`;
        const reading = readProduction(text, { channel: 'import' });
        const read = reading.days.flatMap((one) => one.values);
        // A file that ends inside the hour that repeats may leave it once only: then it is read as the first, as said.
        expect(read.slice(0, energies.length)).toEqual(energies);
        expect(sum(read)).toBe(reading.totalWh);
        expect(reading.totalWh).toBe(sum(energies));
        expect([reading.missingSteps, reading.faults]).toEqual([0, []]);
      }),
      RUNS,
    );
  });

  it('power by step: the whole Wh never stray from the exact total by more than one, after any step', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 0, max: 9_000_000 }), { minLength: 30, maxLength: 300 }),
        fc.constantFrom(5, 15, 30, 60),
        (milliwatts, minutes) => {
          const all = [1, ...milliwatts, 5, 3, 4];
          const times = stamps(100, minutes, all.length, true);
          const text = `Time,Power (W)\n${all.map((value, at) => `${times[at]},${value / 1000}`).join('\n')}\n`;
          const reading = readProduction(text);
          const read = reading.days.flatMap((one) => one.values).slice(0, all.length);
          let exact = 0;
          let whole = 0;
          for (let at = 0; at < all.length; at += 1) {
            exact += ((all[at] ?? 0) * minutes) / 60_000;
            whole += read[at] ?? Number.NaN;
            expect(Math.abs(whole - exact)).toBeLessThanOrEqual(1);
          }
          expect(reading.totalWh).toBe(sum(read));
        },
      ),
      RUNS,
    );
  });

  it('a running total: the differences add up to last less first, gaps apart', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 0, max: 4000 }), { minLength: 60, maxLength: 200 }),
        fc.integer({ min: 0, max: 90_000_000 }),
        fc.array(fc.nat(1000), { maxLength: 20 }),
        (energies, start, holes) => {
          let total = start;
          const readings = [start, ...energies.map((value) => (total += value))];
          const times = stamps(150, 60, readings.length, true);
          const gone = new Set(holes.map((hole) => 1 + (hole % (readings.length - 2))));
          const kept = readings.map((value, at) => ({ at, value })).filter(({ at }) => !gone.has(at));
          fc.pre(kept.length > readings.length / 2 && new Set(kept.map(({ value }) => value)).size > 4);
          const text = `Time,Meter reading (kWh)\n${kept.map(({ at, value }) => `${times[at]},${kwhText(wh(value))}`).join('\n')}\n`;
          const reading = readProduction(text);
          expect(reading.mapping.quantity).toBe('register');
          expect(reading.totalWh + reading.unallocatedWh).toBe(total - start);
          const read = reading.days.flatMap((one) => one.values);
          energies.forEach((energy, at) => {
            if (read[at] !== null && read[at] !== undefined && !gone.has(at) && !gone.has(at + 1))
              expect(read[at]).toBe(energy);
          });
        },
      ),
      RUNS,
    );
  });
});
