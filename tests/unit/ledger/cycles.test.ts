import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { Statement } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import type { Cycle } from '#shared/ledger/cycle.ts';
import { cycleSentence } from '#shared/ledger/sentences.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { BUILT_TODAY, type BuildOptions, buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';

function compute(facts: HouseholdFacts) {
  return computeLedger(facts, { today: BUILT_TODAY });
}

function cycleAt(facts: HouseholdFacts, index: number): Cycle {
  const cycle = compute(facts).cycles[index];
  if (!cycle) throw new Error(`no cycle ${index}`);
  return cycle;
}

function differing(cycle: Cycle): string[] {
  return cycle.checks.filter((check) => check.verdict === 'differs').map((check) => check.key);
}

function verdictOf(cycle: Cycle, key: string): string | undefined {
  return cycle.checks.find((check) => check.key === key)?.verdict;
}

/** Replaces the statement of one cycle by a change of it. */
function withStatement(
  facts: HouseholdFacts,
  index: number,
  change: (statement: Statement) => Statement,
): HouseholdFacts {
  return { ...facts, statements: facts.statements.map((one, at) => (at === index ? change(one) : one)) };
}

const WITH_FILES: BuildOptions = { intervals: { channels: ['import', 'export', 'monitor'], minutes: 60 } };

/** The third cycle, 14 Aug – 14 Sep, credits 44 kWh less than left. */
const SHORT: BuildOptions = {
  ...WITH_FILES,
  change: (cycle, at) => (at === 2 ? { ...cycle, creditedKwh: cycle.exportKwh - 44 } : cycle),
};

describe('a household whose bills agree with its meters', () => {
  test('has every cycle balanced, with nothing differing', () => {
    const { cycles } = compute(buildHousehold({ cycles: 14, ...WITH_FILES }));
    expect(cycles).toHaveLength(14);
    for (const cycle of cycles) {
      expect(differing(cycle)).toEqual([]);
      expect(cycle.state).toBe('balanced');
      expect(cycle.billedDueCents).toBe(cycle.oursDueCents);
    }
  });

  test('knows its energy: use is import + production − export', () => {
    const cycle = cycleAt(buildHousehold(), 2);
    expect(cycle.energy.import?.wh).toBe(498_000);
    expect(cycle.energy.export?.wh).toBe(256_000);
    expect(cycle.energy.production?.wh).toBe(1_310_000);
    expect(cycle.energy.selfUse?.wh).toBe(1_054_000);
    expect(cycle.energy.use?.wh).toBe(1_552_000);
  });

  test('every working beside a figure evaluates to it', () => {
    for (const options of [{ cycles: 14 }, SHORT, { ...SHORT, exportTo: 'bill' as const }, { bare: true }]) {
      const found = everyWorking(compute(buildHousehold(options)));
      expect(found.length).toBeGreaterThan(50);
      expect(found.filter((one) => !one.agrees)).toEqual([]);
    }
  });

  test('the entries of a cycle are those of the ledger, and add to what it added', () => {
    const ledger = compute(buildHousehold({ cycles: 5 }));
    const all = new Set(ledger.entries);
    for (const cycle of ledger.cycles) {
      expect(cycle.entries.length).toBeGreaterThan(0);
      expect(cycle.entries.every((entry) => all.has(entry) && entry.cycle === cycle.to)).toBe(true);
      const sum = cycle.entries.reduce((total, one) => total + (one.basis === 'memo' ? 0 : one.amountCents), 0);
      expect(cycle.addedCents).toBe(sum);
    }
  });

  test('computing twice gives the same ledger, and facts are left alone', () => {
    const facts = buildHousehold({ cycles: 4, ...WITH_FILES });
    const before = JSON.stringify(facts);
    expect(JSON.stringify(compute(facts))).toBe(JSON.stringify(compute(facts)));
    expect(JSON.stringify(facts)).toBe(before);
  });
});

