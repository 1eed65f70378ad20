import { describe, expect, test } from 'vitest';
import { priceQuantity } from '#shared/settlement/price.ts';
import type { CycleUsage } from '#shared/settlement/settlement.ts';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { ENERGY, opening, plan, refusal, said, settled, TWO_SEASONS, usage } from './plans.ts';

const PERIODS = [
  { id: 'peak', label: 'Peak', when: [{ days: 'all', from: '16:00', to: '21:00' }] },
  { id: 'off', label: 'Off-peak', when: 'rest' },
];
const SUMMER_PEAK = [
  { id: 'peak', label: 'Peak', when: [{ season: 'summer', days: 'all', from: '16:00', to: '21:00' }] },
  { id: 'off', label: 'Off-peak', when: 'rest' },
];
const CHANGING = [
  { from: '2025-01-01', rate: '0.10' },
  { from: '2026-07-04', rate: '0.20' },
];
const flow = (bought: number, sent = 0) => ({ importWh: wh(bought * 1000), exportWh: wh(sent * 1000) });
const rows = (peak: string, off: string) => [
  { from: '2025-01-01', period: 'peak', rate: peak },
  { from: '2025-01-01', period: 'off', rate: off },
];

/** Friday 3 and Saturday 4 July 2026 in Denver, whose midnight is 06:00 UTC, in steps of so many minutes. */
function twoDays(minutes: number, step: (hour: number) => { in?: number; out?: number; made?: number }): CycleUsage {
  const count = (48 * 60) / minutes;
  const all = Array.from({ length: count }, (_, at) => step((at * minutes) / 60));
  const values = (of: 'in' | 'out' | 'made') => all.map((one) => one[of] ?? 0);
  const kWh = (of: 'in' | 'out' | 'made') => values(of).reduce((sum, value) => sum + value, 0) / 1000;
  return usage({
    from: '2026-07-03',
    to: '2026-07-05',
    import: kWh('in'),
    export: kWh('out'),
    production: kWh('made'),
    intervals: {
      startUtc: '2026-07-03T06:00:00Z',
      minutes,
      importWh: values('in'),
      exportWh: values('out'),
      productionWh: values('made'),
    },
  });
}
const inIntervals = (cycle: CycleUsage, part: Partial<NonNullable<CycleUsage['intervals']>>): CycleUsage =>
  cycle.intervals === null ? cycle : { ...cycle, intervals: { ...cycle.intervals, ...part } };

