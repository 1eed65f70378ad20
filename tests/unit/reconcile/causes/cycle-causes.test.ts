import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { RegisterRead, Statement } from '#shared/facts/papers.ts';
import { assembleCycles } from '#shared/ledger/cycles.ts';
import { usageOf } from '#shared/ledger/settle-cycle.ts';
import { meterCycle, witnessCycle } from '#shared/metering/cycle-energy.ts';
import { estimatedRuns } from '#shared/metering/estimated-reads.ts';
import { indexIntervals } from '#shared/metering/interval-index.ts';
import type { Cause } from '#shared/reconcile/causes/cause.ts';
import { causesOfCycle, type LedgerCycle } from '#shared/reconcile/causes/cycle-causes.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, day } from '#shared/units/day.ts';
import { buildHousehold, builtPlan } from '#tests/support/build-household.ts';
import { sampleFacts } from '#tests/support/sample-facts.ts';

function ledgerCycles(facts: HouseholdFacts): LedgerCycle[] {
  const { cycles } = assembleCycles(facts);
  const index = indexIntervals(facts.intervals, facts.documents);
  const papers = cycles.map((one) => one.paper);
  const runs = estimatedRuns(papers);
  const witnessed = papers.map((paper) => witnessCycle(paper, index));
  return cycles.map(({ paper, settled }) => {
    const metered = meterCycle(paper, witnessed, runs);
    const usage = settled.plan === null ? '' : usageOf(facts, paper, metered, index, settled.plan.plan);
    return { paper, settled, metered, usage: typeof usage === 'string' ? null : usage };
  });
}

function causesOf(facts: HouseholdFacts): Map<string, Cause[]> {
  const cycles = ledgerCycles(facts);
  return new Map(
    cycles.map((own, at) => {
      const neighbours = { before: cycles[at - 1] ?? null, after: cycles[at + 1] ?? null };
      return [own.paper.to, causesOfCycle(own, neighbours)];
    }),
  );
}

describe('the sample household', () => {
  const causes = causesOf(sampleFacts());

  test('September 2026 credits 44 kWh less than the meter saw leave, $3.74 too much', () => {
    expect(causes.get(day('2026-09-14'))).toMatchObject([
      {
        cause: 'exportShort',
        words: 'It credits 44 kWh less than your meter saw leave.',
        overbilledCents: 374,
        bankShort: [{ bank: 'creditBank', period: null, unit: 'USD', short: '0.00' }],
      },
    ]);
  });

  test('the January read that was estimated is found from both of its cycles', () => {
    for (const to of ['2025-01-14', '2025-02-13']) {
      expect(causes.get(to)).toMatchObject([
        {
          cause: 'estimatedRead',
          words: 'The import and export read of 14 Jan was estimated; the read of 13 Feb made up for it.',
        },
      ]);
    }
  });

  test('cycles whose bills are right have none', () => {
    const found = [...causes].filter(([, some]) => some.length > 0).map(([to]) => to);
    // The exchange of September 2025 lost the kWh between the last read of the old meter and the first of the new one.
    expect(found).toEqual(['2025-01-14', '2025-02-13', '2025-10-14', '2026-09-14']);
  });
});

