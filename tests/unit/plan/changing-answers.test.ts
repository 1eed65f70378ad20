import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { withPricesCarried } from '#src/ui/plan-form/carry-prices.ts';
import { withCharge } from '#src/ui/plan-form/change-charges.ts';
import { exportRuleOf, withExportRule } from '#src/ui/plan-form/export-rule.ts';
import { minimumTaxOf, taxesOn, withMinimumTax } from '#src/ui/plan-form/minimum-tax.ts';
import { emptyPlanForm, newBank, newCharge, newCredit } from '#src/ui/plan-form/new-parts.ts';
import type { ChargeForm, PlanForm } from '#src/ui/plan-form/plan-form.ts';
import { planOf } from '#src/ui/plan-form/plan-of.ts';
import { cellKey, pricedItems } from '#src/ui/plan-form/price-cells.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';

const ZONE = 'America/Denver';
const FROM = '2026-01-01';
const SEASONS = [
  { id: 'summer', name: 'Summer', from: '06-01', to: '09-30' },
  { id: 'winter', name: 'Winter', from: '10-01', to: '05-31' },
];
const PERIODS: PlanForm['periods'] = [
  { id: 'peak', label: 'On-peak', rest: false, hours: [{ season: '', days: 'weekday', from: '16:00', to: '21:00' }] },
  { id: 'off', label: 'Off-peak', rest: true, hours: [] },
];

/** A form whose energy has the prices typed, by cell, and whose other prices are filled in. */
function priced(cells: Record<string, string>): PlanForm {
  const form = emptyPlanForm(FROM);
  const others = { [cellKey('customer', '', '', null)]: '11', [cellKey('exportCredit', '', '', null)]: '0.06' };
  return { ...form, seasons: SEASONS, periods: PERIODS, prices: [{ from: FROM, cells: { ...others, ...cells } }] };
}

/** The form with the energy charge changed, as the screen changes it. */
function energy(form: PlanForm, changes: Partial<ChargeForm>): PlanForm {
  const charges = form.charges.map((charge) => (charge.id === 'energy' ? { ...charge, ...changes } : charge));
  return withPricesCarried(form, { ...form, charges });
}

/** Energy's prices as asked for, by what their fields say. */
function asked(form: PlanForm, row = 0): Record<string, string> {
  const cells = pricedItems(form).find(({ key }) => key === 'energy')?.cells ?? [];
  return Object.fromEntries(cells.map(({ key, label }) => [label, form.prices[row]?.cells[key] ?? '']));
}

const ONE = cellKey('energy', '', '', null);
const of = (season: string, period: string, tier: number | null = null) => cellKey('energy', season, period, tier);

describe('a price that is told apart', () => {
  it('begins in each season, time of day and tier at the one price typed before', () => {
    const both = energy(energy(priced({ [ONE]: '0.14' }), { bySeason: true }), { byPeriod: true });
    expect(asked(both)).toEqual({
      'Summer, On-peak': '0.14',
      'Summer, Off-peak': '0.14',
      'Winter, On-peak': '0.14',
      'Winter, Off-peak': '0.14',
    });
    const tiers = [{ from: FROM, season: '', per: 'cycle' as const, limits: '500' }];
    expect(asked(energy(priced({ [ONE]: '0.14' }), { tiers }))).toEqual({ 'tier 1': '0.14', 'tier 2': '0.14' });
  });

  it('takes the season’s price into that season’s times of day', () => {
    const form = { ...priced({ [of('summer', '')]: '0.20', [of('winter', '')]: '0.10' }) };
    const bySeason = { ...form, charges: form.charges.map((one) => ({ ...one, bySeason: one.id === 'energy' })) };
    expect(asked(energy(bySeason, { byPeriod: true }))).toEqual({
      'Summer, On-peak': '0.20',
      'Summer, Off-peak': '0.20',
      'Winter, On-peak': '0.10',
      'Winter, Off-peak': '0.10',
    });
  });

  it('leaves “as before” as it is in a later row, and never writes over a price', () => {
    const later = { ...priced({ [ONE]: '0.14', [of('summer', '')]: '0.30' }) };
    const form = energy({ ...later, prices: [...later.prices, { from: '2026-07-01', cells: {} }] }, { bySeason: true });
    expect(asked(form)).toEqual({ Summer: '0.30', Winter: '0.14' });
    expect(asked(form, 1)).toEqual({ Summer: '', Winter: '' });
  });

  it('has back what was typed when it is unticked and ticked again, whatever was typed', () => {
    const price = fc.integer({ min: 1, max: 99 }).map((value) => `0.${String(value).padStart(2, '0')}`);
    fc.assert(
      fc.property(price, price, price, (flat, summer, winter) => {
        const first = energy(priced({ [ONE]: flat }), { bySeason: true });
        const typed = {
          ...first,
          prices: [
            {
              from: FROM,
              cells: { ...first.prices[0]?.cells, [of('summer', '')]: summer, [of('winter', '')]: winter },
            },
          ],
        };
        const unticked = energy(typed, { bySeason: false });
        expect(asked(unticked)).toEqual({ '': flat });
        expect(asked(energy(unticked, { bySeason: true }))).toEqual({ Summer: summer, Winter: winter });
      }),
      { numRuns: PROPERTY_RUNS },
    );
  });

  it('told apart no longer, begins at the price all had, and is asked for where they differed', () => {
    const form = (winter: string) => {
      const of2 = priced({ [of('summer', '')]: '0.20', [of('winter', '')]: winter });
      return { ...of2, charges: of2.charges.map((one) => ({ ...one, bySeason: one.id === 'energy' })) };
    };
    expect(asked(energy(form('0.20'), { bySeason: false }))).toEqual({ '': '0.20' });
    expect(asked(energy(form('0.10'), { bySeason: false }))).toEqual({ '': '' });
  });
});