describe('interval data', () => {
  const hours = twoDays(60, (hour) => ({ in: hour < 24 ? 250 : 750, out: hour % 24 === 12 ? 3000 : 0, made: 100 }));

  test('of five minutes are netted in quarter-hours and in hours', () => {
    const five = twoDays(5, (hour) => ({ in: 10, out: hour === 12 ? 50 : hour === 12.25 ? 100 : 0 }));
    const lines = (netting: string) => said(settled(plan({ netting, charges: [ENERGY] }), five).settlement.lines);
    // In the quarter-hours from noon on, 30 Wh come in and 50 and 100 Wh go out; in the hour 120 Wh and 150 Wh.
    expect(lines('none')).toEqual(['energy 5.76 kWh at 0.10 = 0.58']);
    expect(lines('15min')).toEqual(['energy 5.7 kWh at 0.10 = 0.57']);
    expect(lines('hour')).toEqual(['energy 5.64 kWh at 0.10 = 0.56']);
  });

  test('that cannot be read are refused in words', () => {
    const of = plan({ netting: 'hour' });
    expect(refusal(of, inIntervals(hours, { startUtc: 'noon' }))).toBe(
      'The interval data have no readable start or step.',
    );
    expect(refusal(of, inIntervals(hours, { minutes: 0 }))).toBe('The interval data have no readable start or step.');
    expect(refusal(of, inIntervals(hours, { exportWh: [1, 2] }))).toBe(
      'Import and export intervals are not of the same number.',
    );
    const made = plan({ rateChangeBy: 'intervals', charges: [{ ...ENERGY, basis: 'production', rates: CHANGING }] });
    expect(refusal(made, inIntervals(hours, { productionWh: [1] }))).toBe(
      'The plan needs interval data of production for this cycle.',
    );
    expect(refusal(plan({ netting: '15min' }), { ...hours, intervals: null })).toBe(
      'The plan nets by quarter-hours: interval data are needed.',
    );
    expect(refusal(of, { ...hours, intervals: null })).toBe('The plan nets by the hour: interval data are needed.');
  });

  test('that begin a day late or end a day early do not cover the cycle', () => {
    const of = plan({ netting: 'hour' });
    const late = inIntervals({ ...hours, from: usage({ from: '2026-07-02' }).from }, {});
    const early = inIntervals({ ...hours, to: usage({ to: '2026-07-06' }).to }, {});
    for (const cycle of [late, early])
      expect(refusal(of, cycle)).toBe('The interval data do not cover the whole cycle.');
  });

  test('tell production and the house’s use on each side of a change of price', () => {
    const made = plan({ rateChangeBy: 'intervals', charges: [{ ...ENERGY, basis: 'production', rates: CHANGING }] });
    const growing = twoDays(60, (hour) => ({ in: 250, made: hour < 24 ? 100 : 400, out: hour === 30 ? 600 : 0 }));
    expect(said(settled(made, growing).settlement.lines)).toEqual([
      'energy 2026-07-03..2026-07-04 2.4 kWh at 0.10 = 0.24',
      'energy 2026-07-04..2026-07-05 9.6 kWh at 0.20 = 1.92',
    ]);
    const used = plan({
      load: 'computed',
      rateChangeBy: 'intervals',
      charges: [{ ...ENERGY, basis: 'load', rates: CHANGING }],
    });
    expect(said(settled(used, growing).settlement.lines)).toEqual([
      'energy 2026-07-03..2026-07-04 8.4 kWh at 0.10 = 0.84',
      'energy 2026-07-04..2026-07-05 15 kWh at 0.20 = 3.00',
    ]);
  });

  test('do not tell the load meter: a change is by days there', () => {
    const of = plan({
      load: 'metered',
      rateChangeBy: 'intervals',
      charges: [{ ...ENERGY, basis: 'load', rates: CHANGING }],
    });
    expect(said(settled(of, { ...hours, loadWh: wh(9000) }).settlement.lines)).toEqual([
      'energy 2026-07-03..2026-07-04 4.5 kWh at 0.10 = 0.45',
      'energy 2026-07-04..2026-07-05 4.5 kWh at 0.20 = 0.90',
    ]);
  });

  test('are netted in each hour on each side of a change of price', () => {
    const of = plan({ netting: 'hour', rateChangeBy: 'intervals', charges: [{ ...ENERGY, rates: CHANGING }] });
    expect(said(settled(of, hours).settlement.lines)).toEqual([
      'energy 2026-07-03..2026-07-04 5.75 kWh at 0.10 = 0.58',
      'energy 2026-07-04..2026-07-05 17.25 kWh at 0.20 = 3.45',
    ]);
  });
});

describe('netted kWh as the utility states them', () => {
  const stated = usage({
    import: 100,
    export: 40,
    netted: { hour: { ...flow(90, 30), byPeriod: { peak: flow(20, 5), off: flow(70, 25) } } },
  });

  test('are taken as they stand, by period too', () => {
    const of = plan({
      netting: 'hour',
      calendar: { periods: PERIODS },
      charges: [{ ...ENERGY, rates: rows('0.30', '0.10') }],
    });
    expect(said(settled(of, stated).settlement.lines)).toEqual([
      'energy peak 20 kWh at 0.30 = 6.00',
      'energy off 70 kWh at 0.10 = 7.00',
    ]);
  });

  test('of a period the plan does not have are refused', () => {
    const of = plan({ netting: 'hour', calendar: { periods: [PERIODS[1]] } });
    expect(refusal(of, stated)).toBe('The plan has no period peak.');
  });
});

