import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { day } from '#shared/units/day.ts';
import { emptyPlanForm, newBank, newCharge, newCredit, newTrueUp } from '#src/ui/plan-form/new-parts.ts';
import { entryFaults, entryOf, planOfEntry } from '#src/ui/plan-form/plan-entry.ts';
import type { PlanForm } from '#src/ui/plan-form/plan-form.ts';
import { planOf } from '#src/ui/plan-form/plan-of.ts';
import { pricedItems } from '#src/ui/plan-form/price-cells.ts';
import { planFormOf } from '#src/ui/plan-form/read-plan.ts';
import { samePlan } from '#src/ui/plan-form/same-plan.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { intervalPlans, wholeCyclePlans } from '#tests/unit/settlement/arbitrary-plan.ts';

const ZONE = 'America/Chicago';
const netting = fc.constantFrom('none', '15min', 'hour', 'period', 'cycle' as const);
const ownNetting = fc.constantFrom('', 'none', 'hour', 'cycle' as const);
const percent = fc
  .integer({ min: 1, max: 20_000 })
  .map((value) => `${Math.floor(value / 100)}.${String(value % 100).padStart(2, '0')}`);
const by = { bySeason: fc.boolean(), byPeriod: fc.boolean() };
const share = {
  shareOf: fc.constantFrom(['energy'], ['energy', 'delivery']).map((ids): string[] => [...ids]),
  sharePercent: percent,
};

const tiers = fc.array(
  fc.record({
    from: fc.constantFrom('2026-01-01', '2026-07-01'),
    season: fc.constantFrom('', 'summer'),
    per: fc.constantFrom('cycle', 'day' as const),
    limits: fc.constantFrom('500', '500; 1000', '16.5'),
  }),
  { maxLength: 2 },
);

const trueUp = fc
  .record({
    ...by,
    ...share,
    at: fc.constantFrom('months', 'date', 'everyCycle', 'finalBill' as const),
    months: fc.constantFrom(['4'], ['4', '10']).map((months): string[] => [...months]),
    keep: fc.constantFrom('none', 'amount', 'average' as const),
    keepAmount: fc.constant('120.5'),
    action: fc.constantFrom('expire', 'donate', 'pay' as const),
    priced: fc.constantFrom('asItIs', 'own', 'share' as const),
    to: fc.constantFrom('bill', 'separate' as const),
    fee: fc.constantFrom('0', '5.00'),
    atLeast: fc.constantFrom('0', '50'),
  })
  .map((made) => newTrueUp({ ...made, to: made.action === 'pay' ? made.to : '' }));

