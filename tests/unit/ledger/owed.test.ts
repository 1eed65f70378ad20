import { describe, expect, it } from 'vitest';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { owedOf } from '#shared/ledger/owed.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { SAMPLE_TODAY, sampleFacts } from '#tests/support/sample-facts.ts';

const owed = owedOf(computeLedger(sampleFacts(), { today: SAMPLE_TODAY }).cycles);

describe('what stands between the house and the utility', () => {
  it('lists the cycle credited short through its amount due, and the exchange through its bank', () => {
    expect(owed.rows.map((row) => [row.to, row.dueCents, row.bankCents, row.amountCents, row.runningCents])).toEqual([
      ['2025-10-14', 0, 118, 118, 118],
      ['2026-09-14', 374, 0, 374, 492],
    ]);
    expect(owed.totalCents).toBe(492);
    expect(owed.totalKwh).toBe('0');
  });

  it('says why, and every figure’s working comes to it', () => {
    for (const row of owed.rows) {
      expect(row.causes.join(' ')).toMatch(/kWh less/);
      expect(evaluateWorking(row.working).eq(usdOf(row.amountCents))).toBe(true);
    }
    expect(evaluateWorking(owed.working).eq(usdOf(owed.totalCents))).toBe(true);
  });

  it('leaves a cycle accepted with a note out of the total, and shows it', () => {
    const open = computeLedger(sampleFacts(), { today: SAMPLE_TODAY });
    const accepted = open.cycles
      .filter((cycle) => cycle.to === '2025-10-14')
      .flatMap((cycle) => cycle.checks.filter((check) => check.verdict === 'differs'))
      .map((check) => ({ cycleTo: '2025-10-14', check: check.key, note: 'Known.', by: 'Priya', on: '2026-10-20' }));
    expect(accepted.length).toBeGreaterThan(0);
    const facts = { ...sampleFacts(), accepted: accepted as ReturnType<typeof sampleFacts>['accepted'] };
    const after = owedOf(computeLedger(facts, { today: SAMPLE_TODAY }).cycles);
    expect(after.rows.map((row) => [row.to, row.accepted, row.runningCents])).toEqual([
      ['2025-10-14', true, 0],
      ['2026-09-14', false, 374],
    ]);
    expect(after.totalCents).toBe(374);
  });
});
