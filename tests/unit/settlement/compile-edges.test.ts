import { describe, expect, test } from 'vitest';
import { bankWorth } from '#shared/position/bank-worth.ts';
import { electricDue } from '#shared/position/bill-side.ts';
import { bankCents, compileCycle, dueOf } from '#shared/settlement/compile-cycle.ts';
import { newSlots, stateOf } from '#shared/settlement/compile-state.ts';
import { keptAt, knownAs } from '#shared/settlement/place.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { planByDays } from '#shared/settlement/plan-by-days.ts';
import { orRefusal } from '#shared/settlement/refused.ts';
import { settleAmounts } from '#shared/settlement/settle.ts';
import { EMPTY_OPENING, type Opening } from '#shared/settlement/settlement.ts';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
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

describe('compiled, a price by period', () => {
  const PERIODS = [
    { id: 'peak', label: 'Peak', when: [{ days: 'all', from: '16:00', to: '21:00' }] },
    { id: 'off', label: 'Off-peak', when: 'rest' },
  ];
  const byPeriod = (peak: string, off: string) => [
    { ...FLAT, period: 'peak', rate: peak },
    { ...FLAT, period: 'off', rate: off },
  ];
  const split = {
    periods: [
      { importWh: 40_000, exportWh: 10_000, productionWh: 15_000, loadWh: 45_000 },
      { importWh: 60_000, exportWh: 90_000, productionWh: 120_000, loadWh: 90_000 },
    ],
    netted: {
      hour: { importWh: 100_000, exportWh: 100_000, periods: [null, null] },
      '15min': { importWh: 100_000, exportWh: 100_000, periods: [null, null] },
    },
  };
  const ALL = { importWh: 100_000, exportWh: 100_000, productionWh: 135_000, loadWh: 135_000 };
  const bought = { ...ENERGY, basis: 'load', rates: byPeriod('0.20', '0.10') };
  const sold = {
    id: 'sold',
    label: 'Sold',
    kind: 'export',
    basis: 'production',
    to: 'bill',
    rates: byPeriod('0.08', '0.04'),
  };
  const of = (load: string, changes: object = {}) =>
    plan({ load, calendar: { periods: PERIODS }, charges: [bought], credits: [sold], ...changes });
  const used = usage({
    import: 100,
    export: 100,
    production: 135,
    loadWh: wh(135_000),
    ownByPeriod: {
      peak: { productionWh: wh(15_000), loadWh: wh(45_000) },
      off: { productionWh: wh(120_000), loadWh: wh(90_000) },
    },
  });

  test.each(['computed', 'metered'])('of the use, %s, and of production sold whole', (load) => {
    const { slots, cycle } = compiled(of(load), used);
    if (cycle === null) throw new Error('it is not compiled');
    // 45 × 0.20 + 90 × 0.10 − 15 × 0.08 − 120 × 0.04
    expect(dueOf(cycle, { ...ALL, split }, stateOf(slots, EMPTY_OPENING))).toBe(1200);
    expect(taken(settleAmounts(of(load), EMPTY_OPENING, used)).settlement.amountDueCents).toBe(1200);
  });

  test('leaves out a period the span has no hours of', () => {
    const { slots, cycle } = compiled(of('computed'), used);
    if (cycle === null) throw new Error('it is not compiled');
    const off = { ...split, periods: [null, split.periods[1] ?? null] };
    expect(dueOf(cycle, { ...ALL, split: off }, stateOf(slots, EMPTY_OPENING))).toBe(900 - 480);
  });

  test('nets each period the span has hours of', () => {
    const flat = plan({ netting: 'period', calendar: { periods: PERIODS } });
    const { slots, cycle } = compiled(flat, used);
    if (cycle === null) throw new Error('it is not compiled');
    const due = (periods: readonly ((typeof split.periods)[number] | null | undefined)[]) =>
      dueOf(
        cycle,
        { ...ALL, split: { ...split, periods: periods.map((one) => one ?? null) } },
        stateOf(slots, EMPTY_OPENING),
      );
    // 40 − 10 kWh at $0.10; off-peak more went out than in.
    expect(due(split.periods)).toBe(300);
    expect(due([null, split.periods[1]])).toBe(0);
  });

  test('is refused where the kWh by period are not known, in full too', () => {
    const { slots, cycle } = compiled(of('computed'), used);
    if (cycle === null) throw new Error('it is not compiled');
    const quick = orRefusal(() => dueOf(cycle, { ...ALL, split: null }, stateOf(slots, EMPTY_OPENING)));
    expect(quick).toMatchObject({ ok: false });
    const { ownByPeriod: _, ...unknown } = used;
    for (const load of ['computed', 'metered'])
      expect(settleAmounts(of(load), EMPTY_OPENING, unknown)).toMatchObject({ ok: false });
  });

  test('is refused where a period the span has hours of has no price in its season', () => {
    const seasons = [
      { id: 'summer', from: '06-01', to: '09-30' },
      { id: 'winter', from: '10-01', to: '05-31' },
    ];
    const summer = [
      { ...PERIODS[0], when: [{ days: 'all', from: '16:00', to: '21:00', season: 'summer' }] },
      PERIODS[1],
    ];
    const rates = [
      { ...FLAT, period: 'peak', season: 'summer', rate: '0.20' },
      { ...FLAT, period: 'off', rate: '0.10' },
    ];
    const charges = [{ ...bought, rates }];
    const seasonal = of('computed', { calendar: { seasons, periods: summer }, charges });
    const winter = { ...used, ...{ from: day('2026-01-01'), to: day('2026-02-01') } };
    const { slots, cycle } = compiled(seasonal, winter);
    if (cycle === null) throw new Error('it is not compiled');
    const quick = orRefusal(() => dueOf(cycle, { ...ALL, split }, stateOf(slots, EMPTY_OPENING)));
    expect(quick).toMatchObject({ ok: false });
    expect(settleAmounts(seasonal, EMPTY_OPENING, winter)).toMatchObject({ ok: false });
  });

  test('too long for whole numbers is left to the full settlement', () => {
    const long = [{ ...bought, rates: byPeriod('10000000.123456789', '0.10') }];
    expect(compiled(of('computed', { charges: long }), used).cycle).toBeNull();
    const credits = [{ ...sold, rates: byPeriod('10000000.123456789', '0.04') }];
    expect(compiled(of('computed', { credits }), used).cycle).toBeNull();
  });

  test('and netting inside the cycle, of a usage that knows neither, is refused', () => {
    const { slots, cycle } = compiled(plan({ netting: 'hour' }), used);
    if (cycle === null) throw new Error('it is not compiled');
    const quick = orRefusal(() => dueOf(cycle, { ...ALL, split: null }, stateOf(slots, EMPTY_OPENING)));
    expect(quick).toMatchObject({ ok: false });
  });
});

test('a plan that changes season or price by intervals changes by days where there are none', () => {
  const both = plan({ seasonBy: 'intervals', rateChangeBy: 'intervals' });
  expect(planByDays(both)).toMatchObject({ seasonBy: 'days', rateChangeBy: 'days' });
  expect(planByDays(both)).toBe(planByDays(both));
  expect(planByDays(plan({ seasonBy: 'intervals' }))).toMatchObject({ seasonBy: 'days', rateChangeBy: 'days' });
  const read = plan({ rateChangeBy: 'intervals', seasonBy: 'readDate' });
  expect(planByDays(read)).toMatchObject({ seasonBy: 'readDate', rateChangeBy: 'days' });
  const seasons = plan({ rateChangeBy: 'readDate', seasonBy: 'intervals' });
  expect(planByDays(seasons)).toMatchObject({ seasonBy: 'days', rateChangeBy: 'readDate' });
  const days = plan();
  expect(planByDays(days)).toBe(days);
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