describe('built households', () => {
  const one = (facts: HouseholdFacts, at: number) => [...causesOf(facts).values()][at] ?? [];

  function changed(facts: HouseholdFacts, at: number, change: (statement: Statement) => Statement): HouseholdFacts {
    return { ...facts, statements: facts.statements.map((statement, i) => (i === at ? change(statement) : statement)) };
  }

  const short = () =>
    buildHousehold({ bare: true, change: (cycle, at) => (at === 1 ? { ...cycle, creditedKwh: 300 } : cycle) });

  test('a credit short of the reads is found from the printed lines', () => {
    expect(one(short(), 1)).toMatchObject([{ cause: 'exportShort', found: { billedKwh: '300' } }]);
    expect(one(short(), 0)).toEqual([]);
    expect(one(short(), 2)).toEqual([]);
  });

  test('other services, a balance and a line no plan knows stay out of it', () => {
    const facts = changed(short(), 1, (statement) => ({
      ...statement,
      lines: [
        ...statement.lines,
        {
          component: null,
          kind: 'otherService',
          label: 'Water',
          quantity: null,
          unit: null,
          rate: null,
          amountCents: cents(3100),
          inDue: true,
          row: null,
        },
        {
          component: null,
          kind: 'adjustment',
          label: 'Memo',
          quantity: null,
          unit: null,
          rate: null,
          amountCents: cents(99),
          inDue: false,
          row: null,
        },
      ],
      amountDueCents: cents(statement.amountDueCents + 3100),
    }));
    expect(one(facts, 1)).toMatchObject([{ cause: 'exportShort' }]);
    expect(
      one(
        changed(facts, 1, (s) => ({ ...s, amountDueCents: cents(s.amountDueCents + 1) })),
        1,
      ),
    ).toEqual([]);
  });

  test('a lost bank is found from its printed opening and closing', () => {
    const facts = buildHousehold({ bare: true });
    const lost = changed(facts, 2, (statement) => {
      const paid = statement.lines.find((line) => line.component === 'creditBank')?.amountCents ?? 0;
      const lines = statement.lines.map((line) =>
        line.component === 'creditBank' ? { ...line, amountCents: cents(0) } : line,
      );
      const earned = -(statement.lines.find((line) => line.component === 'exportCredit')?.amountCents ?? 0);
      return {
        ...statement,
        lines,
        banks: statement.banks.map((bank) => ({ ...bank, open: '0.00', close: (earned / 100).toString() })),
        amountDueCents: cents(statement.amountDueCents - paid),
      };
    });
    expect(one(lost, 2)).toMatchObject([{ cause: 'bankLost' }]);
  });

  test('nothing is said without lines, without a plan, without reads, or of a cycle split at switch-on', () => {
    expect(
      one(
        changed(short(), 1, (s) => ({ ...s, lines: [] })),
        1,
      ),
    ).toEqual([]);
    expect(one({ ...short(), plans: [] }, 1)).toEqual([]);
    const blind = changed(short(), 1, (s) => ({ ...s, reads: [], importWh: null, exportWh: null }));
    expect(one(blind, 1)).toEqual([]);
    const facts = buildHousehold({
      bare: true,
      change: (cycle, at) => (at === 0 ? { ...cycle, creditedKwh: 300 } : cycle),
    });
    const [first] = facts.statements;
    if (!first) throw new Error('no statement');
    const split = { ...facts, house: { ...facts.house, switchOn: addDays(first.from, 5) } };
    expect(one(split, 0)).toEqual([]);
  });

  test('the kWh printed beside the registers count where no line says them', () => {
    const unsaid = changed(short(), 1, (s) => ({ ...s, lines: s.lines.map((line) => ({ ...line, quantity: null })) }));
    expect(one(unsaid, 1)).toMatchObject([{ cause: 'exportShort', found: { billedKwh: '300' } }]);
  });

  test('a bank that the plan does not have, or keeps by period, is not faced with one printed figure', () => {
    const stray = changed(short(), 1, (s) => ({
      ...s,
      banks: [
        ...s.banks,
        {
          bank: 'kwhBank',
          unit: 'kWh' as const,
          open: '5',
          close: '5',
          sentOut: null,
          sentValueCents: null,
          row: null,
        },
      ],
    }));
    expect(one(stray, 1)).toMatchObject([{ cause: 'exportShort' }]);
    const plan = builtPlan('creditBank');
    const periods = {
      ...plan,
      calendar: { seasons: [], holidays: null, periods: [{ id: 'all', label: '', when: 'rest' as const }] },
      banks: [
        ...plan.banks,
        {
          ...plan.banks.reduce((bank) => bank),
          id: 'kwhBank',
          unit: 'kWh' as const,
          netting: 'period' as const,
          byPeriod: true,
          offsets: [],
        },
      ],
    };
    const facts = { ...stray, plans: [{ from: day('2025-01-01'), plan: periods, withoutRoof: null }] };
    const hourly = buildHousehold({ bare: true, intervals: { channels: ['import', 'export'], minutes: 60 } });
    expect(one({ ...facts, intervals: hourly.intervals }, 1)).toMatchObject([{ cause: 'exportShort' }]);
  });

  describe('an estimated read', () => {
    const channels = { channels: ['import' as const, 'export' as const], minutes: 60 as const };
    const actual = buildHousehold({ bare: true, exportTo: 'bill', intervals: channels });

    /** The first statement billed on an estimate 100 kWh too high, the second making up for it. */
    function estimated(change: (read: RegisterRead, at: number) => RegisterRead = (read) => read): HouseholdFacts {
      const built = buildHousehold({
        bare: true,
        exportTo: 'bill',
        intervals: channels,
        change: (cycle, at) => ({
          ...cycle,
          importKwh: cycle.importKwh + (at === 0 ? 100 : at === 1 ? -100 : 0),
          estimated: at === 0,
        }),
      });
      const statements = built.statements.map((statement, at) => ({
        ...statement,
        reads: statement.reads.map((read) => change(read, at)),
      }));
      return { ...built, intervals: actual.intervals, statements };
    }

    const importOnly = (read: RegisterRead): RegisterRead =>
      read.channel === 'import' ? read : { ...read, type: 'actual' };

    test('is found in both cycles from the interval data', () => {
      const facts = estimated(importOnly);
      for (const at of [0, 1]) {
        expect(one(facts, at)).toMatchObject([{ cause: 'estimatedRead', found: { channels: 'import' } }]);
      }
      expect(one(facts, 2)).toEqual([]);
    });

    test('is not without interval data, with others than the registers bear out, or while the next read is an estimate too', () => {
      expect(one({ ...estimated(importOnly), intervals: [] }, 0)).toEqual([]);
      const most = actual.intervals.map((one) => ({ ...one, values: one.values.map((value) => (value ?? 0) * 2) }));
      expect(one({ ...estimated(importOnly), intervals: most }, 0).map((found) => found.cause)).not.toContain(
        'estimatedRead',
      );
      const both = estimated((read, at) => ({
        ...importOnly(read),
        ...(at === 1 && read.channel === 'import' ? { type: 'estimated' as const } : {}),
      }));
      expect(one(both, 0)).toEqual([]);
      const unread = changed(estimated(importOnly), 1, (s) => ({
        ...s,
        reads: s.reads.filter((read) => read.channel !== 'import'),
      }));
      expect(one(unread, 0)).toEqual([]);
    });

    test('is not where the next statement does not follow, or has no lines', () => {
      const gap = changed(estimated(importOnly), 1, (s) => ({ ...s, from: addDays(s.from, 1) }));
      expect(one(gap, 0)).toEqual([]);
      const bare = changed(estimated(importOnly), 1, (s) => ({ ...s, lines: [] }));
      expect(one(bare, 0)).toEqual([]);
    });
  });
});
