import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { RegisterRead, Statement } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import type { Check } from '#shared/reconcile/check.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';

function checksOf(facts: HouseholdFacts, index: number): Check[] {
  return computeLedger(facts, { today: BUILT_TODAY }).cycles[index]?.checks ?? [];
}

function changed(index: number, change: (statement: Statement) => Statement, facts = buildHousehold()): HouseholdFacts {
  return { ...facts, statements: facts.statements.map((one, at) => (at === index ? change(one) : one)) };
}

function one(checks: readonly Check[], key: string): Check {
  const found = checks.find((check) => check.key === key);
  if (!found) throw new Error(`no check ${key} among ${checks.map((check) => check.key).join(' ')}`);
  return found;
}

function differing(checks: readonly Check[]): string[] {
  return checks.filter((check) => check.verdict === 'differs').map((check) => check.key);
}

describe('dates', () => {
  test('a gap between statements differs and names the missing days', () => {
    const facts = buildHousehold({ cycles: 4 });
    const check = one(
      checksOf({ ...facts, statements: facts.statements.filter((_, at) => at !== 1) }, 1),
      'datesChain:',
    );
    expect(check.verdict).toBe('differs');
    expect(check.difference).toBe('31');
    expect(check.cause).toMatch(/^31 days are on no statement/);
  });

  test('an overlap is days billed twice', () => {
    const check = one(
      checksOf(
        changed(1, (s) => ({ ...s, from: addDays(s.from, -2) })),
        1,
      ),
      'datesChain:',
    );
    expect(check.cause).toMatch(/^2 days are billed twice/);
  });

  test('printed days that are not the dates’ differ; a missing number is nothing to compare', () => {
    expect(
      one(
        checksOf(
          changed(1, (s) => ({ ...s, printedDays: 30 })),
          1,
        ),
        'days:',
      ).verdict,
    ).toBe('differs');
    expect(
      one(
        checksOf(
          changed(1, (s) => ({ ...s, printedDays: null })),
          1,
        ),
        'days:',
      ).verdict,
    ).toBe('nothing-to-compare');
  });
});

describe('register reads', () => {
  const importOf = (change: (read: RegisterRead) => RegisterRead) => (statement: Statement) => ({
    ...statement,
    reads: statement.reads.map((read) => (read.channel === 'import' ? change(read) : read)),
  });

  test('a read that does not start where the last one ended differs by what lies between', () => {
    const facts = changed(
      1,
      importOf((read) => ({ ...read, previous: String(Number(read.previous) - 7) })),
    );
    const check = one(checksOf(facts, 1), 'registersFollow:import:net');
    expect(check.verdict).toBe('differs');
    expect(check.difference).toBe('-7');
  });

  test('dials that pass all nines follow on', () => {
    const facts = changed(
      1,
      importOf((read) => ({ ...read, previous: '99800', current: '00320' })),
      changed(
        0,
        importOf((read) => ({ ...read, previous: '99350', current: '99800' })),
      ),
    );
    const checks = checksOf(facts, 1);
    expect(one(checks, 'registersFollow:import:net').verdict).toBe('agrees');
    // 99,800 to 100,320 is 520 kWh, as billed.
    expect(one(checks, 'importAgainstIntervals:').verdict).toBe('agrees');
  });

  test('a meter exchange follows on: the old meter by its reads, the new one by its day', () => {
    const on = day('2025-08-01');
    const swap = (statement: Statement): Statement => ({
      ...statement,
      reads: statement.reads.flatMap((read) =>
        read.channel === 'production'
          ? [read]
          : [
              { ...read, to: on, current: String(Number(read.previous) + 100) },
              {
                ...read,
                meter: 'net2',
                from: on,
                previous: '3',
                current: String(Number(read.current) - Number(read.previous) - 97),
              },
            ],
      ),
    });
    const next = (statement: Statement): Statement => ({
      ...statement,
      reads: statement.reads.map((read) =>
        read.channel === 'production'
          ? read
          : {
              ...read,
              meter: 'net2',
              previous: read.channel === 'import' ? '423' : '293',
              current: String((read.channel === 'import' ? 423 : 293) + Number(read.current) - Number(read.previous)),
            },
      ),
    });
    const facts = changed(2, next, changed(1, swap));
    expect(differing(checksOf(facts, 1))).toEqual([]);
    expect(one(checksOf(facts, 1), 'registersFollow:import:net2').verdict).toBe('agrees');
    expect(one(checksOf(facts, 2), 'registersFollow:import:net2').verdict).toBe('agrees');
  });

  test('an exchange whose new meter begins a day late differs', () => {
    const on = day('2025-08-01');
    const facts = changed(1, (statement) => ({
      ...statement,
      reads: statement.reads.flatMap((read) =>
        read.channel === 'production'
          ? [read]
          : [
              { ...read, to: on },
              { ...read, meter: 'net2', from: addDays(on, 3), previous: '0', current: '0' },
            ],
      ),
    }));
    expect(one(checksOf(facts, 1), 'registersFollow:import:net2').verdict).toBe('differs');
  });
});