describe('production and use by period', () => {
  test('need interval data, since no register prints them', () => {
    const of = (basis: string) =>
      plan({
        load: 'computed',
        calendar: { periods: PERIODS },
        charges: [{ ...ENERGY, basis, rates: rows('0.30', '0.10') }],
      });
    const cycle = usage({ import: 10, production: 5, byPeriod: { peak: flow(4), off: flow(6) } });
    expect(refusal(of('production'), cycle)).toBe('Energy is priced by period: production by period is needed.');
    expect(refusal(of('load'), cycle)).toBe('Energy is priced by period: use by period is needed.');
  });
});

describe('what a kWh bank paid by period', () => {
  const bank = { id: 'kwhBank', label: 'kWh bank', unit: 'kWh', byPeriod: true, offsets: ['energy'] };
  const changing = PERIODS.flatMap(({ id }) => CHANGING.map((row) => ({ ...row, period: id })));
  const of = plan({
    rateChangeBy: 'intervals',
    calendar: { periods: PERIODS },
    charges: [{ ...ENERGY, rates: changing }],
    banks: [bank],
  });
  // 5 peak hours a day: 5 and 10 kWh; 19 other hours: 19 and 38 kWh.
  const cycle = twoDays(60, (hour) => ({ in: hour < 24 ? 1000 : 2000 }));

  test('is shared between the stretches of a change in the proportion of that period’s kWh', () => {
    const { settlement } = settled(of, cycle, opening({ banks: { kwhBank: { peak: '3', off: '0' } } }));
    expect(said(settlement.lines)).toEqual([
      'energy peak 2026-07-03..2026-07-04 4 kWh at 0.10 = 0.40',
      'energy off 2026-07-03..2026-07-04 19 kWh at 0.10 = 1.90',
      'energy peak 2026-07-04..2026-07-05 8 kWh at 0.20 = 1.60',
      'energy off 2026-07-04..2026-07-05 38 kWh at 0.20 = 7.60',
    ]);
  });

  test('does not reach a period that the registers do not print, though intervals have it', () => {
    const { settlement } = settled(
      of,
      { ...cycle, byPeriod: { off: flow(57) } },
      opening({ banks: { kwhBank: { peak: '3', off: '57' } } }),
    );
    expect(said(settlement.lines).map((line) => line.replace(/ at.*/, ''))).toEqual([
      'energy peak 2026-07-03..2026-07-04 5 kWh',
      'energy off 2026-07-03..2026-07-04 0 kWh',
      'energy peak 2026-07-04..2026-07-05 10 kWh',
      'energy off 2026-07-04..2026-07-05 0 kWh',
    ]);
  });

  test('and days share the rest where the season changes by them inside a stretch', () => {
    const seasonal = plan({
      rateChangeBy: 'intervals',
      seasonBy: 'days',
      calendar: {
        seasons: [
          { id: 'first', from: '01-01', to: '07-04' },
          { id: 'second', from: '07-05', to: '12-31' },
        ],
      },
      charges: [
        {
          ...ENERGY,
          rates: [
            { from: '2025-01-01', season: 'first', rate: '0.10' },
            { from: '2026-07-04', season: 'first', rate: '0.20' },
            { from: '2025-01-01', season: 'second', rate: '0.40' },
          ],
        },
      ],
      banks: [{ ...bank, byPeriod: false }],
    });
    const three = { ...twoDays(60, () => ({ in: 1000 })), to: usage({ to: '2026-07-06' }).to };
    const hours = Array.from({ length: 72 }, () => 1000);
    const zeros = hours.map(() => 0);
    const { settlement } = settled(
      seasonal,
      inIntervals({ ...three, importWh: wh(72_000) }, { importWh: hours, exportWh: zeros, productionWh: zeros }),
      opening({ banks: { kwhBank: '36' } }),
    );
    expect(said(settlement.lines)).toEqual([
      'energy 2026-07-03..2026-07-04 12 kWh at 0.10 = 1.20',
      'energy 2026-07-04..2026-07-05 12 kWh at 0.20 = 2.40',
      'energy 2026-07-05..2026-07-06 12 kWh at 0.40 = 4.80',
    ]);
  });
});