describe('whatever the months were', () => {
  const kwh = fc.integer({ min: 0, max: 2000 });
  const months = fc.array(
    fc.record({
      importKwh: kwh,
      exportKwh: kwh,
      productionKwh: kwh,
      short: fc.integer({ min: 0, max: 60 }),
      estimated: fc.boolean(),
    }),
    { minLength: 1, maxLength: 6 },
  );

  test('the position is one figure by entry, by cycle and by book, and every working evaluates', () => {
    fc.assert(
      fc.property(months, fc.constantFrom('bill' as const, 'creditBank' as const), (built, exportTo) => {
        const household = buildHousehold({
          cycles: built.length,
          exportTo,
          change: (cycle, at) => {
            const { short = 0, ...month } = built[at] ?? {};
            const changed = { ...cycle, ...month };
            return { ...changed, creditedKwh: Math.max(0, changed.exportKwh - short) };
          },
        });
        // A short horizon: the projection is not what is tried here.
        const ledger = compute({ ...household, assumptions: { ...household.assumptions, horizonMonths: 12 } });
        const counted = ledger.entries.filter((entry) => entry.basis !== 'memo');
        const byEntry = counted.reduce((sum, entry) => sum + entry.amountCents, 0);
        const byCycle = ledger.position.points.reduce((sum, point) => sum + point.addedCents, 0);
        const byBook = ledger.position.points.reduce(
          (sum, point) => sum + Object.values(point.books).reduce((all, one) => all + one, 0),
          0,
        );
        expect([byCycle, byBook, ledger.position.cashSoFar.amountCents]).toEqual([byEntry, byEntry, byEntry]);
        expect(everyWorking(ledger).filter((one) => !one.agrees)).toEqual([]);
      }),
      { numRuns: 20 },
    );
  }, 60_000);
});

describe('a household without papers', () => {
  test('has a position and is asked for its first statement', () => {
    const ledger = compute({ ...buildHousehold(), statements: [] });
    expect(ledger.cycles).toEqual([]);
    expect(ledger.position.points.map((point) => point.cycle)).toEqual(['before']);
    expect(ledger.needs.map((need) => need.key)).toContain('first-statement');
    const bare = compute({ ...buildHousehold({ bare: true }), statements: [], plans: [] });
    expect(bare.position.cashSoFar.amountCents).toBe(0);
    expect(bare.needs.map((need) => need.key)).toContain('set-up');
  });
});

describe('an export credited short', () => {
  test('is found by the interval file, named in kWh and in money', () => {
    const cycle = cycleAt(buildHousehold({ ...SHORT, exportTo: 'bill' }), 2);
    expect(cycle.state).toBe('differs');
    expect(differing(cycle)).toEqual(['exportAgainstIntervals:', 'amountDue:']);
    const check = cycle.checks.find((one) => one.check === 'exportAgainstIntervals');
    expect([check?.stated, check?.found, check?.difference]).toEqual(['212', '256', '-44']);
    expect(
      cycleSentence(cycle)
        .map((part) => part.text)
        .join(''),
    ).toMatch(/The bill is \$4\.18 too high: it credits 44 kWh less than your meter saw leave\.$/);
  });

  test('stands on the facing pages in its own line and in the amount due', () => {
    const cycle = cycleAt(buildHousehold({ ...SHORT, exportTo: 'bill' }), 2);
    const lines = cycle.facing.map((line) => [
      line.label,
      line.billed?.amountCents,
      line.ours?.amountCents,
      line.verdict,
    ]);
    expect(lines).toEqual([
      ['Import', 8386, 8386, 'agrees'],
      ['Export credit', -2014, -2432, 'differs'],
      ['Customer charge', 1450, 1450, 'agrees'],
      ['Public benefits, on import', 304, 304, 'agrees'],
      ['City franchise, 3.1%', 314, 314, 'agrees'],
      ['Due', cycle.billedDueCents, cycle.billedDueCents - 418, 'differs'],
    ]);
    expect(cycle.facing[1]?.billed?.quantity).toBe('212');
    expect(cycle.facing[1]?.ours?.quantity).toBe('256');
    expect(cycle.facing[1]?.differenceCents).toBe(418);
  });

  test('credited into the bank, it is reported in its own cycle and not in the ones after', () => {
    const { cycles } = compute(buildHousehold({ ...SHORT, cycles: 5 }));
    expect(cycles.map((cycle) => cycle.state)).toEqual(['balanced', 'balanced', 'differs', 'balanced', 'balanced']);
    expect(differing(cycles[2] as Cycle)).toEqual(['exportAgainstIntervals:']);
  });

  test('without an interval file the statement’s own reads find it', () => {
    const cycle = cycleAt(buildHousehold({ ...SHORT, intervals: null, exportTo: 'bill' }), 2);
    expect(differing(cycle)).toContain('exportAgainstIntervals:');
    expect(cycle.checks.find((one) => one.check === 'exportAgainstIntervals')?.title).toBe(
      'Export, billed against the meter reads',
    );
  });

  test('is accepted once everything that differs is accepted with a note', () => {
    const facts = buildHousehold({ ...SHORT, exportTo: 'bill' });
    const accept = (check: string) => ({
      cycleTo: day('2025-09-14'),
      check,
      note: 'Credited by cheque.',
      by: 'Priya',
      on: BUILT_TODAY,
    });
    expect(cycleAt({ ...facts, accepted: [accept('amountDue:')] }, 2).state).toBe('differs');
    const both = { ...facts, accepted: [accept('amountDue:'), accept('exportAgainstIntervals:')] };
    expect(cycleAt(both, 2).state).toBe('accepted');
    expect(compute(both).needs.some((need) => need.key.startsWith('differs:'))).toBe(false);
  });

  test('asks for the owner first, with the amount and a link', () => {
    const { needs } = compute(buildHousehold({ ...SHORT, exportTo: 'bill' }));
    expect(needs[0]).toEqual({
      key: 'differs:2025-09-14',
      tone: 'bad',
      title: 'September’s bill is $4.18 too high',
      detail: 'Billed 212 kWh exported; your meter and interval data agree on 256.',
      link: 'cycles/2025-09-14',
    });
    expect(needs.length).toBeLessThanOrEqual(6);
  });
});