describe('an estimated read', () => {
  /** The second cycle’s reads are estimated 60 kWh too high on import; the third makes up for it. */
  const estimated = (cycles: number) =>
    buildHousehold({
      cycles,
      intervals: { channels: ['import', 'export'], minutes: 1440 },
      change: (cycle, at) => (at === 1 ? { ...cycle, estimated: true } : cycle),
    });
  const off = (facts: HouseholdFacts): HouseholdFacts => ({
    ...facts,
    intervals: facts.intervals.map((one) => {
      if (one.channel !== 'import') return one;
      const shift =
        one.day >= '2025-07-14' && one.day < '2025-07-20'
          ? -10_000
          : one.day >= '2025-08-14' && one.day < '2025-08-20'
            ? 10_000
            : 0;
      return { ...one, values: one.values.map((value) => (value === null ? null : value + shift)) };
    }),
  });

  test('makes its cycle provisional and open until an actual read follows', () => {
    const ledger = computeLedger(off(estimated(2)), { today: BUILT_TODAY });
    expect(ledger.cycles.map((cycle) => [cycle.state, cycle.provisional])).toEqual([
      ['balanced', false],
      ['open', true],
    ]);
    expect(one(ledger.cycles[1]?.checks ?? [], 'readType:').verdict).toBe('nothing-to-compare');
    expect(one(ledger.cycles[1]?.checks ?? [], 'importAgainstIntervals:').verdict).toBe('nothing-to-compare');
    expect(ledger.needs.some((need) => need.key === 'provisional:2025-08-14')).toBe(true);
  });

  test('is settled together with the next cycle by its actual read', () => {
    const ledger = computeLedger(off(estimated(3)), { today: BUILT_TODAY });
    expect(ledger.cycles.map((cycle) => [cycle.state, cycle.provisional])).toEqual([
      ['balanced', false],
      ['balanced', false],
      ['balanced', false],
    ]);
    const check = one(ledger.cycles[1]?.checks ?? [], 'importAgainstIntervals:');
    expect([check.stated, check.found]).toEqual(['1018', '1018']);
  });

  test('that was not made up for differs in both cycles', () => {
    const facts = off(estimated(3));
    const short = {
      ...facts,
      intervals: facts.intervals.map((day) =>
        day.channel === 'import' && day.day === '2025-08-01' ? { ...day, values: [0] } : day,
      ),
    };
    const ledger = computeLedger(short, { today: BUILT_TODAY });
    expect(one(ledger.cycles[1]?.checks ?? [], 'importAgainstIntervals:').verdict).toBe('differs');
    expect(one(ledger.cycles[2]?.checks ?? [], 'importAgainstIntervals:').verdict).toBe('differs');
  });
});

