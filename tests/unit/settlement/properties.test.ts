import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { settle } from '#shared/settlement/settle.ts';
import { EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { cents } from '#shared/units/cents.ts';
import { exact } from '#shared/units/rate.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { plans, usages } from './arbitrary-plan.ts';
import { ENERGY, mustHold, plan, settled, usage } from './plans.ts';

function frozen<T>(value: T): T {
  if (typeof value === 'object' && value !== null && !Object.isFrozen(value)) {
    Object.freeze(value);
    for (const inner of Object.values(value)) frozen(inner);
  }
  return value;
}

const opening = { ...EMPTY_OPENING, balanceCents: cents(0) };

describe('whatever the plan and the cycles', () => {
  test('every working gives its figure, every bank adds up, lines in due are the amount due, and balances carry', () => {
    fc.assert(
      fc.property(plans, usages, (of, cycles) => {
        const { settlements, closing } = taken(settle(of, opening, cycles));
        expect(settlements).toHaveLength(cycles.length);
        let held = new Map<string, string>();
        for (const settlement of settlements) {
          mustHold(settlement);
          for (const bank of settlement.banks) {
            const before = held.get(`${bank.bank} ${bank.period}`);
            if (before !== undefined) expect(exact(bank.move.open).eq(exact(before))).toBe(true);
            if (bank.lots) {
              const sum = bank.lots.reduce((total, lot) => total.plus(exact(lot.amount)), exact('0'));
              expect(sum.eq(exact(bank.move.close))).toBe(true);
            }
          }
          held = new Map(settlement.banks.map((bank) => [`${bank.bank} ${bank.period}`, bank.move.close]));
        }
        expect(closing.balanceCents).toBe(settlements.at(-1)?.amountDueCents);
      }),
      { numRuns: Math.min(PROPERTY_RUNS, 120) },
    );
  }, 60_000);

  test('a settlement is a pure function: the same twice, on values that cannot be changed, and on a plan read again', () => {
    fc.assert(
      fc.property(plans, usages, (of, cycles) => {
        const first = settle(frozen(of), frozen(opening), frozen(cycles));
        expect(settle(of, opening, cycles)).toEqual(first);
        expect(settle(taken(parsePlan(JSON.parse(JSON.stringify(of)))), opening, cycles)).toEqual(first);
      }),
      { numRuns: Math.min(PROPERTY_RUNS, 40) },
    );
  }, 60_000);

  test('cycles settled one by one come out as cycles settled together', () => {
    fc.assert(
      fc.property(plans, usages, (of, cycles) => {
        const together = taken(settle(of, opening, cycles));
        let from = opening;
        const apart = cycles.map((cycle) => {
          const one = settled(of, cycle, from);
          from = one.closing as typeof opening;
          return one.settlement;
        });
        expect(apart).toEqual(together.settlements);
        expect(from).toEqual(together.closing);
      }),
      { numRuns: Math.min(PROPERTY_RUNS, 40) },
    );
  }, 60_000);
});

describe('a flat plan', () => {
  const flat = (part: object): RatePlan =>
    plan({ charges: [{ ...ENERGY, rates: [{ from: '2025-01-01', rate: '0.1684' }] }], ...part });
  const kWh = fc.nat(2_000_000).map((value) => value / 1000);

  test('split by a row with the same price costs the same, to a cent for each part', () => {
    const row = (from: string) => ({ from, rate: '0.1684' });
    const split = flat({ charges: [{ ...ENERGY, rates: ['2025-01-01', '2026-06-20', '2026-07-03'].map(row) }] });
    fc.assert(
      fc.property(kWh, (bought) => {
        const parts = settled(split, usage({ import: bought })).settlement;
        const whole = settled(flat({}), usage({ import: bought })).settlement;
        expect(parts.lines).toHaveLength(3);
        expect(Math.abs(parts.amountDueCents - whole.amountDueCents)).toBeLessThanOrEqual(2);
      }),
    );
  });

  test('with a kWh bank that is never cut bills over the cycles what the running net asks for', () => {
    const banked = flat({
      netting: 'cycle',
      banks: [{ id: 'kwhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'] }],
    });
    fc.assert(
      fc.property(usages, (cycles) => {
        let balance = 0;
        const billed = cycles.map(({ importWh, exportWh }) => {
          balance += exportWh - importWh;
          const owed = Math.max(-balance, 0);
          balance = Math.max(balance, 0);
          return owed;
        });
        const { settlements } = taken(settle(banked, EMPTY_OPENING, cycles));
        expect(settlements.map((one) => Number(exact(one.lines[0]?.quantity ?? '').times(1000)))).toEqual(billed);
      }),
    );
  });
});