describe('a period without hours in a season', () => {
  const seasonal = (rates: object[], tiers: object[] = []) =>
    plan({
      seasonBy: 'days',
      calendar: { seasons: TWO_SEASONS, periods: SUMMER_PEAK },
      charges: [{ ...ENERGY, rates, tiers }],
    });
  const priced = TWO_SEASONS.flatMap(({ id }) => rows('0.30', '0.10').map((row) => ({ ...row, season: id })));
  const intoSummer = { from: '2026-05-22', to: '2026-06-11', import: 100 };

  test('that a bill prints all the same is shared over all its days', () => {
    const winter = seasonal([...priced, { from: '2026-02-01', season: 'winter', period: 'peak', rate: '0.30' }]);
    const cycle = usage({ from: '2026-01-22', to: '2026-02-11', import: 100, byPeriod: { peak: flow(20) } });
    expect(said(settled(winter, cycle).settlement.lines)).toEqual([
      'energy peak 2026-01-22..2026-02-01 10 kWh at 0.30 = 3.00',
      'energy peak 2026-02-01..2026-02-11 10 kWh at 0.30 = 3.00',
    ]);
  });

  test('has no share of the days of that season', () => {
    const cycle = usage({ ...intoSummer, byPeriod: { peak: flow(20), off: flow(80) } });
    expect(said(settled(seasonal(priced), cycle).settlement.lines)).toEqual([
      'energy off 2026-05-22..2026-06-01 40 kWh at 0.10 = 4.00',
      'energy peak 2026-06-01..2026-06-11 20 kWh at 0.30 = 6.00',
      'energy off 2026-06-01..2026-06-11 40 kWh at 0.10 = 4.00',
    ]);
  });

  test('cannot share its tiers with another, and alone has none of the days without it', () => {
    const tiered = priced.flatMap((row) => [1, 2].map((tier) => ({ ...row, tier })));
    const of = seasonal(tiered, [{ from: '2025-01-01', per: 'cycle', limits: ['50'] }]);
    expect(refusal(of, usage({ ...intoSummer, byPeriod: { peak: flow(20), off: flow(80) } }))).toBe(
      'Energy has tiers over periods that do not all have the same days: how they share a tier is not said.',
    );
    expect(said(settled(of, usage({ ...intoSummer, byPeriod: { peak: flow(20) } })).settlement.lines)).toEqual([
      'energy peak tier 1 2026-06-01..2026-06-11 20 kWh at 0.30 = 6.00',
      'energy peak tier 2 2026-06-01..2026-06-11 0 kWh at 0.30 = 0.00',
    ]);
  });
});

