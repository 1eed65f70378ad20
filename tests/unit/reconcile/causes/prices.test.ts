import { describe, expect, test } from 'vitest';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { type BuiltHouse, causesACentOff, causesFor, ids, kWh, openingOf, planOf, usageOf } from './billed-house.ts';
import { byPeriod, hourly, netBilling, netMetering } from './built-plans.ts';

const winter = usageOf('2026-01-14', '2026-02-13', { importWh: kWh(612), exportWh: kWh(187), productionWh: kWh(640) });
const summer = usageOf('2026-06-16', '2026-07-16', { importWh: kWh(388), exportWh: kWh(702), productionWh: kWh(990) });
const straddling = usageOf('2026-05-15', '2026-06-16', { importWh: kWh(361), exportWh: kWh(518) });

function house(plan: RatePlan, usage = winter, banks = {}): BuiltHouse {
  return { opening: openingOf(banks), cycles: [{ plan, usage, reads: [] }] };
}

/** The plan with one item's rates changed, by hand. */
function repriced(plan: RatePlan, id: string, rates: RatePlan['charges'][number]['rates']): RatePlan {
  return {
    ...plan,
    charges: plan.charges.map((charge) => (charge.id === id ? { ...charge, rates } : charge)),
    credits: plan.credits.map((credit) => (credit.id === id ? { ...credit, rates, ratesOf: null } : credit)),
  };
}

const from = winter.from;

function expectOne(built: BuiltHouse, plan: RatePlan, words: string, found: Record<string, string>) {
  const causes = causesFor(built, { plan });
  expect(ids(causes)).toEqual(['wrongRate']);
  expect(causes[0]?.words).toBe(words);
  expect(causes[0]?.found).toEqual(found);
  expect(causesACentOff(built, { plan })).toEqual([]);
}

