import fc from 'fast-check';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { arbitraryBanks } from './arbitrary-banks.ts';
import { type By, PERIODS, PLAIN, rows } from './arbitrary-rows.ts';
import { type Loose, plan, TWO_SEASONS } from './plans.ts';

const NETTINGS = ['none', '15min', 'hour', 'period', 'cycle'] as const;

/** What a drawn plan is made of. `steps`: it is settled on interval data. */
export type Shape = {
  steps: boolean;
  netting: (typeof NETTINGS)[number];
  byPeriod: boolean;
  seasonal: boolean;
  tiers: number;
  per: 'cycle' | 'day';
  form: 'kWh' | 'twoKWh' | 'USD' | 'twoUSD' | 'ledger' | 'buyAll' | 'none';
  sameCycle: boolean;
  lots: boolean;
  keepMinimum: boolean;
  trueUp: 'none' | 'expire' | 'donate' | 'payBill' | 'paySeparate';
  at: 'months' | 'date' | 'everyCycle' | 'finalBill';
  keep: 'none' | 'amount' | 'import' | 'load' | 'net';
  ratio: string;
};

const shape = fc
  .record({
    steps: fc.integer({ min: 0, max: 5 }).map((value) => value === 0),
    netting: fc.constantFrom(...NETTINGS),
    byPeriod: fc.boolean(),
    seasonal: fc.boolean(),
    tiers: fc.constantFrom(0, 0, 2, 3),
    per: fc.constantFrom('cycle', 'day'),
    form: fc.constantFrom('kWh', 'twoKWh', 'USD', 'twoUSD', 'ledger', 'buyAll', 'none'),
    sameCycle: fc.boolean(),
    lots: fc.boolean(),
    keepMinimum: fc.boolean(),
    trueUp: fc.constantFrom('none', 'expire', 'donate', 'payBill', 'paySeparate'),
    at: fc.constantFrom('months', 'date', 'everyCycle', 'finalBill'),
    keep: fc.constantFrom('none', 'amount', 'import', 'load', 'net'),
    ratio: fc.constantFrom('1', '0.6', '0.123456789'),
  })
  .map((drawn): Shape => {
    const netting = drawn.steps && drawn.netting === 'period' ? 'hour' : drawn.netting;
    const byPeriod = drawn.byPeriod && netting !== 'cycle';
    // How periods with days of their own share a tier is not said, and refused.
    return { ...drawn, netting, byPeriod, tiers: drawn.steps && byPeriod ? 0 : drawn.tiers };
  });

const extras = (is: Shape) => {
  const by = is.steps && is.netting !== 'cycle' ? ['days', 'readDate', 'intervals'] : ['days', 'readDate'];
  return fc.record({
    rateChangeBy: fc.constantFrom(...by),
    seasonBy: fc.constantFrom(...by),
    money: fc.constantFrom('halfUp', 'halfEven'),
    limits: fc.constantFrom('whole', 'exact'),
    kWh: fc.constantFrom('exact', 'whole'),
    fraction: fc.constantFrom('1', '0.75', null),
    kWOf: fc.constantFrom('dc', 'ac', 'demand'),
    incentive: fc.constantFrom('none', 'bill', 'separate', 'negative'),
    term: fc.constantFrom(null, { firstDay: '2026-01-20', lastDay: '2026-04-11' }),
    cap: fc.constantFrom(null, { amount: '40.00', per: 'year' }, { amount: '90.50', per: 'term' }),
  });
};

const prices = (energyBy: By, creditBy: By) =>
  fc.record({
    energy: rows(1, energyBy),
    delivery: rows(1),
    gross: rows(1),
    fixed: rows(20),
    tax: rows(0.2),
    credit: rows(1, creditBy),
    incentive: rows(1, PLAIN),
    negative: rows(0, PLAIN, -1),
    payment: rows(1),
  });

/** Plans of every form the language has, each of which can be settled; by construction, so that none has to be thrown away. */
export const shapedPlans: fc.Arbitrary<{ is: Shape; plan: RatePlan }> = plansOf(shape);

/** Plans that a household without interval data can be settled on. */
export const wholeCyclePlans: fc.Arbitrary<RatePlan> = plansOf(
  shape.map((is) => ({ ...is, steps: false, byPeriod: false, netting: is.netting === 'cycle' ? 'cycle' : 'none' })),
).map(({ plan: made }) => made);

/** Plans settled on totals, on periods and on what is left after netting in clock blocks, without interval data. */
export const statedPlans: fc.Arbitrary<RatePlan> = plansOf(
  shape.map((is) => ({ ...is, steps: false, byPeriod: is.byPeriod && is.netting !== 'cycle' })),
).map(({ plan: made }) => made);

