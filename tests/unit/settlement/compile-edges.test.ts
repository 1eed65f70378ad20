import { describe, expect, test } from 'vitest';
import { bankWorth } from '#shared/position/bank-worth.ts';
import { electricDue } from '#shared/position/bill-side.ts';
import { bankCents, compileCycle, dueOf } from '#shared/settlement/compile-cycle.ts';
import { newSlots, stateOf } from '#shared/settlement/compile-state.ts';
import { keptAt, knownAs } from '#shared/settlement/place.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { settleAmounts } from '#shared/settlement/settle.ts';
import { EMPTY_OPENING, type Opening } from '#shared/settlement/settlement.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';
import { CUSTOMER, ENERGY, plan, usage } from './plans.ts';

const FLAT = { from: '2025-01-01' };
const KWH_BANK = { id: 'bank', label: 'Bank', unit: 'kWh', offsets: ['energy'] };

function compiled(of: RatePlan, used = usage()) {
  const slots = newSlots();
  const { from, to, kW } = used;
  return { slots, cycle: compileCycle({ plan: of, from, to, kW, incentiveApart: false, slots }) };
}

/** What a cycle comes to and its banks are worth, both ways. */
function bothWays(of: RatePlan, used: ReturnType<typeof usage>, opening: Opening = EMPTY_OPENING) {
  const { slots, cycle } = compiled(of, used);
  if (cycle === null) throw new Error('it is not compiled');
  const state = stateOf(slots, opening);
  const { settlement, closing } = taken(settleAmounts(of, opening, used));
  const { importWh, exportWh } = used;
  const due = dueOf(cycle, { importWh, exportWh, productionWh: 0, loadWh: 0, split: null }, state);
  return {
    quick: [due, bankCents(cycle, state)],
    full: [electricDue(settlement, false), bankWorth(of, closing, used.from, used.to)],
  };
}

describe('compiled, a bank', () => {
  const used = usage({ import: 300, export: 420 });
  const held: Opening = { ...EMPTY_OPENING, banks: { bank: '50' } };

  test('that is a memory of kWh alone pays nothing and is worth nothing', () => {
    const { quick, full } = bothWays(plan({ banks: [{ ...KWH_BANK, offsets: [] }] }), used, held);
    expect(quick).toEqual(full);
    expect(quick).toEqual([3000, 0]);
  });

  test('of kWh that may go below zero takes all import', () => {
    const { quick, full } = bothWays(plan({ banks: [{ ...KWH_BANK, belowZero: true }] }), used, held);
    expect(quick).toEqual(full);
    // 50 − 300 + 420 kWh at $0.10.
    expect(quick).toEqual([0, 1700]);
  });

  test('of dollars that may pay nothing and is never paid out is worth nothing', () => {
    const credits = [
      { id: 'sent', label: 'Sent', kind: 'export', basis: 'export', to: 'bank', rates: [{ ...FLAT, rate: '0.05' }] },
    ];
    const trueUps = [{ at: { months: [12] }, action: 'expire' }];
    const of = (offsets: string[]) =>
      plan({ credits, banks: [{ id: 'bank', label: 'Bank', unit: 'USD', offsets, trueUps }] });
    expect(bothWays(of([]), used)).toEqual({ quick: [3000, 0], full: [3000, 0] });
    expect(bothWays(of(['energy']), used)).toEqual({ quick: [3000, 2100], full: [3000, 2100] });
  });
});

describe('left to the full settlement is', () => {
  const LONG = '10000000.123456789';

  test('a plan that asks for kW nobody knows', () => {
    const of = plan({ charges: [ENERGY, { ...CUSTOMER, id: 'access', basis: 'kW', kWOf: 'ac' }] });
    expect(compiled(of).cycle).toBeNull();
    expect(compiled(of, usage({ kW: { ac: '6' } })).cycle).not.toBeNull();
  });

  test('a price too long for whole numbers, of kWh or of a percentage', () => {
    expect(compiled(plan({ charges: [{ ...ENERGY, rates: [{ ...FLAT, rate: LONG }] }] })).cycle).toBeNull();
    const tax = { id: 'tax', label: 'Tax', kind: 'tax', basis: 'percent', on: ['energy'] };
    expect(compiled(plan({ charges: [ENERGY, { ...tax, rates: [{ ...FLAT, rate: LONG }] }] })).cycle).toBeNull();
    expect(compiled(plan({ charges: [ENERGY, { ...tax, rates: [{ ...FLAT, rate: '0.05' }] }] })).cycle).not.toBeNull();
  });

  test('a change of price that each interval takes at its own time, in a bank’s charge too', () => {
    const rates = ['2025-01-01', '2026-07-01'].map((from, at) => ({ from, rate: `0.1${at}` }));
    const of = (rateChangeBy: string) => plan({ rateChangeBy, charges: [{ ...ENERGY, rates }], banks: [KWH_BANK] });
    expect(compiled(of('intervals')).cycle).toBeNull();
    expect(compiled(of('days')).cycle).not.toBeNull();
  });

  test('a true-up whose price is not yet in force', () => {
    const trueUps = (from: string) => [
      { at: 'everyCycle', action: 'pay', to: 'bill', rates: [{ from, rate: '0.03' }] },
    ];
    const of = (from: string) => plan({ banks: [{ ...KWH_BANK, trueUps: trueUps(from) }] });
    expect(compiled(of('2027-01-01')).cycle).toBeNull();
    expect(compiled(of('2025-01-01')).cycle).not.toBeNull();
  });
});

test('a place where nothing is kept and a name nobody has are bugs, and thrown', () => {
  expect(keptAt([4, 5], 1)).toBe(5);
  expect(() => keptAt([4, 5], 2)).toThrow(RangeError);
  expect(knownAs(new Map([['a', 1]]), 'a')).toBe(1);
  expect(() => knownAs(new Map([['a', 1]]), 'b')).toThrow(RangeError);
});
