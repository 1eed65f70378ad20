import { describe, expect, test } from 'vitest';
import { wh } from '#shared/units/energy.ts';
import { CUSTOMER, ENERGY, plan, refusal, said, settled, TWO_SEASONS, usage } from './plans.ts';

const NEW_PRICE = [
  { from: '2025-01-01', rate: '0.10' },
  { from: '2026-07-01', rate: '0.13' },
];
const energyBy = (rates: unknown, more: object = {}) => [{ ...ENERGY, rates, ...more }];

describe('a price that changes inside a cycle', () => {
  test('is shared by days: a line for each part, multiplied first and divided last', () => {
    const { settlement } = settled(plan({ charges: energyBy(NEW_PRICE) }), usage({ import: 500 }));
    expect(said(settlement.lines)).toEqual([
      'energy 2026-06-16..2026-07-01 250 kWh at 0.10 = 25.00',
      'energy 2026-07-01..2026-07-16 250 kWh at 0.13 = 32.50',
    ]);
  });

  test('shows a quantity that does not end with six decimals, and prices the exact one', () => {
    const rates = [
      { from: '2025-01-01', rate: '0.10' },
      { from: '2026-06-17', rate: '0.13' },
    ];
    const { settlement } = settled(plan({ charges: energyBy(rates) }), usage({ to: '2026-07-07', import: 100 }));
    expect(said(settlement.lines)).toEqual([
      'energy 2026-06-16..2026-06-17 4.761905 kWh at 0.10 = 0.48',
      'energy 2026-06-17..2026-07-07 95.238095 kWh at 0.13 = 12.38',
    ]);
  });

  test('takes the price of the read date for all where the plan says readDate', () => {
    const { settlement } = settled(
      plan({ rateChangeBy: 'readDate', charges: energyBy(NEW_PRICE) }),
      usage({ import: 500 }),
    );
    expect(said(settlement.lines)).toEqual(['energy 500 kWh at 0.13 = 65.00']);
  });

  test('also splits where the row that comes into force has the same price', () => {
    const rates = [
      { from: '2025-01-01', rate: '0.10' },
      { from: '2026-07-01', rate: '0.10' },
    ];
    expect(settled(plan({ charges: energyBy(rates) }), usage({ import: 1 })).settlement.lines).toHaveLength(2);
  });

  test('does not split on the first day or on the day the next cycle begins', () => {
    const rates = ['2025-01-01', '2026-06-16', '2026-07-16'].map((from, at) => ({ from, rate: `0.1${at}` }));
    const { settlement } = settled(plan({ charges: energyBy(rates) }), usage({ import: 100 }));
    expect(said(settlement.lines)).toEqual(['energy 100 kWh at 0.11 = 11.00']);
  });

  test('shares what is charged once a cycle, by the day or by the kW', () => {
    const rates = [
      { from: '2025-01-01', rate: '12.00' },
      { from: '2026-07-01', rate: '14.00' },
    ];
    const kW = { ...CUSTOMER, id: 'standby', kind: 'demand', basis: 'kW', kWOf: 'dc', rates };
    const perDay = { ...CUSTOMER, id: 'daily', basis: 'day', rates };
    const { settlement } = settled(
      plan({ charges: [{ ...CUSTOMER, rates }, perDay, kW] }),
      usage({ kW: { dc: '7.2' } }),
    );
    expect(said(settlement.lines)).toEqual([
      'customer 2026-06-16..2026-07-01 0.5 cycle at 12.00 = 6.00',
      'customer 2026-07-01..2026-07-16 0.5 cycle at 14.00 = 7.00',
      'daily 2026-06-16..2026-07-01 15 day at 12.00 = 180.00',
      'daily 2026-07-01..2026-07-16 15 day at 14.00 = 210.00',
      'standby 2026-06-16..2026-07-01 3.6 kW at 12.00 = 43.20',
      'standby 2026-07-01..2026-07-16 3.6 kW at 14.00 = 50.40',
    ]);
  });

  test('shares the base of a percent by days', () => {
    const rates = [
      { from: '2025-01-01', rate: '0.05' },
      { from: '2026-07-01', rate: '0.06' },
    ];
    const tax = { id: 'tax', label: 'Tax', kind: 'tax', basis: 'percent', on: ['customer'], rates };
    const { settlement } = settled(plan({ charges: [CUSTOMER, tax] }), usage());
    expect(said(settlement.lines).slice(1)).toEqual([
      'tax 2026-06-16..2026-07-01 6 USD at 0.05 = 0.30',
      'tax 2026-07-01..2026-07-16 6 USD at 0.06 = 0.36',
    ]);
  });

  test('is refused before the first row', () => {
    expect(refusal(plan(), usage({ from: '2024-11-16', to: '2024-12-16' }))).toBe(
      'Energy has no rate in force on 2024-11-16.',
    );
  });

  test('rounds shared kWh to whole ones that still add up, where the plan says so', () => {
    const whole = { money: 'halfUp', limits: 'whole', kWh: 'whole' };
    const { settlement } = settled(plan({ charges: energyBy(NEW_PRICE), rounding: whole }), usage({ import: 501 }));
    expect(settlement.lines.map((line) => line.quantity)).toEqual(['251', '250']);
  });
});