describe('a minimum bill and its tax', () => {
  const tax = newCharge('tax', 'Tax', 'tax', 'percent', { on: ['energy', 'customer'], afterCredits: true });
  const floor = newCharge('minimum', 'Minimum bill', 'minimum', 'floor', { on: ['energy'], per: 'cycle' });
  const form = (charges: ChargeForm[]): PlanForm => {
    const empty = emptyPlanForm(FROM);
    const made = { ...empty, charges: [...empty.charges, ...charges] };
    const keys = pricedItems(made).flatMap(({ cells }) => cells.map(({ key }) => key));
    return { ...made, prices: [{ from: FROM, cells: Object.fromEntries(keys.map((key) => [key, '5'])) }] };
  };
  const found = (of2: PlanForm) => of2.charges.find(({ id }) => id === 'minimum') ?? floor;

  it.each(['before', 'after'] as const)(
    '%s tax is read back as itself, in a plan that holds, from either order',
    (wanted) => {
      for (const start of [form([tax, floor]), form([floor, tax])]) {
        const made = { ...start, charges: withMinimumTax(start, found(start), wanted) };
        expect(minimumTaxOf(made, found(made))).toBe(wanted);
        const plan = parsePlan(planOf(made, ZONE));
        expect(plan.ok ? [] : plan.problem.faults).toEqual([]);
        const ids = made.charges.map(({ id }) => id);
        expect(ids.indexOf('minimum') < ids.indexOf('tax')).toBe(wanted === 'before');
      }
    },
  );

  it('is neither while the tax and the minimum do not know of each other', () => {
    const apart = form([tax, floor]);
    expect(taxesOn(apart, found(apart)).map(({ id }) => id)).toEqual(['tax']);
    expect(minimumTaxOf(apart, found(apart))).toBeNull();
  });
});

describe('a charge added later', () => {
  const added = (on: string[]) => {
    const form = emptyPlanForm(FROM);
    const tax = newCharge('tax', 'Tax', 'tax', 'percent', { on });
    const charges = withCharge(
      { ...form, charges: [...form.charges, tax] },
      newCharge('wires', 'Wires', 'import', 'import'),
    );
    return { ids: charges.map(({ id }) => id), on: charges.at(-1)?.on };
  };

  it('stands above the tax, which is on it too where it was on everything', () => {
    expect(added(['energy', 'customer'])).toEqual({
      ids: ['energy', 'customer', 'wires', 'tax'],
      on: ['energy', 'customer', 'wires'],
    });
    expect(added(['energy']).on).toEqual(['energy']);
  });
});

describe('money kept for an incentive until its cheque', () => {
  const kept = (form: PlanForm): PlanForm => ({
    ...form,
    credits: [
      ...form.credits,
      newCredit('incentive', 'Incentive', 'cheque', { kind: 'incentive', basis: 'production' }),
    ],
    banks: [...form.banks, newBank('cheque', 'Incentive owed', 'USD')],
  });

  it.each(['nothing', 'carried', 'priced', 'pricedAfterNetting', 'soldAll'] as const)(
    'says nothing of what is sent out, and stays under “%s”',
    (rule) => {
      const made = withExportRule(kept(emptyPlanForm(FROM)), rule);
      expect(exportRuleOf(made)).toBe(rule);
      expect(made.banks.map(({ id }) => id)).toContain('cheque');
      expect(made.credits.find(({ id }) => id === 'incentive')?.to).toBe('cheque');
    },
  );
});
