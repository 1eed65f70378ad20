import { describe, expect, test } from 'vitest';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { settle } from '#shared/settlement/settle.ts';
import { EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { CUSTOMER, ENERGY, FLAT, type Loose, plan, planInput, refusal, usage } from './plans.ts';

const PERIODS = [
  { id: 'peak', when: [{ days: 'all', from: '16:00', to: '21:00' }] },
  { id: 'off', when: 'rest' },
];
const rowsByPeriod = PERIODS.map(({ id }) => ({ from: '2025-01-01', period: id, rate: '0.1' }));
const KWH = { id: 'kwhBank', label: 'kWh bank', unit: 'kWh', netting: 'none', offsets: ['energy'] };
const USD = { id: 'dollars', label: 'Credit bank', unit: 'USD', offsets: ['energy'] };
const trueUps = (bank: object, ...of: object[]): Loose => ({
  banks: [{ ...bank, trueUps: of.map((part) => ({ at: 'everyCycle', action: 'expire', ...part })) }],
});

/** The whole sentence, so that a rule that says the wrong thing is found too. */
const REFUSED: [string, Loose, string][] = [
  [
    'a kWh bank netted by period where there are no periods',
    { banks: [{ ...KWH, netting: 'period', offsets: [] }] },
    'kWh bank is netted by period, and the calendar has no periods.',
  ],
  [
    'a bank by period without periods',
    { banks: [{ ...KWH, byPeriod: true, offsets: [] }] },
    'kWh bank keeps a balance for each period, which needs periods and netting by them.',
  ],
  [
    'a bank by period under netting over the cycle',
    { calendar: { periods: PERIODS }, banks: [{ ...KWH, netting: 'cycle', byPeriod: true, offsets: [] }] },
    'kWh bank keeps a balance for each period, which needs periods and netting by them.',
  ],
  [
    'a credit netted by period where there are no periods',
    {
      credits: [
        { id: 'sent', label: 'Export', kind: 'export', basis: 'export', netting: 'period', rates: FLAT, to: 'bill' },
      ],
    },
    'Export is netted by period, and the calendar has no periods.',
  ],
  [
    'a true-up priced by period of a bank with one balance',
    {
      calendar: { periods: PERIODS },
      ...trueUps(KWH, { action: 'pay', to: 'bill', rates: rowsByPeriod }),
    },
    'The true-up of kWh bank is priced by period, and the bank keeps one balance.',
  ],
  [
    'an amount to keep that is not in cents',
    trueUps(USD, { keep: { amount: '5.005' } }),
    'What Credit bank keeps must be an amount in dollars and cents.',
  ],
  [
    'two kinds of average use in one bank',
    {
      load: 'metered',
      ...trueUps(KWH, { keep: { averageCycles: 2, usage: 'import' } }, { keep: { averageCycles: 2, usage: 'load' } }),
    },
    'kWh bank can keep by one kind of use only.',
  ],
  [
    'a rate of a tier no row names',
    {
      charges: [
        {
          ...ENERGY,
          rates: [1, 2].map((tier) => ({ from: '2025-01-01', tier, rate: '0.1' })),
          tiers: [{ from: '2025-01-01', per: 'cycle', limits: ['500'] }],
        },
      ],
      credits: [
        {
          id: 'sent',
          label: 'Export',
          kind: 'export',
          basis: 'export',
          ratesOf: { charges: ['energy'], tier: 3 },
          to: 'bill',
        },
      ],
    },
    'Export takes the rate of tier 3 of Energy, which has none.',
  ],
  [
    'a tier without a rate in the one season that has tiers',
    {
      calendar: {
        seasons: [
          { id: 'summer', from: '06-01', to: '09-30' },
          { id: 'winter', from: '10-01', to: '05-31' },
        ],
      },
      charges: [
        {
          ...ENERGY,
          rates: [
            { from: '2025-01-01', season: 'winter', rate: '0.1' },
            { from: '2025-01-01', season: 'summer', tier: 1, rate: '0.1' },
          ],
          tiers: [{ from: '2025-01-01', season: 'summer', per: 'cycle', limits: ['500'] }],
        },
      ],
    },
    'Energy has days without a rate (summer, tier 2).',
  ],
  [
    'a tier that is no whole number',
    { charges: [{ ...ENERGY, rates: [{ from: '2025-01-01', tier: 1.5, rate: '0.1' }] }] },
    'charges energy rates 1 tier: this should be a whole number.',
  ],
  [
    'a tier below the first',
    { charges: [{ ...ENERGY, rates: [{ from: '2025-01-01', tier: 0, rate: '0.1' }] }] },
    'charges energy rates 1 tier: this should be at least 1.',
  ],
  [
    'hours that are neither spans nor the rest',
    { calendar: { periods: [{ id: 'peak', when: 7 }] } },
    'calendar periods peak when: this is none of the forms it may have.',
  ],
  ['a name too long to show', { name: 'x'.repeat(121) }, 'name: this should be at most 120.'],
];

describe('a plan is refused in a whole sentence for', () => {
  test.each(REFUSED)('%s', (_, part, sentence) => {
    const result = parsePlan(planInput(part));
    if (result.ok) throw new Error('it was read');
    expect(result.problem.faults.map((fault) => fault.message)).toContain(sentence);
  });

  test('each thing wrong, and the first of them is the problem’s own words', () => {
    const result = parsePlan(planInput({ timeZone: 'Port Calder', charges: [{ ...ENERGY, rates: [] }] }));
    expect(result).toMatchObject({
      ok: false,
      problem: {
        code: 'plan-invalid',
        detail: 'Port Calder is not the name of a time zone; use one such as America/Denver.',
        faults: [{ field: 'timeZone' }, { field: 'charges.0.rates', message: 'Energy has no rate.' }],
      },
    });
  });

  test('nothing that is no plan: the plan as a whole is named', () => {
    const result = parsePlan(7);
    expect(result.ok ? '' : result.problem.detail).toBe('The plan: this should be a object.');
  });
});

describe('a plan that was not read is not settled either', () => {
  const broken = { ...plan(), timeZone: 'Port Calder' };

  test('and the refusal says why', () => {
    expect(refusal(broken, usage())).toMatch(/^Port Calder is not the name of a time zone/);
  });

  test('and cycles stop at the first that is refused', () => {
    const demand = plan({
      charges: [{ ...CUSTOMER, id: 'demand', label: 'Demand', basis: 'kW', kWOf: 'demand' }],
    });
    const next = usage({ from: '2026-07-16', to: '2026-08-14' });
    const result = settle(demand, EMPTY_OPENING, [usage({ kW: { demand: '4' } }), next, usage()]);
    expect(result).toMatchObject({ ok: false, problem: { detail: 'Demand goes by kW: the demand rating is needed.' } });
  });

  test('a fault of the program itself is not taken for a refusal', () => {
    const cycle = { ...usage(), byPeriod: { peak: null } };
    const odd: unknown = JSON.parse(JSON.stringify(cycle));
    const of = plan({ calendar: { periods: PERIODS }, charges: [{ ...ENERGY, rates: rowsByPeriod }] });
    expect(() => settle(of, EMPTY_OPENING, [odd as typeof cycle as never])).toThrow(TypeError);
  });
});
