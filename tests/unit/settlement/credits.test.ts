import { describe, expect, test } from 'vitest';
import { cents } from '#shared/units/cents.ts';
import { wh } from '#shared/units/energy.ts';
import { CUSTOMER, ENERGY, FLAT, opening, plan, refusal, said, settled, usage } from './plans.ts';

const SENT = { id: 'sent', label: 'Export credit', kind: 'export', basis: 'export', rates: FLAT, to: 'bill' };
const credit = (part: object) => plan({ credits: [{ ...SENT, ...part }] });
const lines = (of: ReturnType<typeof plan>, cycle: ReturnType<typeof usage>) =>
  said(settled(of, cycle).settlement.lines).slice(1);

describe('a credit', () => {
  test('goes off the bill, apart, or into a bank', () => {
    const cycle = usage({ export: 100 });
    expect(lines(credit({}), cycle)).toEqual(['sent 100 kWh at 0.10 = -10.00']);
    const apart = settled(credit({ to: 'separate' }), cycle).settlement;
    expect(said(apart.lines)).toEqual(['energy 0 kWh at 0.10 = 0.00']);
    expect(apart.payouts).toMatchObject([
      { component: 'sent', kind: 'export', quantity: '100', rate: '0.10', amountCents: 1000 },
    ]);
  });

  test('apart and at zero is no payout; on the bill it is a line', () => {
    expect(settled(credit({ to: 'separate' }), usage()).settlement.payouts).toEqual([]);
    expect(lines(credit({}), usage())).toEqual(['sent 0 kWh at 0.10 = 0.00']);
  });

  test('may be negative, and is then a charge', () => {
    expect(lines(credit({ rates: [{ from: '2025-01-01', rate: '-0.015' }] }), usage({ export: 101 }))).toEqual([
      'sent 101 kWh at -0.015 = 1.52',
    ]);
  });

  test('at a fraction of several charges has their sum, unrounded, and changes when one of them does', () => {
    const supply = { ...ENERGY, id: 'supply', rates: [...FLAT, { from: '2026-07-01', rate: '0.111' }] };
    const of = plan({
      charges: [supply, ENERGY],
      credits: [{ ...SENT, rates: null, ratesOf: { charges: ['supply', 'energy'], fraction: '0.75' } }],
    });
    expect(said(settled(of, usage({ export: 200 })).settlement.lines).slice(-2)).toEqual([
      'sent 2026-06-16..2026-07-01 100 kWh at 0.15 = -15.00',
      'sent 2026-07-01..2026-07-16 100 kWh at 0.15825 = -15.83',
    ]);
  });

  test('at the rate of a tier takes the first unless the plan says which', () => {
    const tiered = {
      ...ENERGY,
      tiers: [{ from: '2025-01-01', per: 'cycle', limits: ['100'] }],
      rates: [1, 2].map((tier) => ({ from: '2025-01-01', tier, rate: `0.${tier}0` })),
    };
    const of = (ratesOf: object) => plan({ charges: [tiered], credits: [{ ...SENT, rates: null, ratesOf }] });
    const rate = (ratesOf: object) => settled(of(ratesOf), usage({ export: 1 })).settlement.lines.at(-1)?.rate;
    expect(rate({ charges: ['energy'] })).toBe('0.1');
    expect(rate({ charges: ['energy'], tier: 2 })).toBe('0.2');
  });

  test('by production needs production', () => {
    expect(refusal(credit({ basis: 'production' }), usage({ export: 1 }))).toMatch(
      /production of this cycle is needed/,
    );
    expect(lines(credit({ basis: 'production' }), usage({ production: 7 }))).toEqual(['sent 7 kWh at 0.10 = -0.70']);
  });
});

