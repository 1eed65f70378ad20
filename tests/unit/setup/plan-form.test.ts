import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type RatePlanInput, ratePlanSchema } from '#shared/settlement/plan.ts';
import { day } from '#shared/units/day.ts';
import { emptyPlanForm, type PlanForm, planOf } from '#src/features/setup/plan-form.ts';
import { planFormOf, samePlan } from '#src/features/setup/plan-form-read.ts';

const ZONE = 'America/Denver';

function form(changes: Partial<PlanForm> = {}): PlanForm {
  return {
    ...emptyPlanForm('2024-01-01'),
    prices: [
      {
        from: '2024-01-01',
        energy: '0.1684',
        exported: '0.0950',
        customer: '14.50',
        gross: '0.0061',
        taxPercent: '3.1',
      },
    ],
    hasGross: true,
    hasTax: true,
    ...changes,
  };
}

/** The kWh example of the rate plan's own page: the bank lapses with the April cycle, tax on energy and customer charge. */
const CARRIED: RatePlanInput = {
  timeZone: ZONE,
  netting: 'cycle',
  load: 'none',
  rateChangeBy: 'days',
  seasonBy: 'readDate',
  charges: [
    {
      id: 'energy',
      label: 'Energy',
      kind: 'import',
      basis: 'import',
      rates: [{ from: day('2025-01-01'), rate: '0.1390' }],
    },
    {
      id: 'customer',
      label: 'Customer charge',
      kind: 'fixed',
      basis: 'cycle',
      rates: [{ from: day('2025-01-01'), rate: '11.00' }],
    },
    {
      id: 'tax',
      label: 'Tax',
      kind: 'tax',
      basis: 'percent',
      on: ['energy', 'customer'],
      afterCredits: true,
      rates: [{ from: day('2025-01-01'), rate: '0.05' }],
    },
  ],
  credits: [],
  banks: [
    {
      id: 'kwhBank',
      label: 'kWh bank',
      unit: 'kWh',
      sameCycle: false,
      belowZero: false,
      offsets: ['energy'],
      trueUps: [{ at: { months: [4] }, action: 'expire' }],
    },
  ],
};