describe('what cannot be known', () => {
  test('without a rate plan a cycle is open and says what to do', () => {
    const cycle = cycleAt({ ...buildHousehold(), plans: [] }, 1);
    expect(cycle.state).toBe('open');
    expect(cycle.settlement).toBeNull();
    expect(cycle.oursDueCents).toBeNull();
    expect(cycle.whyNotSettled).toMatch(/rate plan/);
  });

  test('without an export figure nothing is taken for zero', () => {
    const facts = withStatement(buildHousehold(), 1, (statement) => ({
      ...statement,
      exportWh: null,
      reads: statement.reads.filter((read) => read.channel !== 'export'),
    }));
    const cycle = cycleAt(facts, 1);
    expect(cycle.energy.export).toBeNull();
    expect(cycle.energy.selfUse).toBeNull();
    expect(cycle.energy.use).toBeNull();
    expect(cycle.settlement).toBeNull();
    expect(cycle.whyNotSettled).toMatch(/^The export of this cycle is not known\./);
    expect(cycle.state).toBe('open');
  });

  test('interval data stand in for a statement without reads', () => {
    const facts = withStatement(buildHousehold(WITH_FILES), 1, (statement) => ({
      ...statement,
      importWh: null,
      exportWh: null,
      reads: [],
    }));
    const cycle = cycleAt(facts, 1);
    expect(cycle.energy.export?.from).toBe('intervals');
    expect(cycle.energy.export?.wh).toBe(390_000);
    expect(cycle.energy.production?.from).toBe('printed');
    expect(cycle.oursDueCents).toBe(cycle.billedDueCents);
  });

  test('a monitoring file with a gap is nothing to compare, and is asked after', () => {
    const facts = buildHousehold(WITH_FILES);
    const gap = facts.intervals.filter(
      (one) => one.channel !== 'monitor' || one.day < '2025-08-20' || one.day > '2025-08-25',
    );
    const ledger = compute({ ...facts, intervals: gap });
    const cycle = ledger.cycles[2] as Cycle;
    const check = cycle.checks.find((one) => one.check === 'productionAgainstMonitor');
    expect(check?.verdict).toBe('nothing-to-compare');
    expect(check?.cause).toBe('The monitoring file lacks 6 days of this cycle’s 31 days.');
    expect(ledger.needs.some((need) => need.key === 'production-gap:2025-09-14')).toBe(true);
  });
});

