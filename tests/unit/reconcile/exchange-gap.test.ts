import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { RegisterRead, Statement } from '#shared/facts/papers.ts';
import { addDays, type Day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { changed, check } from './built-checks.ts';

const AT = 1;
const facts = buildHousehold({ intervals: { channels: ['import', 'export'], minutes: 1440 } });
const statement = facts.statements[AT] as Statement;
const EXCHANGED: Day = addDays(statement.from, 10);

/** Wh of a channel over days, added from the file apart from the ledger. */
function fileWh(channel: 'import' | 'export', from: Day, to: Day): number {
  let sum = 0;
  for (const one of facts.intervals) {
    if (one.channel !== channel || one.day < from || one.day >= to) continue;
    for (const value of one.values) sum += value ?? 0;
  }
  return sum;
}

const during = (channel: 'import' | 'export') => Math.round(fileWh(channel, EXCHANGED, addDays(EXCHANGED, 1)) / 1000);

/** The channel of the statement read on two meters: the old one to `oldKwh`, the new one `newKwh`, and billed as they say. */
function exchanged(
  channel: 'import' | 'export',
  kwh: { old: number; fresh: number },
  change: (read: RegisterRead) => RegisterRead = (one) => one,
): HouseholdFacts {
  return changed(
    AT,
    (one) => {
      const old = one.reads.find((read) => read.channel === channel) as RegisterRead;
      const segments = [
        { ...old, to: EXCHANGED, current: String(Number(old.previous) + kwh.old) },
        { ...old, meter: 'new', from: EXCHANGED, previous: '5', current: String(5 + kwh.fresh) },
      ].map(change);
      return {
        ...one,
        reads: [...one.reads.filter((read) => read.channel !== channel), ...segments],
        [channel === 'import' ? 'importWh' : 'exportWh']: wh((kwh.old + kwh.fresh) * 1000),
        lines: one.lines.map((line) => (line.unit === 'kWh' ? { ...line, quantity: null } : line)),
      };
    },
    facts,
  );
}

const earlier = (channel: 'import' | 'export') => Math.round(fileWh(channel, statement.from, EXCHANGED) / 1000);
const later = (channel: 'import' | 'export') => Math.round(fileWh(channel, addDays(EXCHANGED, 1), statement.to) / 1000);
const KEYS = { import: 'importAgainstIntervals:', export: 'exportAgainstIntervals:' } as const;
const WORDS =
  /The meter was exchanged on .*: what (left|came in) between the old meter’s last read and the new meter’s first is on no bill\.$/;

describe('kWh that went by while the meter was exchanged', () => {
  test.each(['import', 'export'] as const)(
    'are found by trying: each meter saw its own days, and the %s of the day between is on no bill',
    (channel) => {
      expect(during(channel)).toBeGreaterThan(4);
      const found = check(exchanged(channel, { old: earlier(channel), fresh: later(channel) }), AT, KEYS[channel]);
      expect(found.verdict).toBe('differs');
      expect(found.cause).toMatch(WORDS);
    },
  );

  test('are not named where the kWh lack on other days than that of the exchange', () => {
    const lacking = during('export') + 6;
    const old = exchanged('export', { old: earlier('export') - lacking, fresh: later('export') + during('export') });
    const fresh = exchanged('export', { old: earlier('export') + during('export'), fresh: later('export') - lacking });
    for (const tried of [old, fresh]) {
      expect(check(tried, AT, KEYS.export).verdict).toBe('differs');
      expect(check(tried, AT, KEYS.export).cause).not.toMatch(WORDS);
    }
  });

  test('are not named where more is billed than the meter saw', () => {
    const more = exchanged('export', { old: earlier('export') + 3, fresh: later('export') + during('export') + 9 });
    expect(check(more, AT, KEYS.export).cause).not.toMatch(WORDS);
  });

  test('are not named where it is one meter, or where the reads do not meet', () => {
    const kwh = { old: earlier('export'), fresh: later('export') };
    const sameMeter = exchanged('export', kwh, (read) => ({ ...read, meter: 'net' }));
    const apart = exchanged('export', kwh, (read) =>
      read.to === EXCHANGED ? { ...read, to: addDays(EXCHANGED, -1) } : read,
    );
    for (const tried of [sameMeter, apart]) expect(check(tried, AT, KEYS.export).cause).not.toMatch(WORDS);
  });

  test('are not named where a reading of the day of the exchange is missing, though the file is near enough complete', () => {
    const kwh = { old: earlier('export'), fresh: later('export') };
    const fine = inQuarters(exchanged('export', kwh));
    expect(check(fine, AT, KEYS.export).cause).toMatch(WORDS);
    const holed = {
      ...fine,
      intervals: fine.intervals.map((one) =>
        one.day === EXCHANGED ? { ...one, values: one.values.map((value, at) => (at === 40 ? null : value)) } : one,
      ),
    };
    expect(check(holed, AT, KEYS.export).verdict).toBe('differs');
    expect(check(holed, AT, KEYS.export).cause).not.toMatch(WORDS);
  });

  test('are found on the last day of the cycle too, when the new meter has seen nothing yet', () => {
    const last = addDays(statement.to, -1);
    const whole = Math.round(fileWh('export', statement.from, last) / 1000);
    const moved = exchanged('export', { old: whole, fresh: 0 }, (read) => ({
      ...read,
      from: read.from === EXCHANGED ? last : read.from,
      to: read.to === EXCHANGED ? last : read.to,
    }));
    expect(check(moved, AT, KEYS.export)).toMatchObject({ verdict: 'differs', cause: expect.stringMatching(WORDS) });
  });
});

/** The same days in quarter-hours. */
function inQuarters(given: HouseholdFacts): HouseholdFacts {
  const intervals = given.intervals.map((one) => {
    const total = one.values.reduce<number>((sum, value) => sum + (value ?? 0), 0);
    const values = Array.from(
      { length: 96 },
      (_, at) => Math.floor(((at + 1) * total) / 96) - Math.floor((at * total) / 96),
    );
    return { ...one, minutes: 15, values };
  });
  return { ...given, intervals };
}