describe('season', () => {
  test('a credit at the winter rate in summer', () => {
    expectOne(
      house(netBilling, summer),
      repriced(netBilling, 'exportCredit', [{ from, rate: '0.0614' }]),
      'Export credit was priced at the winter rate, $0.0614, instead of the summer rate, $0.0982.',
      { price: 'season', season: 'winter', items: 'exportCredit' },
    );
  });

  test('a rate no one has is no cause', () => {
    const odd = repriced(netBilling, 'exportCredit', [{ from, rate: '0.0615' }]);
    expect(causesFor(house(netBilling, summer), { plan: odd })).toEqual([]);
  });

  const seasonal = planOf({
    netting: 'none',
    calendar: netBilling.calendar,
    seasonBy: 'days',
    charges: [
      {
        id: 'energy',
        label: 'Energy',
        kind: 'import',
        basis: 'import',
        rates: [
          { from: '2025-01-01', rate: '0.1100' },
          { from: '2025-01-01', season: 'summer', rate: '0.1425' },
        ],
        tiers: [
          { from: '2025-01-01', per: 'cycle', limits: ['500'] },
          { from: '2025-01-01', season: 'summer', per: 'cycle', limits: ['300'] },
        ],
      },
      {
        id: 'delivery',
        label: 'Delivery',
        kind: 'import',
        basis: 'import',
        rates: [
          { from: '2025-01-01', season: 'summer', rate: '0.0402' },
          { from: '2025-01-01', season: 'winter', rate: '0.0297' },
        ],
      },
    ],
  });

  test('everything at another season’s prices, its tier limits too', () => {
    const plan = {
      ...seasonal,
      charges: seasonal.charges.map((charge) =>
        charge.id === 'energy'
          ? { ...charge, rates: [{ from, rate: '0.1425' }], tiers: [{ from, per: 'cycle' as const, limits: ['300'] }] }
          : { ...charge, rates: [{ from, rate: '0.0402' }] },
      ),
    };
    expectOne(house(seasonal), plan, 'Energy and Delivery were priced at the summer rate.', {
      price: 'season',
      season: 'summer',
      items: 'energy, delivery',
    });
  });

  const PERIODS_OF = { peak: 'On-peak', off: 'Off-peak' };
  const seasonalByPeriod = planOf({
    netting: 'none',
    calendar: { ...netBilling.calendar, ...byPeriod.calendar, seasons: netBilling.calendar.seasons },
    charges: [
      {
        id: 'energy',
        label: 'Energy',
        kind: 'import',
        basis: 'import',
        rates: [
          { from: '2025-01-01', season: 'summer', period: 'peak', rate: '0.3121' },
          { from: '2025-01-01', season: 'summer', period: 'off', rate: '0.1317' },
          { from: '2025-01-01', season: 'winter', period: 'peak', rate: '0.2243' },
          { from: '2025-01-01', season: 'winter', period: 'off', rate: '0.1109' },
        ],
      },
    ],
  });
  const flows = { peak: { importWh: kWh(151), exportWh: kWh(0) }, off: { importWh: kWh(461), exportWh: kWh(0) } };

  test.each(['peak', 'off'] as const)('one period alone at another season’s price: %s', (period) => {
    const rates = { peak: '0.2243', off: '0.1109', [period]: period === 'peak' ? '0.3121' : '0.1317' };
    const plan = repriced(seasonalByPeriod, 'energy', [
      { from, period: 'peak', rate: rates.peak },
      { from, period: 'off', rate: rates.off },
    ]);
    const said = period === 'peak' ? ['$0.3121', '$0.2243'] : ['$0.1317', '$0.1109'];
    expectOne(
      house(seasonalByPeriod, { ...winter, byPeriod: flows }),
      plan,
      `Energy was priced at the summer rate for ${PERIODS_OF[period]}, ${said[0]}, instead of the winter rate, ${said[1]}.`,
      { price: 'season', season: 'summer', for: PERIODS_OF[period], items: 'energy' },
    );
  });

  test('a price that one period alone has by season is no other period’s', () => {
    const plan = {
      ...seasonalByPeriod,
      charges: seasonalByPeriod.charges.map((charge) => ({
        ...charge,
        rates: charge.rates
          .filter((row) => row.period === 'peak' || row.season === 'summer')
          .map((row) => (row.period === 'off' ? { ...row, season: undefined } : row)),
      })),
    };
    const wrong = repriced(plan, 'energy', [
      { from, period: 'peak', rate: '0.3121' },
      { from, period: 'off', rate: '0.1317' },
    ]);
    const causes = causesFor(house(plan, { ...winter, byPeriod: flows }), { plan: wrong });
    expect(causes[0]?.found).toEqual({ price: 'season', season: 'summer', items: 'energy' });
    expect(causes[0]?.alsoWords).toEqual([]);
  });

  test('a change of season inside the cycle, one season’s price for all of it', () => {
    const plan = repriced(seasonal, 'delivery', [{ from, rate: '0.0297' }]);
    expectOne(house(seasonal, straddling), plan, 'Delivery was priced at the winter rate.', {
      price: 'season',
      season: 'winter',
      items: 'delivery',
    });
  });

  test('a change of season taken by the read date instead of by days, and by days instead of the read date', () => {
    const [read] = causesFor(house(seasonal, straddling), { plan: { ...seasonal, seasonBy: 'readDate' } });
    expect(read?.cause).toBe('wrongRate');
    expect([read?.words, ...(read?.alsoWords ?? [])]).toEqual([
      'Energy and Delivery were priced at the summer rate.',
      'The change of season was taken by the read date for the whole cycle.',
    ]);
    expectOne(
      house(netBilling, straddling),
      { ...netBilling, seasonBy: 'days' },
      'The change of season was shared by days.',
      { price: 'change', by: 'days' },
    );
  });
});