describe('use without a roof', () => {
  test('is the measured use on the plan without the roof', () => {
    const cycle = cycleAt(buildHousehold(), 2);
    // 1,552 kWh: energy 261.36 (261.3568), customer 14.50, benefits 9.47 (9.4672), franchise 8.85 (285.33 × 3.1 % = 8.84523).
    expect(cycle.withoutRoof?.method).toBe('measured');
    expect(cycle.withoutRoof?.amountCents).toBe(26_136 + 1450 + 947 + 885);
    const entry = cycle.entries.find((one) => one.book === 'billAvoided');
    expect(entry?.amountCents).toBe((cycle.withoutRoof?.amountCents ?? 0) - cycle.asItWas.amountCents);
    expect(entry?.estimated).toBe(false);
  });

  const blind = (facts: HouseholdFacts) => ({
    ...facts,
    statements: facts.statements.map((one) => ({
      ...one,
      productionWh: null,
      reads: one.reads.filter((read) => read.channel !== 'production'),
    })),
  });

  test('falls back to the same month before, by days, and is called estimated', () => {
    const facts = {
      ...blind(buildHousehold()),
      usageBefore: [
        { from: day('2024-08-14'), to: day('2024-09-13'), importWh: wh(1_500_000) },
        { from: day('2024-12-14'), to: day('2025-01-13'), importWh: wh(9_000_000) },
      ],
    };
    const cycle = cycleAt(facts, 2);
    expect(cycle.withoutRoof?.method).toBe('sameMonthBefore');
    expect(cycle.withoutRoof?.useWh).toBe(1_550_000);
    expect(cycle.withoutRoof?.working.basis).toBe('estimated');
    expect(cycle.entries.find((one) => one.book === 'billAvoided')?.estimated).toBe(true);
  });

  test('falls back to the yearly mean only when bills cover most of a year', () => {
    const year = { from: day('2024-05-01'), to: day('2025-04-01'), importWh: wh(3_350_000) };
    const cycle = cycleAt({ ...blind(buildHousehold()), usageBefore: [year] }, 2);
    expect(cycle.withoutRoof?.method).toBe('yearlyMeanBefore');
    expect(cycle.withoutRoof?.useWh).toBe(310_000);
    const half = { ...year, to: day('2024-09-01') };
    expect(cycleAt({ ...blind(buildHousehold()), usageBefore: [half] }, 2).withoutRoof).toBeNull();
  });
});

describe('the bill as it was', () => {
  test('leaves out the previous balance, payments, other services, late fees and instalments', () => {
    const extra = (kind: 'otherService' | 'adjustment', label: string, amount: number) => ({
      component: null,
      kind,
      label,
      quantity: null,
      unit: null,
      rate: null,
      amountCents: cents(amount),
      inDue: true,
      row: null,
    });
    const clean = buildHousehold();
    const facts = withStatement(clean, 1, (statement) => ({
      ...statement,
      lines: [
        ...statement.lines,
        extra('otherService', 'Water', 4120),
        extra('adjustment', 'Late payment charge', 500),
        extra('adjustment', 'Payment plan instalment', 2500),
        extra('adjustment', 'Correction of July', -300),
      ],
      amountDueCents: cents(statement.amountDueCents + 4120 + 500 + 2500 - 300),
    }));
    const cycle = cycleAt(facts, 1);
    expect(cycle.asItWas.amountCents).toBe(cycleAt(clean, 1).asItWas.amountCents - 300);
    expect(differing(cycle)).toEqual([]);
    expect(cycle.oursDueCents).toBe(cycle.billedDueCents);
  });

  test('an incentive paid inside the bill is added back and counted once, in its own book', () => {
    const base = buildHousehold();
    const facts = withStatement(
      { ...base, incentive: base.incentive && { ...base.incentive, paidAs: 'billCredit', received: [] } },
      1,
      (statement) => ({
        ...statement,
        lines: [
          ...statement.lines,
          {
            component: null,
            kind: 'incentive',
            label: 'Production incentive',
            quantity: '1450',
            unit: 'kWh',
            rate: '0.045',
            amountCents: cents(-6525),
            inDue: true,
            row: null,
          },
        ],
        amountDueCents: cents(statement.amountDueCents - 6525),
      }),
    );
    const cycle = cycleAt(facts, 1);
    expect(cycle.asItWas.amountCents).toBe(cycleAt(base, 1).asItWas.amountCents);
    const cash = cycle.entries.filter((one) => one.book === 'incentive' && one.basis === 'cash');
    expect(cash.map((one) => one.amountCents)).toEqual([6525]);
  });
});

