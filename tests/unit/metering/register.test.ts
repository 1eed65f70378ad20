import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { RegisterRead } from '#shared/facts/papers.ts';
import { registerEnergy, registerKwh } from '#shared/metering/register.ts';
import { qtyText } from '#shared/settlement/quantity.ts';
import { day } from '#shared/units/day.ts';
import { evaluateWorking } from '#shared/working-formula.ts';

const PAPER = { kind: 'typed' as const, by: 'Priya', on: day('2026-09-20') };

function read(change: Partial<RegisterRead>): RegisterRead {
  return {
    meter: 'net',
    channel: 'import',
    from: day('2026-08-14'),
    to: day('2026-09-14'),
    previous: '100',
    current: '598',
    dials: 5,
    multiplier: '1',
    type: 'actual',
    row: null,
    ...change,
  };
}

describe('a register difference', () => {
  test('is current less previous', () => {
    expect(qtyText(registerKwh(read({})))).toBe('498');
  });

  test('adds 10^dials when the dials passed all nines', () => {
    expect(qtyText(registerKwh(read({ previous: '99870', current: '00368' })))).toBe('498');
    expect(qtyText(registerKwh(read({ previous: '9990', current: '12', dials: 4 })))).toBe('22');
  });

  test('is multiplied by the meter’s multiplier, exactly', () => {
    expect(qtyText(registerKwh(read({ current: '112', multiplier: '40' })))).toBe('480');
    expect(qtyText(registerKwh(read({ current: '101', multiplier: '0.1' })))).toBe('0.1');
  });
});

describe('the energy of a channel', () => {
  test('sums meters and the segments of an exchange', () => {
    const energy = registerEnergy(
      [
        read({ current: '300', to: day('2026-09-01') }),
        read({ meter: 'new', from: day('2026-09-01'), previous: '5', current: '61' }),
        read({ channel: 'export', current: '999' }),
      ],
      'import',
      PAPER,
    );
    expect(energy?.wh).toBe(256_000);
    expect(energy?.from).toBe('register');
  });

  test('is missing, not zero, without a read', () => {
    expect(registerEnergy([read({})], 'production', PAPER)).toBeNull();
  });

  test('is called an estimate when a read is', () => {
    expect(registerEnergy([read({ type: 'estimated' })], 'import', PAPER)?.working.basis).toBe('estimated');
  });

  test('has a working that evaluates to it, whatever the reads', () => {
    const reads = fc.array(
      fc.record({
        previous: fc.integer({ min: 0, max: 99_999 }).map(String),
        current: fc.integer({ min: 0, max: 99_999 }).map(String),
        multiplier: fc.constantFrom('1', '10', '0.5', '40', '0.0001'),
      }),
      { minLength: 1, maxLength: 4 },
    );
    fc.assert(
      fc.property(reads, (changes) => {
        const energy = registerEnergy(changes.map(read), 'import', PAPER);
        if (energy === null) throw new Error('there were reads');
        expect(evaluateWorking(energy.working).times(1000).toNumber()).toBe(energy.wh);
        expect(energy.wh).toBeGreaterThanOrEqual(0);
      }),
    );
  });

  test('comes back from any use of the dials: registers wind on and never lose a kWh', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 99_999 }), fc.integer({ min: 0, max: 99_999 }), (start, used) => {
        const current = (start + used) % 100_000;
        expect(qtyText(registerKwh(read({ previous: String(start), current: String(current) })))).toBe(String(used));
      }),
    );
  });
});