describe('version', () => {
  test('the price before the change', () => {
    expectOne(
      house(netBilling, summer),
      repriced(netBilling, 'energy', [{ from, rate: '0.1425' }]),
      'Energy was priced at the rate before 1 Jun 2026, $0.1425, instead of $0.1513.',
      { price: 'version', version: '2025-01-01', items: 'energy' },
    );
  });

  test('the price of a change still to come, also for a percent', () => {
    expectOne(
      house(netBilling),
      repriced(netBilling, 'energy', [{ from, rate: '0.1513' }]),
      'Energy was priced at the rate from 1 Jun 2026, $0.1513, instead of $0.1425.',
      { price: 'version', version: '2026-06-01', items: 'energy' },
    );
    const taxed = repriced(netBilling, 'tax', [
      { from: winter.from, rate: '0.0625' },
      { from: summer.from, rate: '0.07' },
    ]);
    const causes = causesFor(house(taxed), { plan: repriced(netBilling, 'tax', [{ from, rate: '0.07' }]) });
    expect(causes[0]?.words).toBe('Sales tax was priced at the rate from 16 Jun 2026, 0.07, instead of 0.0625.');
  });

  test('a change inside the cycle, the old price for all of it, or the new by the read date', () => {
    const old = causesFor(house(netBilling, straddling), {
      plan: repriced(netBilling, 'energy', [{ from, rate: '0.1425' }]),
    });
    expect(old).toMatchObject([
      { cause: 'wrongRate', words: 'Energy was priced at the rate before 1 Jun 2026.', alsoWords: [] },
    ]);
    const byReadDate = causesFor(house(netBilling, straddling), { plan: { ...netBilling, rateChangeBy: 'readDate' } });
    expect(byReadDate[0]?.words).toBe('Energy was priced at the rate from 1 Jun 2026.');
    expect(byReadDate[0]?.alsoWords).toEqual(['The price change was taken by the read date for the whole cycle.']);
  });

  test('tier limits of another version', () => {
    const [energy, ...rest] = netMetering.charges;
    if (!energy) throw new Error('no charge');
    const tiers = [...energy.tiers, { from: summer.from, per: 'day' as const, limits: ['12'] }];
    const plan = { ...netMetering, charges: [{ ...energy, tiers }, ...rest] };
    const later = { ...energy, tiers: [{ from, per: 'day' as const, limits: ['12'] }] };
    expectOne(house(plan), { ...plan, charges: [later, ...rest] }, 'Energy was priced at the rate from 16 Jun 2026.', {
      price: 'version',
      version: '2026-06-16',
      items: 'energy',
    });
  });

  test('a rider’s price is read from the bill and is none to be wrong', () => {
    const rates = [
      { from: usageOf('2025-01-01', '2025-02-01').from, rate: '0.0061' },
      { from: winter.from, rate: '0.0084' },
    ];
    const plain = repriced(netBilling, 'benefits', rates);
    const rider = {
      ...plain,
      charges: plain.charges.map((one) => (one.id === 'benefits' ? { ...one, learned: true } : one)),
    };
    expect(ids(causesFor(house(plain), { plan: netBilling }))).toEqual(['wrongRate']);
    expect(causesFor(house(rider), { plan: netBilling })).toEqual([]);
  });

  test('versions long gone are not tried', () => {
    const rates = ['2021', '2022', '2023', '2024', '2025', '2026'].map((year, at) => ({
      from: usageOf(`${year}-01-01`, '2030-01-01').from,
      rate: `0.1${at}`,
    }));
    const plan = repriced(netBilling, 'benefits', rates);
    const at = (rate: string) => causesFor(house(plan), { plan: repriced(plan, 'benefits', [{ from, rate }]) });
    expect(ids(at('0.14'))).toEqual(['wrongRate']);
    expect(ids(at('0.13'))).toEqual(['wrongRate']);
    expect(at('0.10')).toEqual([]);
  });
});

describe('period and tier', () => {
  const flows = { peak: { importWh: kWh(151), exportWh: kWh(12) }, off: { importWh: kWh(461), exportWh: kWh(175) } };
  const usage = { ...winter, byPeriod: flows, productionWh: null };

  test('one period’s kWh at the other’s price', () => {
    const plan = repriced(
      byPeriod,
      'energy',
      [{ from, rate: '0.1033' }].flatMap((row) => [
        { ...row, period: 'peak' },
        { ...row, period: 'off' },
      ]),
    );
    const causes = causesFor(house(byPeriod, usage), { plan });
    expect(ids(causes)).toEqual(['wrongRate']);
    expect(causes[0]?.words).toBe('Energy was priced at the Off-peak rate for On-peak.');
  });

  test('all kWh at the price of one of three tiers, and one tier at another’s', () => {
    const tiered = planOf({
      netting: 'none',
      charges: [
        {
          id: 'energy',
          label: 'Energy',
          kind: 'import',
          basis: 'import',
          rates: [
            { from, tier: 1, rate: '0.09' },
            { from, tier: 2, rate: '0.12' },
            { from, tier: 3, rate: '0.17' },
          ],
          tiers: [{ from, per: 'cycle', limits: ['200', '400'] }],
        },
      ],
    });
    const priced = (...rates: string[]) =>
      repriced(
        tiered,
        'energy',
        rates.map((rate, at) => ({ from, tier: at + 1, rate })),
      );
    expectOne(
      house(tiered),
      priced('0.09', '0.09', '0.09'),
      'Energy was priced at the tier 1 rate for tier 2, tier 3.',
      {
        price: 'tier',
        taken: 'tier 1',
        for: 'tier 2, tier 3',
        items: 'energy',
      },
    );
    const second = causesFor(house(tiered), { plan: priced('0.09', '0.17', '0.17') });
    expect(second[0]).toMatchObject({ cause: 'wrongRate', found: { taken: 'tier 3', for: 'tier 2' } });
  });

  test('a period without a label is called by its id', () => {
    const unnamed = {
      ...byPeriod,
      calendar: { ...byPeriod.calendar, periods: byPeriod.calendar.periods.map((one) => ({ ...one, label: '' })) },
    };
    const plan = repriced(unnamed, 'energy', [
      { from, period: 'peak', rate: '0.2417' },
      { from, period: 'off', rate: '0.2417' },
    ]);
    expect(causesFor(house(unnamed, usage), { plan })[0]?.words).toBe('Energy was priced at the peak rate for off.');
  });
});