describe('the first cycle', () => {
  test('begins at switch-on: a statement that holds the day is split by days and called estimated', () => {
    const facts = buildHousehold();
    const cycle = cycleAt({ ...facts, house: { ...facts.house, switchOn: day('2025-06-29') } }, 0);
    expect([cycle.from, cycle.to, cycle.days, cycle.split]).toEqual(['2025-06-29', '2025-07-14', 15, true]);
    // Half of 450 kWh imported in 30 days.
    expect(cycle.energy.import?.wh).toBe(225_000);
    expect(cycle.energy.import?.working.basis).toBe('estimated');
    expect(cycle.entries.find((one) => one.book === 'billAvoided')?.estimated).toBe(true);
    expect(differing(cycle)).toEqual([]);
    expect(cycle.state).toBe('balanced');
    const printed = facts.statements[0]?.amountDueCents ?? 0;
    expect(Math.abs(cycle.billedDueCents - printed / 2)).toBeLessThanOrEqual(2);
  });

  test('is split by a register read of the day where there is one', () => {
    const facts = buildHousehold();
    const on = day('2025-06-29');
    const cut = withStatement(facts, 0, (statement) => ({
      ...statement,
      reads: statement.reads.flatMap((read) => {
        const middle = String(Number(read.previous) + 10);
        return [
          { ...read, to: on, current: middle },
          { ...read, from: on, previous: middle },
        ];
      }),
    }));
    const cycle = cycleAt({ ...cut, house: { ...cut.house, switchOn: on } }, 0);
    expect(cycle.split).toBe(true);
    expect(cycle.energy.import?.wh).toBe(440_000);
    expect(cycle.energy.import?.working.basis).toBe('metered');
  });

  test('statements that end by switch-on are not cycles, but tell the use before', () => {
    const facts = buildHousehold({ cycles: 14 });
    const ledger = compute({
      ...facts,
      house: { ...facts.house, switchOn: day('2026-06-14') },
      statements: facts.statements.map((one) =>
        one.to > '2026-06-14'
          ? { ...one, productionWh: null, reads: one.reads.filter((read) => read.channel !== 'production') }
          : one,
      ),
    });
    expect(ledger.cycles).toHaveLength(2);
    expect(ledger.cycles[0]?.withoutRoof?.method).toBe('sameMonthBefore');
    expect(ledger.cycles[0]?.withoutRoof?.useWh).toBe(450_000);
    expect(verdictOf(ledger.cycles[0] as Cycle, 'datesChain:')).toBe('agrees');
  });
});

describe('a correction', () => {
  test('is the highest revision; the old one no longer counts', () => {
    const facts = buildHousehold();
    const [first] = facts.statements;
    if (!first) throw new Error('no statement');
    const corrected = { ...first, revision: 2, reason: 'Typed wrong', printedDays: 31 };
    const cycle = cycleAt({ ...facts, statements: [corrected, ...facts.statements] }, 0);
    expect(cycle.statement.revision).toBe(2);
    expect(differing(cycle)).toEqual(['days:']);
    expect(compute({ ...facts, statements: [corrected, ...facts.statements] }).cycles).toHaveLength(3);
  });
});

describe('the next statement', () => {
  test('is asked for near its usual day and called late after it', () => {
    const facts = buildHousehold({ cycles: 6 });
    const last = facts.statements.at(-1)?.to ?? BUILT_TODAY;
    const need = (today: string) =>
      computeLedger(facts, { today: day(today) }).needs.find((one) => one.key === 'next-statement');
    expect(need(addDays(last, 20))).toBeUndefined();
    expect(need(addDays(last, 33))?.tone).toBe('note');
    expect(need(addDays(last, 60))?.tone).toBe('bad');
  });
});