describe('a term', () => {
  const term = (firstDay: string, lastDay: string, part: object = {}) =>
    plan({ credits: [{ ...SENT, term: { firstDay, lastDay } }], ...part });
  const cycle = usage({ export: 300 });

  test('counts both its days and shares the kWh by days', () => {
    expect(lines(term('2016-07-01', '2026-06-30'), cycle)).toEqual(['sent 150 kWh at 0.10 = -15.00']);
    expect(lines(term('2026-07-15', '2036-07-14'), cycle)).toEqual(['sent 10 kWh at 0.10 = -1.00']);
    expect(lines(term('2016-07-01', '2026-06-15'), cycle)).toEqual(['sent 0 kWh at 0.10 = 0.00']);
    expect(lines(term('2026-06-16', '2026-07-15'), cycle)).toEqual(['sent 300 kWh at 0.10 = -30.00']);
  });

  test('is all or nothing by the read date where prices go by it', () => {
    expect(lines(term('2016-07-01', '2026-06-30', { rateChangeBy: 'readDate' }), cycle)).toEqual([
      'sent 0 kWh at 0.10 = 0.00',
    ]);
    expect(lines(term('2026-07-16', '2036-07-15', { rateChangeBy: 'readDate' }), cycle)).toEqual([
      'sent 300 kWh at 0.10 = -30.00',
    ]);
  });

  test('rounds to whole kWh where the plan shares in whole kWh', () => {
    const rounding = { money: 'halfUp', limits: 'whole', kWh: 'whole' };
    expect(lines(term('2016-07-01', '2026-06-30', { rounding }), usage({ export: 301 }))).toEqual([
      'sent 151 kWh at 0.10 = -15.10',
    ]);
  });
});

describe('a cap', () => {
  test('stops what is earned in the calendar year of the read date, and starts again in the next', () => {
    const of = credit({ cap: { amount: '25.00', per: 'year' } });
    const first = settled(
      of,
      usage({ from: '2026-11-16', to: '2026-12-16', export: 180 }),
      opening({ capUsed: { sent: { '2025': '9.99' } } }),
    );
    expect(first.closing.capUsed).toEqual({ sent: { '2025': '9.99', '2026': '18.00' } });
    const again = settled(of, usage({ from: '2026-12-16', to: '2026-12-31', export: 180 }), first.closing);
    expect(said(again.settlement.lines).slice(1)).toEqual(['sent 180 kWh at 0.10 = -7.00']);
    const next = settled(of, usage({ from: '2026-12-31', to: '2027-01-16', export: 180 }), again.closing);
    expect(said(next.settlement.lines).slice(1)).toEqual(['sent 180 kWh at 0.10 = -18.00']);
  });

  test('of a whole term is counted in all', () => {
    const of = credit({ cap: { amount: '25.00', per: 'term' } });
    const result = settled(of, usage({ export: 180 }), opening({ capUsed: { sent: { term: '25.00' } } }));
    expect(said(result.settlement.lines).slice(1)).toEqual(['sent 180 kWh at 0.10 = 0.00']);
    expect(result.closing.capUsed).toEqual({ sent: { term: '25.00' } });
  });
});