describe('energy', () => {
  test('a whole-kWh difference to the interval file agrees, and the register stands', () => {
    const facts = buildHousehold({ intervals: { channels: ['export'], minutes: 1440 } });
    const nudged = {
      ...facts,
      intervals: facts.intervals.map((day) =>
        day.day === '2025-07-20' ? { ...day, values: [(day.values[0] ?? 0) + 900] } : day,
      ),
    };
    const ledger = computeLedger(nudged, { today: BUILT_TODAY });
    expect(ledger.cycles[1]?.energy.export?.from).toBe('register');
    expect(one(ledger.cycles[1]?.checks ?? [], 'exportAgainstIntervals:').verdict).toBe('agrees');
  });

  test('an incomplete interval file is nothing to compare and says what would settle it', () => {
    const facts = buildHousehold({ intervals: { channels: ['import'], minutes: 1440 } });
    const bare = changed(1, (s) => ({ ...s, reads: [] }), facts);
    const check = one(
      checksOf({ ...bare, intervals: bare.intervals.filter((one) => one.day !== '2025-07-20') }, 1),
      'importAgainstIntervals:',
    );
    expect(check.verdict).toBe('nothing-to-compare');
    expect(check.cause).toMatch(/lacks 1 day/);
    expect(check.advice).toMatch(/covers the whole cycle/);
  });

  test('export may exceed production by the meters’ own error and no more: E ≤ P × 1.04 + 2', () => {
    const within = buildHousehold({ change: (cycle) => ({ ...cycle, productionKwh: 100, exportKwh: 106 }) });
    expect(one(checksOf(within, 1), 'exportWithinProduction:').verdict).toBe('agrees');
    const beyond = buildHousehold({ change: (cycle) => ({ ...cycle, productionKwh: 100, exportKwh: 107 }) });
    expect(one(checksOf(beyond, 1), 'exportWithinProduction:').verdict).toBe('differs');
  });

  test('the monitor may be 5 % off the production meter and no more', () => {
    const at = (factor: number) => {
      const facts = buildHousehold({ intervals: { channels: ['monitor'], minutes: 1440 } });
      return {
        ...facts,
        intervals: facts.intervals.map((one) => ({
          ...one,
          values: one.values.map((v) => (v === null ? null : Math.round(v * factor))),
        })),
      };
    };
    expect(one(checksOf(at(0.955), 1), 'productionAgainstMonitor:').verdict).toBe('agrees');
    expect(one(checksOf(at(0.94), 1), 'productionAgainstMonitor:').verdict).toBe('differs');
  });
});