describe('tiers', () => {
  const tiers = (from: string, limit: string, season?: string) => ({
    from,
    per: 'cycle',
    limits: [limit],
    ...(season ? { season } : {}),
  });
  const tiered = (rows: object[], rates = [1, 2].map((tier) => ({ from: '2025-01-01', tier, rate: `0.${tier}` }))) =>
    plan({ calendar: { seasons: TWO_SEASONS }, charges: [{ ...ENERGY, rates, tiers: rows }] });
  const shown = (of: ReturnType<typeof plan>, from: string, to: string) =>
    said(settled(of, usage({ from, to, import: 100 })).settlement.lines);

  test('go by the latest limits in force, in whatever order they are written', () => {
    const all = [tiers('2025-01-01', '40'), tiers('2026-03-01', '60'), tiers('2027-03-01', '80')];
    for (const written of [all, all.toReversed()]) {
      const of = tiered(written);
      expect(shown(of, '2026-01-16', '2026-02-15')[0]).toBe('energy tier 1 40 kWh at 0.1 = 4.00');
      expect(shown(of, '2026-03-16', '2026-04-15')[0]).toBe('energy tier 1 60 kWh at 0.1 = 6.00');
    }
  });

  test('of a season come before those of every season of the same day', () => {
    for (const written of [
      [tiers('2025-01-01', '40'), tiers('2025-01-01', '70', 'summer')],
      [tiers('2025-01-01', '70', 'summer'), tiers('2025-01-01', '40')],
    ]) {
      const of = tiered(written);
      expect(shown(of, '2026-07-01', '2026-07-31')[0]).toBe('energy tier 1 70 kWh at 0.1 = 7.00');
      expect(shown(of, '2026-01-01', '2026-01-31')[0]).toBe('energy tier 1 40 kWh at 0.1 = 4.00');
    }
  });

  test('may be there in one season only', () => {
    const of = tiered(
      [tiers('2025-01-01', '70', 'summer')],
      [
        { from: '2025-01-01', tier: 1, rate: '0.1' },
        { from: '2025-01-01', tier: 2, rate: '0.2' },
        { from: '2025-01-01', rate: '0.5' } as { from: string; tier: number; rate: string },
      ],
    );
    expect(shown(of, '2026-07-01', '2026-07-31')).toEqual([
      'energy tier 1 70 kWh at 0.1 = 7.00',
      'energy tier 2 30 kWh at 0.2 = 6.00',
    ]);
    expect(shown(of, '2026-01-01', '2026-01-31')).toEqual(['energy 100 kWh at 0.5 = 50.00']);
  });

  test('hold a misread register below zero in the first tier, each period with its share', () => {
    const of = plan({
      calendar: { periods: PERIODS },
      charges: [
        {
          ...ENERGY,
          rates: rows('0.30', '0.10').flatMap((row) => [1, 2].map((tier) => ({ ...row, tier }))),
          tiers: [tiers('2025-01-01', '50')],
        },
      ],
    });
    const cycle = usage({ import: -30, byPeriod: { peak: flow(-10), off: flow(-20) } });
    expect(said(settled(of, cycle).settlement.lines)).toEqual([
      'energy peak tier 1 -10 kWh at 0.30 = -3.00',
      'energy peak tier 2 0 kWh at 0.30 = 0.00',
      'energy off tier 1 -20 kWh at 0.10 = -2.00',
      'energy off tier 2 0 kWh at 0.10 = 0.00',
    ]);
  });

  test('without a rate yet are refused by name', () => {
    const of = tiered(
      [tiers('2025-01-01', '40')],
      [
        { from: '2025-01-01', tier: 1, rate: '0.1' },
        { from: '2027-01-01', tier: 2, rate: '0.2' },
      ],
    );
    expect(refusal(of, usage({ import: 100 }))).toBe('Energy has no rate in force on 2026-06-16 for tier 2.');
    const early = plan({ charges: [{ ...ENERGY, rates: [{ from: '2027-01-01', rate: '0.1' }] }] });
    expect(refusal(early, usage())).toBe('Energy has no rate in force on 2026-06-16.');
  });
});

const FROM = day('2026-06-16');
const TO = day('2026-07-16');

describe('a credit at the rates of charges', () => {
  const GRID = { ...ENERGY, id: 'grid', label: 'Grid', rates: [{ from: '2026-02-01', rate: '0.05' }] };
  const sent = { id: 'sent', label: 'Sent', kind: 'export', basis: 'export', to: 'bill' };
  const of = (part: object = {}) =>
    plan({
      rateChangeBy: 'readDate',
      charges: [ENERGY, GRID],
      credits: [{ ...sent, ratesOf: { charges: ['grid', 'energy'], ...part } }],
    });

  test('says the version of the latest of them', () => {
    const line = settled(of(), usage({ export: 100 })).settlement.lines.at(-1);
    expect(line).toMatchObject({
      amountCents: -1500,
      rate: '0.15',
      working: { formula: '-roundCents(kWh * sum(rates))' },
    });
    expect(line?.working.inputs.at(-1)).toMatchObject({
      label: 'Grid + Energy',
      value: ['0.05', '0.10'],
      source: { version: '2026-02-01' },
    });
  });

  test('is refused where one of them is not in force yet', () => {
    const later = { ...GRID, basis: 'export', rates: [{ from: '2027-02-01', rate: '0.05' }] };
    const credits = [{ ...sent, ratesOf: { charges: ['energy', 'grid'] } }];
    expect(priceQuantity(plan({ charges: [ENERGY, later], credits }), 'sent', FROM, TO, '1')).toBeNull();
    expect(priceQuantity(plan({ charges: [ENERGY, GRID], credits }), 'sent', FROM, TO, '1')?.rate).toBe('0.15');
  });
});