describe('a rate plan as plain questions', () => {
  it('says net billing: a credit by the kWh into a bank that pays for energy', () => {
    const plan = planOf(form(), ZONE);
    expect(plan.netting).toBe('none');
    expect(plan.credits[0]).toMatchObject({ kind: 'export', basis: 'export', to: 'creditBank' });
    expect(plan.banks[0]).toMatchObject({ unit: 'USD', sameCycle: true, offsets: ['energy'], trueUps: [] });
  });

  it('takes a percent as an exact fraction', () => {
    expect(planOf(form(), ZONE).charges.find((charge) => charge.id === 'tax')?.rates[0]?.rate).toBe('0.031');
  });

  it('charges on every kWh bought even where kWh sent out are netted off', () => {
    const plan = planOf(form({ exportRule: 'carried' }), ZONE);
    expect(plan.netting).toBe('cycle');
    expect(plan.charges.find((charge) => charge.id === 'gross')?.netting).toBe('none');
    expect(plan.banks[0]?.offsets).toEqual(['energy']);
  });

  it('lets credit that pays for everything stop short of a tax worked out after it', () => {
    expect(planOf(form({ spendOn: 'all' }), ZONE).banks[0]?.offsets).toEqual(['energy', 'customer', 'gross']);
    const before = planOf(form({ spendOn: 'all', taxAfterCredits: false }), ZONE);
    expect(before.banks[0]?.offsets).toEqual(['energy', 'customer', 'gross', 'tax']);
  });

  it('makes no row for a price that stays as before', () => {
    const first = form().prices[0];
    if (!first) throw new Error('a form has a first row');
    const later = { from: '2026-06-01', energy: '0.1812', exported: '', customer: '', gross: '', taxPercent: '' };
    const plan = planOf(form({ prices: [first, later] }), ZONE);
    expect(plan.charges[0]?.rates.map((row) => row.from)).toEqual(['2024-01-01', '2026-06-01']);
    expect(plan.charges[1]?.rates).toHaveLength(1);
  });

  it('pays a leftover kWh bank at its price, and a money bank as it is', () => {
    const paid = planOf(form({ exportRule: 'carried', lapse: 'pay', lapseMonth: '3', payRate: '.04' }), ZONE);
    expect(paid.banks[0]?.trueUps[0]).toMatchObject({ at: { months: [3] }, action: 'pay', rates: [{ rate: '0.04' }] });
    expect(planOf(form({ lapse: 'pay' }), ZONE).banks[0]?.trueUps[0]?.rates).toBeNull();
  });

  it('reads the page’s kWh example and says it back unchanged', () => {
    const plan = ratePlanSchema.parse(CARRIED);
    const read = planFormOf(plan);
    expect(read).toMatchObject({ exportRule: 'carried', lapse: 'expire', lapseMonth: '4', spendWhen: 'next' });
    expect(read && samePlan(planOf(read, ZONE), plan)).toBe(true);
  });

  it.each<[string, Partial<RatePlanInput>]>([
    ['hourly netting', { netting: 'hour', banks: [] }],
    [
      'two taxes',
      {
        charges: [
          ...CARRIED.charges,
          {
            id: 'city',
            label: 'City',
            kind: 'tax',
            basis: 'percent',
            on: ['energy'],
            afterCredits: true,
            rates: [{ from: day('2025-01-01'), rate: '0.01' }],
          },
        ],
      },
    ],
    [
      'a second bank',
      { banks: [...(CARRIED.banks ?? []), { id: 'wires', label: 'Wires', unit: 'kWh', offsets: ['energy'] }] },
    ],
    ['a season', { calendar: { seasons: [{ id: 'summer', from: '06-01', to: '09-30' }] } }],
    ['rounding half to even', { rounding: { money: 'halfEven' } }],
    [
      'a lot that ages',
      { banks: [{ id: 'kwhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'], lotLife: { cycles: 12 } }] },
    ],
  ])('does not claim to say a plan with %s', (_, changes) => {
    expect(planFormOf(ratePlanSchema.parse({ ...CARRIED, ...changes }))).toBeNull();
  });

  it('says back whatever it can say', () => {
    const rate = fc.integer({ min: 1, max: 99_999 }).map((value) => `0.${String(value).padStart(5, '0')}`);
    const percent = fc
      .integer({ min: 1, max: 9_999 })
      .map((value) => `${Math.floor(value / 100)}.${String(value % 100).padStart(2, '0')}`);
    const later = fc.record({
      energy: rate,
      exported: fc.oneof(rate, fc.constant('')),
      customer: fc.constant(''),
      gross: fc.oneof(rate, fc.constant('')),
      taxPercent: fc.oneof(percent, fc.constant('')),
    });
    const forms = fc.record({
      exportRule: fc.constantFrom('priced', 'pricedAfterNetting', 'carried', 'nothing'),
      first: fc.record({ energy: rate, exported: rate, customer: rate, gross: rate, taxPercent: percent }),
      later: fc.array(later, { maxLength: 3 }),
      customerPer: fc.constantFrom('cycle', 'day'),
      hasCustomer: fc.boolean(),
      hasGross: fc.boolean(),
      hasTax: fc.boolean(),
      taxAfterCredits: fc.boolean(),
      taxOnCustomer: fc.boolean(),
      spendOn: fc.constantFrom('energy', 'all'),
      spendWhen: fc.constantFrom('same', 'next'),
      lapse: fc.constantFrom('never', 'expire', 'pay'),
      payTo: fc.constantFrom('bill', 'separate'),
      payRate: rate,
      priceChange: fc.constantFrom('days', 'readDate'),
    } as const);
    fc.assert(
      fc.property(forms, ({ first, later: rows, ...answers }) => {
        const prices = [first, ...rows].map((row, index) => ({ from: `20${24 + index}-01-01`, ...row }));
        const plan = planOf(form({ ...answers, prices }), ZONE);
        const read = planFormOf(plan);
        expect(read).not.toBeNull();
        expect(read && samePlan(planOf(read, ZONE), plan)).toBe(true);
      }),
    );
  });
});
