import { describe, expect, test } from 'vitest';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { CUSTOMER, ENERGY, FLAT, type Loose, planInput, TWO_SEASONS } from './plans.ts';

const KWH = { id: 'kwhBank', label: 'kWh bank', unit: 'kWh', netting: 'none', offsets: ['energy'] };
const USD = { id: 'dollars', label: 'Credit bank', unit: 'USD', offsets: ['energy'] };
const SENT = { id: 'sent', label: 'Export credit', kind: 'export', basis: 'export', rates: FLAT, to: 'bill' };
const FLOOR = {
  id: 'least',
  label: 'Minimum',
  kind: 'minimum',
  basis: 'floor',
  per: 'cycle',
  on: ['energy'],
  rates: FLAT,
};
const TAX = { id: 'tax', label: 'Tax', kind: 'tax', basis: 'percent', on: ['energy'], rates: FLAT };
const PERIODS = [
  { id: 'peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] },
  { id: 'off', when: 'rest' },
];
const byPeriod = { ...ENERGY, rates: PERIODS.map(({ id }) => ({ from: '2025-01-01', period: id, rate: '0.1' })) };
const charges = (...items: unknown[]): Loose => ({ charges: items });
const banks = (...items: unknown[]): Loose => ({ banks: items });
const credits = (...items: unknown[]): Loose => ({ credits: items });
const energy = (part: object): Loose => charges({ ...ENERGY, ...part });
const trueUp = (unit: object, part: object): Loose =>
  banks({ ...unit, trueUps: [{ at: 'everyCycle', action: 'pay', to: 'bill', ...part }] });

/** Each plan that must be refused, and words of the sentence that says why. */
const REFUSED: [string, Loose, RegExp][] = [
  ['the same id twice', charges(ENERGY, { ...CUSTOMER, id: 'energy' }), /id energy is used twice/],
  ['a credit with a charge’s id', credits({ ...SENT, id: 'energy' }), /id energy is used twice/],
  ['the same season twice', { calendar: { seasons: [TWO_SEASONS[0], TWO_SEASONS[0]] } }, /id summer is used twice/],
  ['a reserved id', charges({ ...ENERGY, id: 'bill' }), /reserved/],
  ['an id that is not camelCase', charges({ ...ENERGY, id: 'My charge' }), /camelCase/],
  ['a time zone that is none', { timeZone: 'Port Calder' }, /time zone/],
  [
    'a rate that is no number',
    energy({ rates: [{ from: '2025-01-01', rate: 'ten cents' }] }),
    /charges energy rates 1 rate: Use a plain number/,
  ],
  ['a day that does not exist', energy({ rates: [{ from: '2025-02-30', rate: '1' }] }), /from/],
  ['a netting that is none', { netting: 'week' }, /netting: this should be one of none, 15min, hour, period, cycle/],
  ['a missing list of charges', { charges: undefined }, /charges: this should be a/],
  ['no rates', energy({ rates: [] }), /has no rate/],
  [
    'a season the calendar lacks',
    energy({ rates: [{ from: '2025-01-01', season: 'spring', rate: '1' }] }),
    /names the season spring/,
  ],
  [
    'a period the calendar lacks',
    energy({ rates: [{ from: '2025-01-01', period: 'peak', rate: '1' }] }),
    /names the period peak/,
  ],
  [
    'a season of a period that the calendar lacks',
    { calendar: { periods: [{ id: 'peak', when: [{ season: 'spring', days: 'all', from: '01:00', to: '02:00' }] }] } },
    /names the season spring/,
  ],
  [
    'hours that run backward',
    { calendar: { periods: [{ id: 'night', when: [{ days: 'all', from: '21:00', to: '06:00' }] }] } },
    /must run forward/,
  ],
  [
    'a season without a rate',
    { ...energy({ rates: [{ from: '2025-01-01', season: 'summer', rate: '1' }] }), calendar: { seasons: TWO_SEASONS } },
    /days without a rate \(winter\)/,
  ],
  [
    'days outside every season without a rate',
    {
      ...energy({ rates: [{ from: '2025-01-01', season: 'summer', rate: '1' }] }),
      calendar: { seasons: [TWO_SEASONS[0]] },
    },
    /days without a rate/,
  ],
  [
    'a period without a rate',
    { ...energy({ rates: [{ from: '2025-01-01', period: 'peak', rate: '1' }] }), calendar: { periods: PERIODS } },
    /days without a rate \(off\)/,
  ],
  [
    'a tier without a rate',
    energy({
      tiers: [{ from: '2025-01-01', per: 'day', limits: ['16'] }],
      rates: [{ from: '2025-01-01', tier: 1, rate: '1' }],
    }),
    /days without a rate \(tier 2\)/,
  ],
  [
    'a rate for a tier that is not there',
    energy({ rates: [{ from: '2025-01-01', tier: 1, rate: '1' }] }),
    /no such tier/,
  ],
  [
    'limits that do not rise',
    energy({ tiers: [{ from: '2025-01-01', per: 'day', limits: ['16', '16'] }] }),
    /must rise/,
  ],
  [
    'tiers of a fixed charge',
    charges({ ...CUSTOMER, tiers: [{ from: '2025-01-01', per: 'day', limits: ['16'] }] }),
    /cannot have tiers/,
  ],
  [
    'a fixed charge by period',
    {
      ...charges({ ...CUSTOMER, rates: [{ from: '2025-01-01', period: 'peak', rate: '1' }, ...FLAT] }),
      calendar: { periods: PERIODS },
    },
    /by period or tier/,
  ],
  [
    'a price by period under netting cycle',
    { ...charges(byPeriod), netting: 'cycle', calendar: { periods: PERIODS } },
    /priced by period, which netting over the whole cycle/,
  ],
  [
    'a credit by period under netting cycle',
    {
      ...charges(byPeriod),
      calendar: { periods: PERIODS },
      credits: [{ ...SENT, netting: 'cycle', rates: null, ratesOf: { charges: ['energy'] } }],
    },
    /Export credit is priced by period/,
  ],
  ['netting by period without periods', energy({ netting: 'period' }), /the calendar has no periods/],
  ['a charge on use where the plan has no load', energy({ basis: 'load' }), /load is none/],
  ['kW without saying of what', charges({ ...CUSTOMER, basis: 'kW' }), /dc, ac or demand/],
  ['a floor without per', charges(ENERGY, { ...FLOOR, per: null }), /per cycle or per day/],
  ['a percent on nothing', charges(ENERGY, { ...TAX, on: [] }), /on which lines/],
  ['a percent on an unknown id', charges(ENERGY, { ...TAX, on: ['fuel'] }), /fuel, which is no charge/],
  ['a percent on a later line', charges({ ...TAX }, ENERGY), /comes only after it/],
  ['a percent on itself', charges(ENERGY, { ...TAX, on: ['tax'] }), /comes only after it/],
  ['a percent before credits on a floor', charges(ENERGY, FLOOR, { ...TAX, on: ['least'] }), /comes only after it/],
  ['a credit to an unknown bank', credits({ ...SENT, to: 'nowhere' }), /no bank of the plan/],
  ['a credit to a kWh bank', { ...credits({ ...SENT, to: 'kwhBank' }), ...banks(KWH) }, /cannot go to kWh bank/],
  ['a credit without a price', credits({ ...SENT, rates: null }), /either rates or ratesOf/],
  ['a credit with two prices', credits({ ...SENT, ratesOf: { charges: ['energy'] } }), /either rates or ratesOf/],
  [
    'a rate of an unknown charge',
    credits({ ...SENT, rates: null, ratesOf: { charges: ['fuel'] } }),
    /fuel, which is no charge/,
  ],
  [
    'a rate of a fixed charge',
    { ...charges(ENERGY, CUSTOMER), ...credits({ ...SENT, rates: null, ratesOf: { charges: ['customer'] } }) },
    /not charged by the kWh/,
  ],
  ['a rate of no charge', credits({ ...SENT, rates: null, ratesOf: { charges: [] } }), /must name the charges/],
  [
    'a term that ends before it begins',
    credits({ ...SENT, term: { firstDay: '2026-01-02', lastDay: '2026-01-01' } }),
    /ends before it begins/,
  ],
  ['a cap that is no amount', credits({ ...SENT, cap: { amount: '1.005', per: 'year' } }), /dollars and cents/],
  ['a bank that pays an unknown charge', banks({ ...USD, offsets: ['fuel'] }), /fuel, which is no charge/],
  [
    'a USD bank that pays a floor',
    { ...charges(ENERGY, FLOOR), ...banks({ ...USD, offsets: ['least'] }) },
    /only after credits/,
  ],
  [
    'a USD bank that pays a percent after credits',
    { ...charges(ENERGY, { ...TAX, afterCredits: true }), ...banks({ ...USD, offsets: ['tax'] }) },
    /only after credits/,
  ],
  [
    'a USD bank by period',
    { ...banks({ ...USD, byPeriod: true }), calendar: { periods: PERIODS } },
    /keeps one balance/,
  ],
  [
    'a kWh bank that pays a fixed charge',
    { ...charges(ENERGY, CUSTOMER), ...banks({ ...KWH, offsets: ['customer'] }) },
    /can lower import only/,
  ],
  ['a kWh bank of another netting than its charge', banks({ ...KWH, netting: 'cycle' }), /same netting/],
  [
    'a kWh bank with one balance for a charge by period',
    { ...charges(byPeriod), calendar: { periods: PERIODS }, ...banks(KWH) },
    /both go by period, or neither/,
  ],
  [
    'a kWh bank by period for a charge without',
    { calendar: { periods: PERIODS }, ...banks({ ...KWH, byPeriod: true }) },
    /both go by period, or neither/,
  ],
  ['lots below zero', banks({ ...KWH, belowZero: true, lotLife: { cycles: 3 } }), /cannot be kept in lots/],
  ['a ratio below zero', banks({ ...KWH, ratio: '-1' }), /cannot be below zero/],
  ['a minimum kept that is no floor', banks({ ...USD, keepMinimum: 'energy' }), /must keep a floor/],
  ['a true-up that pays nowhere', trueUp(USD, { to: null }), /must say where to/],
  ['a true-up that pays kWh without a price', trueUp(KWH, {}), /needs either rates or ratesOf/],
  ['a true-up fee that is no amount', trueUp(USD, { fee: '0.005' }), /dollars and cents/],
  ['kWh kept in a USD bank', trueUp(USD, { keep: { averageCycles: 4, usage: 'import' } }), /cannot keep kWh/],
  [
    'a true-up by the use of the house where the plan has no load',
    trueUp(KWH, { rates: FLAT, keep: { averageCycles: 4, usage: 'load' } }),
    /load is none/,
  ],
];

describe('a plan is refused, in words, for', () => {
  test.each(REFUSED)('%s', (_, part, words) => {
    const result = parsePlan(planInput(part));
    if (result.ok) throw new Error('it was read');
    expect(result.problem.code).toBe('plan-invalid');
    expect(result.problem.detail).toMatch(words);
    expect(result.problem.faults[0]?.message).toBe(result.problem.detail);
    expect(result.problem.faults[0]?.field).not.toBe('');
  });

  test('what is no plan at all', () => {
    for (const input of [null, 7, 'a plan', [], {}]) expect(parsePlan(input).ok).toBe(false);
  });
});

describe('a plan is read', () => {
  test('with its defaults filled in', () => {
    const result = parsePlan(planInput(banks(KWH)));
    if (!result.ok) throw new Error(result.problem.detail ?? '');
    expect(result.value).toMatchObject({
      name: '',
      load: 'none',
      rateChangeBy: 'days',
      seasonBy: 'readDate',
      calendar: { seasons: [], periods: [], holidays: null },
      credits: [],
      rounding: { money: 'halfUp', limits: 'whole', kWh: 'exact' },
      charges: [{ tiers: [], netting: null, on: [], afterCredits: false, solarOnly: false }],
      banks: [
        {
          ratio: '1',
          byPeriod: false,
          sameCycle: false,
          belowZero: false,
          lotLife: null,
          keepMinimum: null,
          trueUps: [],
        },
      ],
    });
  });

  test('and reading what was read gives the same', () => {
    const once = parsePlan(
      planInput({ ...credits(SENT), ...banks(USD), calendar: { seasons: TWO_SEASONS, periods: PERIODS } }),
    );
    if (!once.ok) throw new Error(once.problem.detail ?? '');
    expect(parsePlan(once.value)).toEqual(once);
  });

  test('with a count written as text', () => {
    const keep = { averageCycles: '4', usage: 'import' };
    const result = parsePlan(planInput(banks({ ...KWH, trueUps: [{ at: { months: [9] }, action: 'expire', keep }] })));
    expect(result.ok && result.value.banks[0]?.trueUps[0]?.keep).toEqual({ averageCycles: 4, usage: 'import' });
  });
});
