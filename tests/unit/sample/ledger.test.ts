import { describe, expect, it } from 'vitest';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { sumCents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import { SAMPLE_TODAY, sampleFacts } from '#tests/support/sample-facts.ts';

const facts = sampleFacts();
const ledger = computeLedger(facts, { today: SAMPLE_TODAY });
const { position } = ledger;
const cycleTo = (to: string) => {
  const found = ledger.cycles.find((cycle) => cycle.to === to);
  if (!found) throw new Error(`no cycle to ${to}`);
  return found;
};

describe('the sample’s ledger', () => {
  it('balances 24 cycles; only the exchange of October 2025 and the short export of September 2026 differ', () => {
    expect(ledger.cycles.length).toBe(26);
    const other = ledger.cycles.filter((cycle) => cycle.state !== 'balanced').map((cycle) => [cycle.to, cycle.state]);
    expect(other).toEqual([
      ['2025-10-14', 'differs'],
      ['2026-09-14', 'differs'],
    ]);
  });

  it('recomputes the bills of the balanced cycles to the cent, line by line, with arithmetic the billing script never saw', () => {
    let compared = 0;
    for (const cycle of ledger.cycles.filter(({ state }) => state === 'balanced')) {
      for (const line of cycle.facing) {
        if (line.differenceCents === null) continue;
        expect([cycle.to, line.label, line.differenceCents]).toEqual([cycle.to, line.label, 0]);
        compared += 1;
      }
    }
    expect(compared).toBeGreaterThan(24 * 6);
  });

  it('finds September 2026 44 kWh short and $3.74 too dear', () => {
    const cycle = cycleTo('2026-09-14');
    const check = cycle.checks.find((found) => found.check === 'exportAgainstIntervals');
    expect([check?.verdict, check?.stated]).toEqual(['differs', '698']);
    expect(cycle.energy.export?.wh).toBe(742_000);
    expect(cycle.billedDueCents - (cycle.oursDueCents ?? 0)).toBe(374);
  });

  it('says of January 2025 that its read was an estimate and of February that it made up for it', () => {
    const january = cycleTo('2025-01-14');
    expect(january.provisional).toBe(false);
    expect(january.checks.find((found) => found.check === 'readType')?.stated).toBe('estimated');
    expect(cycleTo('2025-02-13').checks.find((found) => found.check === 'importAgainstIntervals')?.verdict).toBe(
      'agrees',
    );
  });

  it('has nothing to compare the production meter with while the monitor was silent', () => {
    const without = ledger.cycles
      .filter((cycle) => cycle.checks.find((found) => found.check === 'productionAgainstMonitor')?.verdict !== 'agrees')
      .map((cycle) => cycle.to);
    expect(without).toEqual(['2025-12-15']);
  });

  it('made what was expected of it, by day, and was paid for all of it but the last cycle', () => {
    const of = (id: string) => ledger.cycles.flatMap((cycle) => cycle.checks.filter(({ check }) => check === id));
    for (const id of ['daysInRange', 'productionAtNight', 'productionExpected', 'incentiveQuantity', 'incentivePaid']) {
      expect([id, of(id).filter(({ verdict }) => verdict === 'differs')]).toEqual([id, []]);
    }
    expect(of('productionAtNight').filter(({ verdict }) => verdict === 'agrees').length).toBe(52);
    expect(of('incentivePaid').filter(({ verdict }) => verdict === 'agrees').length).toBe(9);
    expect(of('incentiveQuantity').filter(({ verdict }) => verdict === 'agrees').length).toBe(9);
    const gaps = ledger.cycles.flatMap((cycle) =>
      cycle.checks.filter(({ check, verdict }) => check === 'fileGaps' && verdict !== 'agrees').map(() => cycle.to),
    );
    expect(gaps).toEqual(['2025-12-15']);
  });

  it('balances the cycle left to log, once logged', () => {
    const logged = computeLedger(sampleFacts({ withNext: true }), { today: day('2026-12-01') });
    expect(logged.cycles.length).toBe(27);
    expect(logged.cycles.at(-1)?.state).toBe('balanced');
  });

  it('gives every figure a working that evaluates to it', () => {
    const found = everyWorking(ledger);
    expect(found.length).toBeGreaterThan(500);
    expect(found.filter(({ agrees }) => !agrees)).toEqual([]);
  });

  it('adds to the same position by entry, by cycle and by book', () => {
    const counted = ledger.entries.filter(({ basis }) => basis !== 'memo');
    const byEntry = sumCents(counted.map(({ amountCents }) => amountCents));
    const byCycle = sumCents(position.points.map(({ addedCents }) => addedCents));
    const byBook = sumCents(position.points.flatMap(({ books }) => Object.values(books)));
    expect([byCycle, byBook, position.cashSoFar.amountCents]).toEqual([byEntry, byEntry, byEntry]);
    const { loanPayoff, creditStillToCome, incentiveOwed, utilityBank } = position.settledParts;
    const parts = [position.cashSoFar, loanPayoff, creditStillToCome, incentiveOwed, utilityBank];
    expect(position.settledToday.amountCents).toBe(sumCents(parts.map(({ amountCents }) => amountCents)));
  });

  it('stands where a house like this stands after two years, and gets even in the middle of the 2030s', () => {
    expect(position.settledToday.amountCents).toBeLessThan(-17_000_00);
    expect(position.settledToday.amountCents).toBeGreaterThan(-24_000_00);
    expect(position.projection?.evenOn?.slice(0, 4)).toMatch(/^203[5-8]$/);
    expect(position.settledParts.creditStillToCome.amountCents).toBe(1_870_00);
  });
});