describe('a season that changes inside a cycle', () => {
  const bySeason = [
    { from: '2025-01-01', season: 'summer', rate: '0.20' },
    { from: '2025-01-01', season: 'winter', rate: '0.10' },
  ];
  const calendar = { seasons: TWO_SEASONS, periods: [] };
  const may = { from: '2026-05-17', to: '2026-06-16', import: 300 };

  test('goes by the read date, by default', () => {
    const { settlement } = settled(plan({ calendar, charges: energyBy(bySeason) }), usage(may));
    expect(said(settlement.lines)).toEqual(['energy 300 kWh at 0.20 = 60.00']);
  });

  test('is shared by days where the plan says days', () => {
    const { settlement } = settled(plan({ calendar, seasonBy: 'days', charges: energyBy(bySeason) }), usage(may));
    expect(said(settlement.lines)).toEqual([
      'energy 2026-05-17..2026-06-01 150 kWh at 0.10 = 15.00',
      'energy 2026-06-01..2026-06-16 150 kWh at 0.20 = 30.00',
    ]);
  });

  test('does not split an item without seasons, nor at a row of the other season', () => {
    const charges = [
      ENERGY,
      { ...CUSTOMER, rates: [...CUSTOMER.rates, { from: '2026-05-20', season: 'summer', rate: '13' }] },
    ];
    const { settlement } = settled(plan({ calendar, seasonBy: 'days', charges }), usage(may));
    expect(settlement.lines.filter((line) => line.component === 'energy')).toHaveLength(1);
    expect(settlement.lines.filter((line) => line.component === 'customer').map((line) => line.from)).toEqual([
      '2026-05-17',
      '2026-06-01',
    ]);
  });

  test('gives the kWh of a period with hours in one season only to the days of that season', () => {
    const periods = [
      { id: 'peak', when: [{ season: 'summer', days: 'all', from: '16:00', to: '21:00' }] },
      { id: 'off', when: 'rest' },
    ];
    const rates = [
      { from: '2025-01-01', season: 'summer', period: 'peak', rate: '0.40' },
      { from: '2025-01-01', period: 'off', rate: '0.10' },
    ];
    const of = plan({
      netting: 'period',
      calendar: { seasons: TWO_SEASONS, periods },
      seasonBy: 'days',
      charges: energyBy(rates),
    });
    const flow = (kWh: number) => ({ importWh: wh(kWh * 1000), exportWh: wh(0) });
    const { settlement } = settled(of, usage({ ...may, byPeriod: { peak: flow(40), off: flow(260) } }));
    expect(said(settlement.lines)).toEqual([
      'energy off 2026-05-17..2026-06-01 130 kWh at 0.10 = 13.00',
      'energy peak 2026-06-01..2026-06-16 40 kWh at 0.40 = 16.00',
      'energy off 2026-06-01..2026-06-16 130 kWh at 0.10 = 13.00',
    ]);
  });
});

describe('tiers', () => {
  const tiered = (tiers: unknown, rates = [1, 2].map((tier) => ({ from: '2025-01-01', tier, rate: `0.${tier}0` }))) =>
    energyBy(rates, { tiers });

  test('per day go by the days of each part, per cycle by its share of the days', () => {
    const rates = [1, 2].flatMap((tier) =>
      ['2025-01-01', '2026-06-26'].map((from) => ({ from, tier, rate: `0.${tier}0` })),
    );
    const perDay = tiered([{ from: '2025-01-01', per: 'day', limits: ['10'] }], rates);
    const perCycle = tiered([{ from: '2025-01-01', per: 'cycle', limits: ['301'] }], rates);
    expect(said(settled(plan({ charges: perDay }), usage({ import: 330 })).settlement.lines)).toEqual([
      'energy tier 1 2026-06-16..2026-06-26 100 kWh at 0.10 = 10.00',
      'energy tier 2 2026-06-16..2026-06-26 10 kWh at 0.20 = 2.00',
      'energy tier 1 2026-06-26..2026-07-16 200 kWh at 0.10 = 20.00',
      'energy tier 2 2026-06-26..2026-07-16 20 kWh at 0.20 = 4.00',
    ]);
    expect(
      settled(plan({ charges: perCycle }), usage({ import: 330 })).settlement.lines.map((line) => line.quantity),
    ).toEqual(['100', '10', '201', '19']);
    const exact = { money: 'halfUp', limits: 'exact', kWh: 'exact' };
    expect(
      settled(plan({ charges: perCycle, rounding: exact }), usage({ import: 330 })).settlement.lines.map(
        (line) => line.quantity,
      ),
    ).toEqual(['100.333333', '9.666667', '200.666667', '19.333333']);
  });

  test('run over the kWh of all periods, each period having its share of every tier', () => {
    const periods = [
      { id: 'peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] },
      { id: 'off', when: 'rest' },
    ];
    const rates = ['peak', 'off'].flatMap((period) =>
      [1, 2].map((tier) => ({ from: '2025-01-01', period, tier, rate: `0.${tier}0` })),
    );
    const of = plan({
      calendar: { periods },
      charges: tiered([{ from: '2025-01-01', per: 'cycle', limits: ['300'] }], rates),
    });
    const flow = (kWh: number) => ({ importWh: wh(kWh * 1000), exportWh: wh(0) });
    const { settlement } = settled(of, usage({ import: 400, byPeriod: { peak: flow(100), off: flow(300) } }));
    expect(said(settlement.lines)).toEqual([
      'energy peak tier 1 75 kWh at 0.10 = 7.50',
      'energy peak tier 2 25 kWh at 0.20 = 5.00',
      'energy off tier 1 225 kWh at 0.10 = 22.50',
      'energy off tier 2 75 kWh at 0.20 = 15.00',
    ]);
  });

  test('run over what is billed after the bank', () => {
    const of = plan({
      netting: 'cycle',
      charges: tiered([{ from: '2025-01-01', per: 'cycle', limits: ['100'] }]),
      banks: [{ id: 'kwhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'] }],
    });
    const { settlement } = settled(of, usage({ import: 200 }), {
      banks: { kwhBank: '90' },
      usageSinceTrueUp: {},
      capUsed: {},
      balanceCents: null,
    });
    expect(settlement.lines.map((line) => line.quantity)).toEqual(['100', '10']);
  });
});