describe('credits and true-ups', () => {
  test('a credit at half its rate', () => {
    expectOne(
      house(netBilling),
      repriced(netBilling, 'exportCredit', [{ from, rate: '0.0307' }]),
      'Export credit was priced at half the rate, $0.0307, instead of $0.0614.',
      { price: 'half', items: 'exportCredit' },
    );
  });

  test('a payment at true-up at an old price', () => {
    const paid = {
      ...netMetering,
      banks: netMetering.banks.map((bank) => ({
        ...bank,
        trueUps: [
          {
            at: { months: [2] },
            keep: null,
            atLeast: '0',
            action: 'pay' as const,
            rates: [
              { from: summer.from, rate: '0.0401' },
              { from: usageOf('2025-01-01', '2025-02-01').from, rate: '0.0333' },
            ],
            ratesOf: null,
            to: 'separate' as const,
            fee: '0',
          },
        ],
      })),
    };
    const [bank] = paid.banks;
    if (!bank) throw new Error('no bank');
    const [due] = bank.trueUps;
    if (!due) throw new Error('no true-up');
    const late = { ...paid, banks: [{ ...bank, trueUps: [{ ...due, rates: [{ from, rate: '0.0401' }] }] }] };
    const spring = { ...winter, importWh: kWh(100) };
    const causes = causesFor(house(paid, spring, { kwhBank: '300' }), { plan: late });
    expect(causes[0]).toMatchObject({
      cause: 'wrongRate',
      words: 'Energy bank was priced at the rate from 16 Jun 2026, $0.0401, instead of $0.0333.',
      overbilledCents: -263,
    });
  });

  const flow = { importWh: kWh(480), exportWh: kWh(55), byPeriod: null };
  const netted = { ...winter, netted: { hour: flow } };

  function share(plan: RatePlan, ratesOf: { charges: string[]; fraction: string; tier: number }): RatePlan {
    return { ...plan, credits: plan.credits.map((credit) => ({ ...credit, ratesOf })) };
  }

  test('a share of another rate: half of it, the whole rate, an old rate', () => {
    const charges = ['energy'];
    const half = causesFor(house(hourly, netted), { plan: share(hourly, { charges, fraction: '0.375', tier: 1 }) });
    expect(half[0]?.words).toBe('Export credit was priced at half the rate, $0.060825, instead of $0.12165.');
    const whole = causesFor(house(hourly, netted), { plan: share(hourly, { charges, fraction: '1', tier: 1 }) });
    expect(whole[0]?.words).toBe('Export credit was priced at the whole rate, $0.1622, instead of $0.12165.');
    const old = causesFor(house(hourly, netted), {
      plan: repriced(hourly, 'exportCredit', [{ from, rate: '0.11265' }]),
    });
    expect(old[0]?.words).toBe(
      'Export credit was priced at the rate before 1 Jan 2026, $0.11265, instead of $0.12165.',
    );
  });

  test('a share of a tiered, seasonal rate: another tier’s, another season’s', () => {
    const plan = planOf({
      netting: 'none',
      calendar: netBilling.calendar,
      charges: [
        {
          id: 'energy',
          label: 'Energy',
          kind: 'import',
          basis: 'import',
          rates: [
            { from, season: 'summer', tier: 1, rate: '0.15' },
            { from, season: 'winter', tier: 1, rate: '0.11' },
            { from, tier: 2, rate: '0.19' },
          ],
          tiers: [{ from, per: 'cycle', limits: ['400'] }],
        },
      ],
      credits: [
        {
          id: 'exportCredit',
          label: 'Export credit',
          kind: 'export',
          basis: 'export',
          to: 'bill',
          ratesOf: { charges: ['energy'], fraction: '0.5' },
        },
      ],
    });
    const tier = causesFor(house(plan), { plan: share(plan, { charges: ['energy'], fraction: '0.5', tier: 2 }) });
    expect(tier[0]?.words).toBe('Export credit was priced at the tier 2 rate, $0.095, instead of $0.055.');
    const other = causesFor(house(plan), { plan: repriced(plan, 'exportCredit', [{ from, rate: '0.075' }]) });
    expect(other[0]?.words).toBe(
      'Export credit was priced at the summer rate, $0.075, instead of the winter rate, $0.055.',
    );
  });

  test('a payment at true-up at half a share of another rate', () => {
    const paid = (fraction: string) => ({
      ...netMetering,
      banks: netMetering.banks.map((bank) => ({
        ...bank,
        trueUps: [
          {
            at: { months: [2] },
            keep: null,
            atLeast: '0',
            action: 'pay' as const,
            rates: null,
            ratesOf: { charges: ['delivery'], fraction, tier: 1 },
            to: 'separate' as const,
            fee: '0',
          },
          {
            at: { months: [3] },
            keep: null,
            atLeast: '0',
            action: 'expire' as const,
            rates: null,
            ratesOf: null,
            to: null,
            fee: '0',
          },
        ],
      })),
    });
    const causes = causesFor(house(paid('0.8'), { ...winter, importWh: kWh(100) }, { kwhBank: '300' }), {
      plan: paid('0.4'),
    });
    expect(causes).toMatchObject([{ cause: 'wrongRate', found: { price: 'half', items: 'kwhBank' } }]);
  });

  test('a share of two rates has no version from before both', () => {
    const both = {
      ...hourly,
      charges: [
        ...hourly.charges,
        {
          ...hourly.charges.reduce((charge) => charge),
          id: 'delivery',
          label: 'Delivery',
          rates: [{ from: usageOf('2025-06-01', '2025-07-01').from, rate: '0.03' }],
        },
      ],
    };
    const plan = share(both, { charges: ['energy', 'delivery'], fraction: '0.5', tier: 1 });
    const old = repriced(plan, 'exportCredit', [{ from, rate: '0.0751' }]);
    expect(causesFor(house(plan, netted), { plan: old })).toEqual([]);
    const between = repriced(plan, 'exportCredit', [{ from, rate: '0.0901' }]);
    expect(causesFor(house(plan, netted), { plan: between })[0]?.words).toBe(
      'Export credit was priced at the rate before 1 Jan 2026, $0.0901, instead of $0.0961.',
    );
  });

  test('a share of a rate by period, one period at the other’s', () => {
    const plan = planOf({
      netting: 'none',
      calendar: byPeriod.calendar,
      charges: byPeriod.charges,
      credits: [
        {
          id: 'exportCredit',
          label: 'Export credit',
          kind: 'export',
          basis: 'export',
          to: 'bill',
          ratesOf: { charges: ['energy'], fraction: '0.5' },
        },
      ],
    });
    const flows = { peak: { importWh: kWh(151), exportWh: kWh(12) }, off: { importWh: kWh(461), exportWh: kWh(175) } };
    const off = repriced(plan, 'exportCredit', [
      { from, period: 'peak', rate: '0.05165' },
      { from, period: 'off', rate: '0.05165' },
    ]);
    const causes = causesFor(house(plan, { ...winter, byPeriod: flows }), { plan: off });
    expect(causes[0]?.words).toBe('Export credit was priced at the Off-peak rate for On-peak.');
  });
});

describe('days', () => {
  test.each([1, -1, 2, -3])('%d days more are counted', (off) => {
    const usage = usageOf(winter.from, `2026-02-${String(13 + off).padStart(2, '0')}`, {
      importWh: winter.importWh,
      exportWh: winter.exportWh,
      productionWh: winter.productionWh,
    });
    const causes = causesFor(house(netBilling), { usage });
    expect(ids(causes)).toEqual(['wrongDays']);
    expect(causes[0]?.words).toBe(`It was counted as ${30 + off} days; the cycle has 30.`);
    expect(causes[0]?.found).toEqual({ days: String(30 + off), trueDays: '30' });
    expect(causesACentOff(house(netBilling), { usage })).toEqual([]);
  });

  test('four days more are too many for this mistake; a cycle of a day cannot lose it', () => {
    const four = { ...winter, to: usageOf(winter.from, '2026-02-17').to };
    expect(causesFor(house(netBilling), { usage: four })).toEqual([]);
    const short = usageOf('2026-02-13', '2026-02-14', { importWh: kWh(20) });
    const two = { usage: { ...short, to: usageOf(short.from, '2026-02-15').to } };
    expect(ids(causesFor(house(netBilling, short), two))).toEqual(['wrongDays']);
  });
});
