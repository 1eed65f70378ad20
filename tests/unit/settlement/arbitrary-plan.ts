import fc from 'fast-check';
import type { RatePlan } from '#shared/settlement/plan.ts';
import type { CycleUsage } from '#shared/settlement/settlement.ts';
import { addDays, type Day, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { type Loose, plan, TWO_SEASONS } from './plans.ts';

const PERIODS = [
  { id: 'peak', label: 'Peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] },
  { id: 'off', label: 'Off-peak', when: 'rest' },
];
const rate = (most: number, scale = 5) =>
  fc.integer({ min: 0, max: most * 10 ** scale }).map((value) => (value / 10 ** scale).toFixed(scale));
/** Days on which prices may change: some fall inside the cycles below. */
const CHANGE_DAYS = ['2026-01-10', '2026-02-01', '2026-06-01', '2026-06-20', '2026-07-04'];

/** Rows with one price from 2025 on and up to two changes, for each of the names an item is priced by. */
function rows(most: number, by: { season: boolean; period: boolean; tiers: number }): fc.Arbitrary<object[]> {
  const seasons = by.season ? TWO_SEASONS.map(({ id }) => ({ season: id })) : [{}];
  const periods = by.period ? PERIODS.map(({ id }) => ({ period: id })) : [{}];
  const tiers = by.tiers > 0 ? Array.from({ length: by.tiers }, (_, at) => ({ tier: at + 1 })) : [{}];
  const keys = seasons.flatMap((season) =>
    periods.flatMap((period) => tiers.map((tier) => ({ ...season, ...period, ...tier }))),
  );
  return fc
    .subarray(CHANGE_DAYS, { maxLength: 2 })
    .chain((days) =>
      fc.tuple(
        ...['2025-01-01', ...days].flatMap((from) =>
          keys.map((key) => rate(most).map((price) => ({ from, ...key, rate: price }))),
        ),
      ),
    );
}

const shape = fc.record({
  netting: fc.constantFrom('none', 'period', 'cycle'),
  wantsPeriods: fc.boolean(),
  seasonal: fc.boolean(),
  tiers: fc.constantFrom(0, 0, 2, 3),
  perTier: fc.constantFrom('cycle', 'day'),
  rateChangeBy: fc.constantFrom('days', 'readDate'),
  seasonBy: fc.constantFrom('days', 'readDate'),
  money: fc.constantFrom('halfUp', 'halfEven'),
  limits: fc.constantFrom('whole', 'exact'),
  kWh: fc.constantFrom('exact', 'whole'),
  form: fc.constantFrom('kWh', 'USD', 'ledger', 'none'),
  sameCycle: fc.boolean(),
  lots: fc.boolean(),
  keepMinimum: fc.boolean(),
  trueUp: fc.constantFrom('none', 'expire', 'pay'),
  ratio: fc.constantFrom('1', '0.6', '0.123456789'),
  fraction: fc.constantFrom('1', '0.75', null),
});

/** Plans of many forms, each of which can be settled; by construction, so that none has to be thrown away. */
export const plans: fc.Arbitrary<RatePlan> = shape.chain((is) => {
  const byPeriod = is.wantsPeriods && is.netting !== 'cycle';
  const energyRows = rows(1, { season: is.seasonal, period: byPeriod, tiers: is.tiers });
  const tiers =
    is.tiers === 0
      ? []
      : [
          {
            from: '2025-01-01',
            per: is.perTier,
            limits: Array.from({ length: is.tiers - 1 }, (_, at) =>
              String(is.perTier === 'day' ? 7.3 * (at + 1) : 211 * (at + 1)),
            ),
          },
        ];
  return fc
    .record({
      energy: energyRows,
      gross: rows(1, { season: false, period: false, tiers: 0 }),
      fixed: rows(20, { season: false, period: false, tiers: 0 }),
      tax: rows(0.2, { season: false, period: false, tiers: 0 }),
      credit: rows(1, { season: is.seasonal, period: byPeriod, tiers: 0 }),
    })
    .map((priced) => {
      const at = { months: [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12] };
      const pays = is.trueUp === 'pay' ? { action: 'pay', to: 'bill', fee: '2.50' } : { action: 'expire' };
      const trueUps =
        is.trueUp === 'none'
          ? []
          : [
              {
                at: is.keepMinimum ? 'everyCycle' : at,
                keep: is.form === 'kWh' ? { amount: '40' } : null,
                ...pays,
                ...(is.trueUp === 'pay' && is.form === 'kWh' ? { rates: priced.gross } : {}),
              },
            ];
      const lotLife = is.lots && is.form !== 'ledger' ? { cycles: 2 } : null;
      const common = { label: 'Bank', sameCycle: is.sameCycle, trueUps, lotLife };
      const kWhBank = { id: 'bank', unit: 'kWh', offsets: ['energy'], byPeriod, ratio: is.ratio, ...common };
      const usdBank = {
        id: 'bank',
        unit: 'USD',
        offsets: ['energy', 'gross'],
        belowZero: is.form === 'ledger',
        keepMinimum: is.keepMinimum && is.form === 'USD' ? 'least' : null,
        ...common,
      };
      const to = is.form === 'USD' || is.form === 'ledger' ? 'bank' : 'bill';
      const price =
        is.fraction === null || is.form === 'kWh'
          ? { rates: priced.credit }
          : { ratesOf: { charges: ['energy'], fraction: is.fraction } };
      const input: Loose = {
        netting: is.netting,
        calendar: { seasons: TWO_SEASONS, periods: PERIODS },
        rateChangeBy: is.rateChangeBy,
        seasonBy: is.seasonBy,
        rounding: { money: is.money, limits: is.limits, kWh: is.kWh },
        charges: [
          { id: 'energy', label: 'Energy', kind: 'import', basis: 'import', rates: priced.energy, tiers },
          { id: 'gross', label: 'Gross', kind: 'nonbypassable', basis: 'import', netting: 'none', rates: priced.gross },
          { id: 'customer', label: 'Customer', kind: 'fixed', basis: 'cycle', rates: priced.fixed },
          { id: 'daily', label: 'Daily', kind: 'minimum', basis: 'day', rates: priced.gross },
          {
            id: 'before',
            label: 'Tax before',
            kind: 'tax',
            basis: 'percent',
            on: ['energy', 'customer'],
            rates: priced.tax,
          },
          {
            id: 'least',
            label: 'Minimum',
            kind: 'minimum',
            basis: 'floor',
            per: is.perTier,
            on: ['energy', 'customer'],
            rates: priced.fixed,
          },
          {
            id: 'tax',
            label: 'Tax',
            kind: 'tax',
            basis: 'percent',
            on: ['energy', 'least'],
            afterCredits: true,
            rates: priced.tax,
          },
        ],
        credits:
          is.form === 'kWh' ? [] : [{ id: 'sent', label: 'Sent', kind: 'export', basis: 'export', to, ...price }],
        banks: is.form === 'none' ? [] : [is.form === 'kWh' ? kWhBank : usdBank],
      };
      return plan(input);
    });
});

/** Import and export by period, in Wh, and their totals. */
const energies = fc.record({
  peak: fc.record({ importWh: fc.nat(300_000), exportWh: fc.nat(300_000) }),
  off: fc.record({ importWh: fc.nat(600_000), exportWh: fc.nat(600_000) }),
});

/** Six cycles that chain, over changes of price, season and year. */
export const usages: fc.Arbitrary<CycleUsage[]> = fc
  .array(fc.tuple(fc.integer({ min: 1, max: 65 }), energies), { minLength: 2, maxLength: 6 })
  .map((cycles) => {
    let from: Day = day('2025-12-16');
    return cycles.map(([days, { peak, off }]): CycleUsage => {
      const to = addDays(from, days);
      const flow = (of: typeof peak) => ({ importWh: wh(of.importWh), exportWh: wh(of.exportWh) });
      const cycle: CycleUsage = {
        from,
        to,
        importWh: wh(peak.importWh + off.importWh),
        exportWh: wh(peak.exportWh + off.exportWh),
        productionWh: wh(peak.exportWh + off.exportWh),
        loadWh: null,
        byPeriod: { peak: flow(peak), off: flow(off) },
        netted: {},
        kW: { dc: '7.2' },
        payments: [],
        finalBill: false,
        intervals: null,
      };
      from = to;
      return cycle;
    });
  });