describe('percents and floors', () => {
  const TAX = {
    id: 'tax',
    label: 'Tax',
    kind: 'tax',
    basis: 'percent',
    on: ['energy', 'customer'],
    rates: [{ from: '2025-01-01', rate: '0.05' }],
  };
  const tax = (part: object) =>
    plan({
      charges: [ENERGY, CUSTOMER, { ...TAX, ...part }],
      credits: [{ ...SENT, to: 'dollars' }],
      banks: [{ id: 'dollars', label: 'Bank', unit: 'USD', sameCycle: true, offsets: ['energy'] }],
    });
  const taxed = (of: ReturnType<typeof plan>, from = opening()) =>
    said(settled(of, usage({ import: 100, export: 60 }), from).settlement.lines).find((line) => line.startsWith('tax'));

  test('before credits goes by the lines, after credits by what USD banks left unpaid', () => {
    expect(taxed(tax({ afterCredits: false }))).toBe('tax 22 USD at 0.05 = 1.10');
    expect(taxed(tax({ afterCredits: true }))).toBe('tax 16 USD at 0.05 = 0.80');
  });

  test('before credits goes by the lines as they were before kWh banks too', () => {
    const of = (afterCredits: boolean) =>
      plan({
        charges: [ENERGY, CUSTOMER, { ...TAX, afterCredits }],
        banks: [{ id: 'kwhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'] }],
      });
    const held = opening({ banks: { kwhBank: '30' } });
    expect(taxed(of(false), held)).toBe('tax 22 USD at 0.05 = 1.10');
    expect(taxed(of(true), held)).toBe('tax 19 USD at 0.05 = 0.95');
  });

  test('a tax above a floor makes a minimum after tax, below it a minimum before tax', () => {
    const floor = (on: string[]) => ({
      id: 'least',
      label: 'Minimum',
      kind: 'minimum',
      basis: 'floor',
      per: 'cycle',
      on,
      rates: [{ from: '2025-01-01', rate: '30.00' }],
    });
    const above = plan({ charges: [ENERGY, { ...TAX, on: ['energy'], afterCredits: true }, floor(['energy', 'tax'])] });
    const below = plan({
      charges: [ENERGY, floor(['energy']), { ...TAX, on: ['energy', 'least'], afterCredits: true }],
    });
    const cycle = usage({ import: 100 });
    expect(said(settled(above, cycle).settlement.lines).slice(1)).toEqual([
      'tax 10 USD at 0.05 = 0.50',
      'least = 19.50',
    ]);
    expect(said(settled(below, cycle).settlement.lines).slice(1)).toEqual([
      'least = 20.00',
      'tax 30 USD at 0.05 = 1.50',
    ]);
  });

  test('a floor in a split cycle faces each part’s share of its lines', () => {
    const rates = [
      { from: '2025-01-01', rate: '0.50' },
      { from: '2026-07-01', rate: '0.70' },
    ];
    const floor = { id: 'least', label: 'Minimum', kind: 'minimum', basis: 'floor', per: 'day', on: ['energy'], rates };
    expect(said(settled(plan({ charges: [ENERGY, floor] }), usage({ import: 60 })).settlement.lines).slice(1)).toEqual([
      'least 2026-06-16..2026-07-01 = 4.50',
      'least 2026-07-01..2026-07-16 = 7.50',
    ]);
  });

  test('money half to even rounds a half cent to the even one', () => {
    const of = (money: string) =>
      plan({
        rounding: { money, limits: 'whole', kWh: 'exact' },
        charges: [{ ...ENERGY, rates: [{ from: '2025-01-01', rate: '0.005' }] }],
      });
    expect(settled(of('halfUp'), usage({ import: 5 })).settlement.amountDueCents).toBe(3);
    expect(settled(of('halfEven'), usage({ import: 5 })).settlement.amountDueCents).toBe(2);
  });
});

describe('what a plan asks for', () => {
  test('and the inputs do not hold is refused, never taken for zero', () => {
    const charge = (part: object) =>
      plan({
        load: 'metered',
        calendar: { periods: [{ id: 'all', when: 'rest' }] },
        charges: [{ ...ENERGY, ...part }],
      });
    const byPeriod = { rates: [{ from: '2025-01-01', period: 'all', rate: '0.1' }] };
    expect(refusal(charge({ basis: 'load' }), usage())).toMatch(/load meter/);
    expect(refusal(charge(byPeriod), usage())).toMatch(/by period is needed/);
    expect(refusal(charge({ netting: 'period' }), usage())).toMatch(/by period are needed/);
    expect(refusal(charge({ netting: 'hour' }), usage())).toMatch(/interval data are needed/);
    expect(refusal(charge({ basis: 'kW', kWOf: 'demand', kind: 'demand' }), usage())).toMatch(
      /demand rating is needed/,
    );
    expect(refusal(charge(byPeriod), usage({ byPeriod: { other: { importWh: wh(1), exportWh: wh(0) } } }))).toBe(
      'The plan has no period other.',
    );
    expect(refusal(plan(), usage({ to: '2026-06-16' }))).toMatch(/must end after it begins/);
  });

  test('the whole use is import + production − export, or the load meter', () => {
    const of = (load: string) => plan({ load, charges: [{ ...ENERGY, basis: 'load' }] });
    expect(
      settled(of('computed'), usage({ import: 20, export: 30, production: 50 })).settlement.lines[0]?.quantity,
    ).toBe('40');
    expect(settled(of('metered'), usage({ import: 20, loadWh: wh(41_500) })).settlement.lines[0]?.quantity).toBe(
      '41.5',
    );
  });

  test('the account is followed only where the opening holds its balance', () => {
    const payments = [{ on: usage().from, amountCents: cents(1275) }];
    expect(said(settled(plan(), usage({ import: 100, payments })).settlement.lines)).toHaveLength(1);
    const followed = settled(plan(), usage({ import: 100, payments }), opening({ balanceCents: cents(1275) }));
    expect(said(followed.settlement.lines).slice(1)).toEqual(['account = 12.75', 'account = -12.75']);
    expect(followed.closing.balanceCents).toBe(1000);
  });
});
