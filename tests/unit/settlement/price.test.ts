import { describe, expect, test } from 'vitest';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { planFor } from '#shared/settlement/plan-in-force.ts';
import { type PriceOf, priceAmount, priceQuantity } from '#shared/settlement/price.ts';
import { planWithoutRoof } from '#shared/settlement/without-roof.ts';
import { day } from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { CUSTOMER, ENERGY, FLAT, plan, said, settled, usage } from './plans.ts';

const CHANGING = [
  { from: '2025-01-01', rate: '0.10' },
  { from: '2026-07-01', rate: '0.13' },
];
const SENT = { id: 'sent', label: 'Export credit', kind: 'export', basis: 'export', rates: FLAT, to: 'bill' };

/** Prices a billed quantity over 2026-06-16 to 2026-07-16, and makes sure that its working gives the amount. */
function price(of: RatePlan, component: string, quantity: string | null, what?: PriceOf) {
  const found = priceQuantity(of, component, day('2026-06-16'), day('2026-07-16'), quantity, what);
  if (found === null) return null;
  expect(evaluateWorking(found.working).eq(usdOf(found.amountCents))).toBe(true);
  return [found.amountCents, found.rate];
}

describe('the price of a billed quantity', () => {
  test('is the plan’s rate in force, signed as a line is', () => {
    const of = plan({ credits: [SENT] });
    expect(price(of, 'energy', '498.5')).toEqual([4985, '0.10']);
    expect(price(of, 'sent', '100')).toEqual([-1000, '0.10']);
  });

  test('is shared by days where the rate changes, each part rounded as a line of its own', () => {
    const of = plan({ charges: [{ ...ENERGY, rates: CHANGING }] });
    expect(price(of, 'energy', '501')).toEqual([2505 + 3257, null]);
    const lines = settled(of, usage({ import: 501 })).settlement.lines;
    expect(lines.reduce((sum, line) => sum + line.amountCents, 0)).toBe(2505 + 3257);
  });

  test('runs through the tiers, or takes the tier the statement names', () => {
    const tiered = {
      ...ENERGY,
      tiers: [{ from: '2025-01-01', per: 'day', limits: ['10'] }],
      rates: [1, 2].map((tier) => ({ from: '2025-01-01', tier, rate: `0.${tier}0` })),
    };
    const of = plan({ charges: [tiered] });
    expect(price(of, 'energy', '400')).toEqual([3000 + 2000, null]);
    expect(price(of, 'energy', '100', { period: null, tier: 2 })).toEqual([2000, '0.20']);
  });

  test('by period needs to know the period', () => {
    const periods = [
      { id: 'peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] },
      { id: 'off', when: 'rest' },
    ];
    const rates = periods.map(({ id }, at) => ({ from: '2025-01-01', period: id, rate: `0.${at + 1}0` }));
    const of = plan({ calendar: { periods }, charges: [{ ...ENERGY, rates }] });
    expect(price(of, 'energy', '100')).toBeNull();
    expect(price(of, 'energy', '100', { period: 'off', tier: null })).toEqual([2000, '0.20']);
  });

  test('of a cycle, its days, kW or a base is the charge’s own', () => {
    const daily = { ...CUSTOMER, id: 'daily', basis: 'day', rates: [{ from: '2025-01-01', rate: '0.345' }] };
    const kW = { ...CUSTOMER, id: 'standby', kind: 'demand', basis: 'kW', kWOf: 'dc' };
    const tax = {
      id: 'tax',
      label: 'Tax',
      kind: 'tax',
      basis: 'percent',
      on: ['customer'],
      rates: [{ from: '2025-01-01', rate: '0.0625' }],
    };
    const of = plan({ charges: [CUSTOMER, daily, kW, tax] });
    expect(price(of, 'customer', null)).toEqual([1200, '12.00']);
    expect(price(of, 'customer', '1')).toEqual([1200, '12.00']);
    expect(price(of, 'customer', '0.5')).toEqual([600, '12.00']);
    expect(price(of, 'daily', null)).toEqual([1035, '0.345']);
    expect(price(of, 'daily', '29')).toEqual([1001, '0.345']);
    expect(price(of, 'standby', '7.2')).toEqual([8640, '12.00']);
    expect(price(of, 'tax', '93.51')).toEqual([584, '0.0625']);
    expect([price(of, 'tax', null), price(of, 'standby', null)]).toEqual([null, null]);
  });

  test('of a kWh bank is what its true-up pays', () => {
    const bank = {
      id: 'kwhBank',
      label: 'kWh bank',
      unit: 'kWh',
      trueUps: [{ at: { months: [9] }, action: 'pay', to: 'bill', rates: [{ from: '2025-01-01', rate: '0.0418' }] }],
    };
    expect(price(plan({ netting: 'cycle', banks: [bank] }), 'kwhBank', '3893')).toEqual([-16273, '0.0418']);
  });

  test('is null where the plan cannot say', () => {
    const floor = {
      id: 'least',
      label: 'Minimum',
      kind: 'minimum',
      basis: 'floor',
      per: 'cycle',
      on: ['energy'],
      rates: FLAT,
    };
    const of = plan({ charges: [ENERGY, floor] });
    expect([price(of, 'least', '1'), price(of, 'energy', null), price(of, 'water', '1')]).toEqual([null, null, null]);
    expect(priceQuantity(of, 'energy', day('2024-01-16'), day('2024-02-16'), '100')).toBeNull();
  });

  test('of a credit or a bank is null without kWh, and of a bank without a price in force at its read date', () => {
    const bank = { label: 'kWh bank', unit: 'kWh', offsets: [] };
    const pays = (from: string) => ({ at: 'everyCycle', action: 'pay', to: 'bill', rates: [{ from, rate: '0.03' }] });
    const of = plan({
      credits: [SENT],
      banks: [
        { ...bank, id: 'loses', trueUps: [{ at: 'everyCycle', action: 'expire' }] },
        { ...bank, id: 'later', trueUps: [pays('2026-07-17')] },
        { ...bank, id: 'pays', trueUps: [{ at: 'everyCycle', action: 'expire' }, pays('2026-07-16')] },
      ],
    });
    expect([price(of, 'sent', null), price(of, 'pays', null)]).toEqual([null, null]);
    expect([price(of, 'loses', '100'), price(of, 'later', '100')]).toEqual([null, null]);
    expect(price(of, 'pays', '100')).toEqual([-300, '0.03']);
  });

  test('is the same amount where nobody asks for its working', () => {
    const of = plan({ charges: [{ ...ENERGY, rates: CHANGING }], credits: [SENT] });
    const amount = (component: string, quantity: string | null) =>
      priceAmount(of, component, day('2026-06-16'), day('2026-07-16'), quantity);
    for (const component of ['energy', 'sent'])
      expect(amount(component, '498.5')).toBe(price(of, component, '498.5')?.[0]);
    expect([amount('energy', null), amount('water', '1')]).toEqual([null, null]);
  });
});

describe('the plan in force', () => {
  const at = (from: string) => ({ from: day(from), plan: plan({ name: from }), withoutRoof: null });
  const plans = [at('2026-06-01'), at('2025-01-01')];

  test('starts with the first cycle that begins on or after its day', () => {
    const name = (from: string) => planFor(plans, day(from))?.plan.name;
    expect([name('2026-05-17'), name('2026-06-01'), name('2026-06-16')]).toEqual([
      '2025-01-01',
      '2026-06-01',
      '2026-06-01',
    ]);
  });

  test('is the first for cycles before it, and none where there is none', () => {
    expect(planFor(plans, day('2024-01-01'))?.plan.name).toBe('2025-01-01');
    expect(planFor(plans.toReversed(), day('2024-01-01'))?.plan.name).toBe('2025-01-01');
    expect(planFor(plans.toReversed(), day('2026-06-16'))?.plan.name).toBe('2026-06-01');
    expect(planFor([], day('2026-01-01'))).toBeNull();
  });
});

describe('the plan without a roof', () => {
  const withRoof = plan({
    netting: 'cycle',
    load: 'computed',
    charges: [
      ENERGY,
      { ...ENERGY, id: 'use', basis: 'load' },
      CUSTOMER,
      { ...CUSTOMER, id: 'solarFee', label: 'Solar meter', solarOnly: true },
      { ...CUSTOMER, id: 'standby', kind: 'demand', basis: 'kW', kWOf: 'dc' },
      { ...ENERGY, id: 'grid', kind: 'adjustment', basis: 'export' },
      {
        id: 'tax',
        label: 'Tax',
        kind: 'tax',
        basis: 'percent',
        on: ['customer', 'solarFee'],
        afterCredits: true,
        rates: [{ from: '2025-01-01', rate: '0.05' }],
      },
      {
        id: 'solarTax',
        label: 'Solar tax',
        kind: 'tax',
        basis: 'percent',
        on: ['solarFee'],
        rates: [{ from: '2025-01-01', rate: '0.05' }],
      },
    ],
    credits: [{ ...SENT, to: 'dollars' }],
    banks: [
      { id: 'dollars', label: 'Credit bank', unit: 'USD', sameCycle: true, offsets: ['customer'] },
      { id: 'kwhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'] },
    ],
  });
  const inForce = { from: day('2025-01-01'), plan: withRoof, withoutRoof: null };

  test('drops credits, banks, netting and what is charged only because of the roof', () => {
    const { settlement } = settled(planWithoutRoof(inForce), usage({ import: 700 }));
    expect(said(settlement.lines)).toEqual([
      'energy 700 kWh at 0.10 = 70.00',
      'use 700 kWh at 0.10 = 70.00',
      'customer 1 cycle at 12.00 = 12.00',
      'tax 12 USD at 0.05 = 0.60',
    ]);
  });

  test('is the same plan object each time, so that it is made ready once', () => {
    expect(planWithoutRoof(inForce)).toBe(planWithoutRoof(inForce));
  });

  test('is the stated one where there is one', () => {
    const ordinary = plan();
    expect(planWithoutRoof({ ...inForce, withoutRoof: ordinary })).toBe(ordinary);
  });
});