/** Plans that take interval data: netted by clock blocks or by period, or priced by period. */
export const intervalPlans: fc.Arbitrary<RatePlan> = plansOf(
  shape.map((is) => ({
    ...is,
    steps: true,
    byPeriod: is.netting !== 'cycle',
    netting: is.netting === 'cycle' ? 'hour' : is.netting,
    tiers: 0,
  })),
).map(({ plan: made }) => made);

function plansOf(shapes: fc.Arbitrary<Shape>): fc.Arbitrary<{ is: Shape; plan: RatePlan }> {
  return shapes.chain((is) =>
    fc
      .record({
        more: extras(is),
        priced: prices(
          { season: is.seasonal, period: is.byPeriod, tiers: is.tiers },
          { season: is.seasonal, period: is.byPeriod && is.form !== 'buyAll', tiers: 0 },
        ),
      })
      .map(({ more, priced }) => ({ is, plan: planOf(is, more, priced) })),
  );
}

type Drawn<T> = T extends fc.Arbitrary<infer Value> ? Value : never;

function planOf(is: Shape, more: Drawn<ReturnType<typeof extras>>, priced: Drawn<ReturnType<typeof prices>>): RatePlan {
  const banks = arbitraryBanks(is, priced.payment);
  const to = is.form === 'USD' || is.form === 'twoUSD' || is.form === 'ledger' ? 'bank' : 'bill';
  const price =
    more.fraction === null || is.form === 'buyAll'
      ? { rates: priced.credit }
      : { ratesOf: { charges: ['energy'], fraction: more.fraction } };
  const basis = is.form === 'buyAll' ? 'production' : 'export';
  const sent = { id: 'sent', label: 'Sent', kind: 'export', basis, to, ...price };
  const incentive = {
    id: 'incentive',
    label: 'Incentive',
    kind: 'incentive',
    basis: 'production',
    term: more.term,
    cap: more.incentive === 'negative' ? null : more.cap,
    rates: more.incentive === 'negative' ? priced.negative : priced.incentive,
    to: more.incentive === 'separate' ? 'separate' : 'bill',
  };
  const input: Loose = {
    netting: is.netting,
    load: 'computed',
    calendar: {
      seasons: TWO_SEASONS,
      periods: PERIODS,
      holidays: { dates: ['2026-01-01', '2026-05-25'], as: 'weekend' },
    },
    rateChangeBy: more.rateChangeBy,
    seasonBy: more.seasonBy,
    rounding: { money: more.money, limits: more.limits, kWh: more.kWh },
    charges: charges(is, more.kWOf, priced),
    credits: [
      ...(is.form === 'kWh' || is.form === 'twoKWh' ? [] : [sent]),
      ...(is.form === 'twoUSD' ? [{ ...sent, id: 'sentToo', label: 'Sent too', to: 'second' }] : []),
      ...(more.incentive === 'none' ? [] : [incentive]),
    ],
    banks,
  };
  return plan(input);
}

function charges(is: Shape, kWOf: string, priced: Drawn<ReturnType<typeof prices>>): object[] {
  const limits = Array.from({ length: is.tiers - 1 }, (_, at) => String((is.per === 'day' ? 7.3 : 211) * (at + 1)));
  const tiers = is.tiers === 0 ? [] : [{ from: '2025-01-01', per: is.per, limits }];
  const basis = is.form === 'buyAll' && !is.byPeriod ? 'load' : 'import';
  const fixed = { kind: 'fixed', rates: priced.fixed };
  const tax = { kind: 'tax', basis: 'percent', rates: priced.tax };
  return [
    { id: 'energy', label: 'Energy', kind: 'import', basis, rates: priced.energy, tiers },
    { id: 'delivery', label: 'Delivery', kind: 'import', basis: 'import', rates: priced.delivery },
    { id: 'gross', label: 'Gross', kind: 'nonbypassable', basis: 'import', netting: 'none', rates: priced.gross },
    { id: 'customer', label: 'Customer', basis: 'cycle', ...fixed },
    { id: 'daily', label: 'Daily', kind: 'minimum', basis: 'day', rates: priced.gross },
    { id: 'access', label: 'Grid access', kind: 'demand', basis: 'kW', kWOf, rates: priced.gross },
    { id: 'before', label: 'Tax before', on: ['energy', 'customer'], ...tax },
    {
      id: 'least',
      label: 'Minimum',
      kind: 'minimum',
      basis: 'floor',
      per: is.per,
      on: ['energy', 'customer'],
      rates: priced.fixed,
    },
    { id: 'tax', label: 'Tax', on: ['energy', 'least'], afterCredits: true, ...tax },
  ];
}