/** Forms that use every part of the language in any mixture; whether the mixture makes sense is for the plan's own rules. */
const forms: fc.Arbitrary<PlanForm> = fc
  .record({
    netting,
    energy: fc.record({ ...by, tiers, netting: ownNetting }),
    delivery: fc.record({ ...by, netting: ownNetting, solarOnly: fc.boolean(), learned: fc.boolean() }),
    minimum: fc.constantFrom('cycle', 'day' as const),
    kWOf: fc.constantFrom('dc', 'ac', 'demand' as const),
    afterCredits: fc.boolean(),
    credit: fc.record({
      ...by,
      ...share,
      priced: fc.constantFrom('own', 'share' as const),
      basis: fc.constantFrom('export', 'production' as const),
      termFrom: fc.constantFrom('', '2026-01-01'),
      capAmount: fc.constantFrom('', '250.00'),
      capPer: fc.constantFrom('year', 'term' as const),
      to: fc.constantFrom('creditBank', 'bill', 'separate'),
    }),
    bank: fc.record({
      unit: fc.constantFrom('kWh', 'USD' as const),
      netting: ownNetting,
      byPeriod: fc.boolean(),
      sameCycle: fc.boolean(),
      belowZero: fc.boolean(),
      lotCycles: fc.constantFrom('', '12'),
      keepMinimum: fc.constantFrom('', 'minimum'),
      ratio: fc.constantFrom('1', '0.85'),
      trueUps: fc.array(trueUp, { maxLength: 3 }),
    }),
    holidays: fc.constantFrom('', '2026-07-03', '2026-07-03\n2026-09-07'),
    change: fc.constantFrom('days', 'readDate', 'intervals' as const),
    money: fc.constantFrom('halfUp', 'halfEven' as const),
    rates: fc.array(fc.integer({ min: -9_999, max: 99_999 }), { minLength: 3, maxLength: 3 }),
  })
  .map((made) => {
    const form: PlanForm = {
      ...emptyPlanForm('2026-01-01'),
      netting: made.netting,
      seasons: [
        { id: 'summer', name: 'Summer', from: '06-01', to: '09-30' },
        { id: 'winter', name: 'Winter', from: '10-01', to: '05-31' },
      ],
      periods: [
        {
          id: 'peak',
          label: 'On-peak',
          rest: false,
          hours: [{ season: 'summer', days: 'weekday', from: '16:00', to: '21:00' }],
        },
        { id: 'off', label: 'Off-peak', rest: true, hours: [] },
      ],
      holidays: made.holidays,
      charges: [
        newCharge('energy', 'Energy', 'import', 'import', made.energy),
        newCharge('delivery', 'Delivery', 'import', 'import', made.delivery),
        newCharge('grid', 'Grid access', 'demand', 'kW', { kWOf: made.kWOf }),
        newCharge('tax', 'Tax', 'tax', 'percent', { on: ['energy', 'delivery'], afterCredits: made.afterCredits }),
        newCharge('minimum', 'Minimum bill', 'minimum', 'floor', { on: ['energy'], per: made.minimum }),
      ],
      credits: [
        newCredit('exportCredit', 'Credit', made.credit.to, {
          ...made.credit,
          termTo: made.credit.termFrom === '' ? '' : '2035-12-31',
        }),
      ],
      banks: [newBank('creditBank', 'Credit bank', made.bank.unit, made.bank)],
      rateChangeBy: made.change,
      seasonBy: made.change,
      rounding: { money: made.money, limits: 'whole', kWh: 'exact' },
    };
    const [first = 0, ...later] = made.rates;
    const keys = pricedItems(form).flatMap((item) => item.cells.map((cell) => cell.key));
    const price = (value: number) => `${value < 0 ? '-' : ''}0.${String(Math.abs(value)).padStart(5, '0')}`;
    return {
      ...form,
      prices: [
        { from: '2026-01-01', cells: Object.fromEntries(keys.map((key, at) => [key, price(first + at)])) },
        ...later.map((value, at) => ({
          from: `2026-0${at + 4}-01`,
          // Every other price changes; the rest stay as before.
          cells: Object.fromEntries(keys.filter((_, place) => place % 2 === at).map((key) => [key, price(value)])),
        })),
      ],
    };
  });

describe('whatever the form can say', () => {
  it('a plan made by it is read back into questions that make the same plan', () => {
    fc.assert(
      fc.property(forms, (form) => {
        const plan = planOf(form, ZONE);
        const read = planFormOf(plan);
        expect(read).not.toBeNull();
        expect(read && samePlan(planOf(read, ZONE), plan)).toBe(true);
      }),
      { numRuns: PROPERTY_RUNS },
    );
  }, 120_000);
});

describe('whatever the language can say', () => {
  it('a plan opened in the form and saved is the same plan, and most are opened as questions', () => {
    let asked = 0;
    const seen = (plan: RatePlan) => {
      const entry = entryOf({ from: day('2026-01-01'), plan, withoutRoof: null });
      if (entry.written === 'questions') asked += 1;
      expect(entryFaults(entry)).toEqual([]);
      const saved = planOfEntry(entry, plan.timeZone);
      expect(samePlan(saved.plan, plan)).toBe(true);
      expect(saved.withoutRoof).toBeNull();
    };
    fc.assert(fc.property(fc.oneof(wholeCyclePlans, intervalPlans), seen), { numRuns: PROPERTY_RUNS });
    expect(asked).toBeGreaterThan(PROPERTY_RUNS / 2);
  }, 120_000);
});