describe('lines and sums', () => {
  const lineChanged =
    (component: string, change: (line: Statement['lines'][number]) => Statement['lines'][number]) =>
    (s: Statement) => ({
      ...s,
      lines: s.lines.map((line) => (line.component === component ? change(line) : line)),
    });

  test('a line priced at another rate differs in its price, not in its quantity', () => {
    const facts = changed(1, (s) => {
      const off = lineChanged('benefits', (line) => ({ ...line, rate: '0.0081', amountCents: cents(421) }))(s);
      return { ...off, amountDueCents: cents(s.amountDueCents + 421 - 317) };
    });
    const checks = checksOf(facts, 1);
    expect(one(checks, 'linePrice:benefits').verdict).toBe('differs');
    expect(one(checks, 'linePrice:energy').verdict).toBe('agrees');
    expect(one(checks, 'importAgainstIntervals:').verdict).toBe('agrees');
    expect(one(checks, 'amountDue:').verdict).toBe('differs');
    expect(one(checks, 'amountDue:').cause).toMatch(/^Public benefits, on import is billed at \$4\.21/);
  });

  test('a cent on one line is rounding', () => {
    const facts = changed(1, (s) => ({
      ...lineChanged('energy', (line) => ({ ...line, amountCents: cents(line.amountCents + 1) }))(s),
      amountDueCents: cents(s.amountDueCents + 1),
    }));
    expect(differing(checksOf(facts, 1))).toEqual([]);
  });

  test('a tax is checked on the billed lines it is taken on', () => {
    const check = one(
      checksOf(
        changed(
          1,
          lineChanged('franchise', (line) => ({ ...line, amountCents: cents(line.amountCents + 9) })),
        ),
        1,
      ),
      'linePrice:franchise',
    );
    expect(check.verdict).toBe('differs');
    expect(check.difference).toBe('0.09');
  });

  test('a line without a quantity cannot be priced and says so', () => {
    const check = one(
      checksOf(
        changed(
          1,
          lineChanged('benefits', (line) => ({ ...line, quantity: null })),
        ),
        1,
      ),
      'linePrice:benefits',
    );
    expect(check.verdict).toBe('nothing-to-compare');
    expect(check.cause).toMatch(/no quantity/);
  });

  test('lines that do not come to the amount due differ', () => {
    expect(
      differing(
        checksOf(
          changed(1, (s) => ({ ...s, amountDueCents: cents(s.amountDueCents + 500) })),
          1,
        ),
      ),
    ).toEqual(['linesAddUp:', 'amountDue:']);
  });

  test('a previous balance that is not what was asked for differs', () => {
    const facts = changed(1, (s) => ({
      ...s,
      previousBalanceCents: cents((s.previousBalanceCents ?? 0) + 1500),
      amountDueCents: cents(s.amountDueCents + 1500),
    }));
    expect(differing(checksOf(facts, 1))).toEqual(['balanceChain:']);
  });

  test('a line the plan does not know is said, and differs on the facing pages', () => {
    const facts = changed(1, (s) => ({
      ...s,
      lines: [
        ...s.lines,
        {
          component: null,
          kind: 'nonbypassable',
          label: 'Grid support',
          quantity: null,
          unit: null,
          rate: null,
          amountCents: cents(700),
          inDue: true,
          row: null,
        },
      ],
      amountDueCents: cents(s.amountDueCents + 700),
    }));
    const cycle = computeLedger(facts, { today: BUILT_TODAY }).cycles[1];
    expect(cycle?.facing.find((line) => line.label === 'Grid support')?.verdict).toBe('differs');
    expect(one(cycle?.checks ?? [], 'amountDue:').difference).toBe('7.00');
  });
});

describe('the credit bank', () => {
  test('a balance lost between two statements is found once, with what our side would have paid', () => {
    const facts = changed(1, (s) => ({
      ...s,
      lines: s.lines.map((line) => (line.component === 'creditBank' ? { ...line, amountCents: cents(0) } : line)),
      banks: s.banks.map((bank) => ({ ...bank, open: '0.00', close: '37.05' })),
      amountDueCents: cents(s.amountDueCents + 4085),
    }));
    const ledger = computeLedger(facts, { today: BUILT_TODAY });
    const checks = ledger.cycles[1]?.checks ?? [];
    expect(differing(checks)).toEqual(['bankChain:creditBank', 'amountDue:']);
    expect(one(checks, 'amountDue:').difference).toBe('40.85');
    expect(one(checks, 'amountDue:').cause).toMatch(/^Credit brought in opens with nothing/);
    expect(one(checks, 'bankChain:creditBank').cause).toMatch(/^It closed at \$40\.85/);
  });

  test('a close that the billed kWh do not give differs', () => {
    const facts = changed(2, (s) => ({ ...s, banks: s.banks.map((bank) => ({ ...bank, close: '1.00' })) }));
    expect(differing(checksOf(facts, 2))).toEqual(['bankChain:creditBank.close']);
  });
});

describe('printed kWh', () => {
  test('stand where there are no reads', () => {
    const facts = changed(1, (s) => ({ ...s, reads: [], importWh: wh(520_000) }));
    const ledger = computeLedger(facts, { today: BUILT_TODAY });
    expect(ledger.cycles[1]?.energy.import?.from).toBe('printed');
    expect(one(ledger.cycles[1]?.checks ?? [], 'readType:').verdict).toBe('nothing-to-compare');
  });
});
