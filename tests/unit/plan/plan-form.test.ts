import { describe, expect, it } from 'vitest';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { withoutCharge } from '#src/ui/plan-form/change-charges.ts';
import { EXPORT_RULES, exportRuleOf, withExportRule } from '#src/ui/plan-form/export-rule.ts';
import { planFormFaults } from '#src/ui/plan-form/form-faults.ts';
import { emptyPlanForm, newCharge, newTrueUp } from '#src/ui/plan-form/new-parts.ts';
import {
  emptyEntry,
  entryFaults,
  entryOf,
  holdingFrom,
  ordinaryPlan,
  planOfEntry,
} from '#src/ui/plan-form/plan-entry.ts';
import type { PlanForm } from '#src/ui/plan-form/plan-form.ts';
import { planOf } from '#src/ui/plan-form/plan-of.ts';
import { cellKey, limitsOf, pricedItems } from '#src/ui/plan-form/price-cells.ts';
import { camelId, seasonName } from '#src/ui/plan-form/season-ids.ts';

const ZONE = 'America/Denver';
const FROM = '2026-01-01';

/** Every price a form asks for, filled in with one number. */
function priced(form: PlanForm, price = '0.12'): PlanForm {
  const cells = Object.fromEntries(pricedItems(form).flatMap((item) => item.cells.map(({ key }) => [key, price])));
  const [first, ...later] = form.prices;
  return { ...form, prices: [{ from: first?.from ?? FROM, cells }, ...later] };
}

/** Summer and winter, a weekday peak and all other hours, energy and its credit priced by both. */
function timeOfUse(): PlanForm {
  const form = emptyPlanForm(FROM);
  return {
    ...form,
    seasons: [
      { id: 'summer', name: 'Summer', from: '06-01', to: '09-30' },
      { id: 'winter', name: 'Winter', from: '10-01', to: '05-31' },
    ],
    periods: [
      {
        id: 'peak',
        label: 'On-peak',
        rest: false,
        hours: [{ season: '', days: 'weekday', from: '16:00', to: '21:00' }],
      },
      { id: 'off', label: 'Off-peak', rest: true, hours: [] },
    ],
    charges: form.charges.map((charge) =>
      charge.id === 'energy' ? { ...charge, bySeason: true, byPeriod: true } : charge,
    ),
  };
}

describe('a rate plan as questions', () => {
  it('begins as net billing that only lacks its prices', () => {
    const form = emptyPlanForm(FROM);
    expect(exportRuleOf(form)).toBe('priced');
    expect(planFormFaults(form, FROM).map(({ path }) => path.split('.')[0])).toEqual(['prices', 'prices', 'prices']);
    expect(planFormFaults(priced(form), FROM)).toEqual([]);
    expect(parsePlan(planOf(priced(form), ZONE)).ok).toBe(true);
  });

  it('asks one price for each season and time of day a charge differs by', () => {
    const energy = pricedItems(timeOfUse()).find(({ key }) => key === 'energy');
    expect(energy?.cells.map(({ label }) => label)).toEqual([
      'Summer, On-peak',
      'Summer, Off-peak',
      'Winter, On-peak',
      'Winter, Off-peak',
    ]);
  });

  it('asks no price for a period that has no hours in a season', () => {
    const form = timeOfUse();
    const periods = form.periods.map((period) =>
      period.rest ? period : { ...period, hours: period.hours.map((hours) => ({ ...hours, season: 'summer' })) },
    );
    const energy = pricedItems({ ...form, periods }).find(({ key }) => key === 'energy');
    expect(energy?.cells.map(({ label }) => label)).toEqual([
      'Summer, On-peak',
      'Summer, Off-peak',
      'Winter, Off-peak',
    ]);
  });

  it('takes a percent as an exact fraction and a blank later price as “as before”', () => {
    const form = emptyPlanForm(FROM);
    const tax = newCharge('tax', 'Tax', 'tax', 'percent', { on: ['energy'], afterCredits: true });
    const full = priced({ ...form, charges: [...form.charges, tax] }, '3.1');
    const later = { from: '2026-06-01', cells: { [cellKey('energy', '', '', null)]: '0.2' } };
    const plan = planOf({ ...full, prices: [...full.prices, later] }, ZONE);
    expect(plan.charges.find(({ id }) => id === 'tax')?.rates).toEqual([{ from: FROM, rate: '0.031' }]);
    expect(plan.charges.find(({ id }) => id === 'energy')?.rates).toHaveLength(2);
  });

  it('splits hours that run past midnight', () => {
    const form = timeOfUse();
    const periods = form.periods.map((period) =>
      period.rest ? period : { ...period, hours: [{ season: '', days: 'all' as const, from: '21:00', to: '07:00' }] },
    );
    expect(planOf(priced({ ...form, periods }), ZONE).calendar.periods[0]?.when).toEqual([
      { days: 'all', from: '00:00', to: '07:00' },
      { days: 'all', from: '21:00', to: '24:00' },
    ]);
  });

  it('reads tier limits with or without thousands’ commas', () => {
    expect(limitsOf('500; 1,000')).toEqual(['500', '1,000']);
    expect(limitsOf('500, 1000')).toEqual(['500', '1000']);
    expect(limitsOf('')).toEqual([]);
  });

  it('names a season after its name, and keeps the id of one that was not renamed', () => {
    expect(camelId('High summer')).toBe('highSummer');
    expect(seasonName('highSummer')).toBe('High summer');
    const form = timeOfUse();
    const seasons = form.seasons.map((season) =>
      season.id === 'summer' ? { ...season, name: 'High season' } : season,
    );
    const plan = planOf(priced({ ...form, seasons }), ZONE);
    expect(plan.calendar.seasons.map(({ id }) => id)).toEqual(['highSeason', 'winter']);
    expect(plan.charges[0]?.rates[0]?.season).toBe('highSeason');
  });

  it('says a price that does not read, and one that is missing, at its own field', () => {
    const form = priced(emptyPlanForm(FROM));
    const key = cellKey('energy', '', '', null);
    const first = form.prices[0];
    const wrong = { ...form, prices: [{ from: FROM, cells: { ...first?.cells, [key]: 'twelve' } }] };
    expect(planFormFaults(wrong, FROM)).toEqual([
      { path: `prices.0.cells.${key}`, message: 'Write the price of a kWh, such as 0.1684.' },
    ]);
  });
});

describe('the question of what happens to what is sent out', () => {
  const form = priced({ ...timeOfUse(), seasons: [], periods: [], charges: emptyPlanForm(FROM).charges });

  it.each(EXPORT_RULES.map(({ value }) => value))('%s is read back as itself and makes a plan that holds', (rule) => {
    const changed = withExportRule(form, rule);
    expect(exportRuleOf(changed)).toBe(rule);
    const made = parsePlan(planOf(priced(changed), ZONE));
    expect(made.ok ? [] : made.problem.faults).toEqual([]);
  });

  it('any answer after any other makes a plan that holds', () => {
    for (const { value: first } of EXPORT_RULES) {
      for (const { value: second } of EXPORT_RULES) {
        const changed = withExportRule(withExportRule(form, first), second);
        expect(exportRuleOf(changed)).toBe(second);
        expect(parsePlan(planOf(priced(changed), ZONE)).ok).toBe(true);
      }
    }
  });

  it('keeps kWh apart by period where energy is priced by period', () => {
    const plan = planOf(priced(withExportRule(timeOfUse(), 'carried')), ZONE);
    expect(plan.netting).toBe('period');
    expect(plan.banks[0]).toMatchObject({ unit: 'kWh', byPeriod: true, offsets: ['energy'] });
    expect(parsePlan(plan).ok).toBe(true);
  });

  it('sells all: the house’s use is charged and everything made is credited', () => {
    const plan = planOf(priced(withExportRule(form, 'soldAll')), ZONE);
    expect(plan).toMatchObject({ load: 'computed', netting: 'none' });
    expect(plan.charges[0]?.basis).toBe('load');
    expect(plan.credits[0]).toMatchObject({ kind: 'export', basis: 'production' });
  });
});

describe('a plan being written', () => {
  it('taking a charge out takes it out of everything that mentions it', () => {
    const form = emptyPlanForm(FROM);
    const tax = newCharge('tax', 'Tax', 'tax', 'percent', { on: ['energy', 'customer'] });
    const bare = withoutCharge({ ...form, charges: [...form.charges, tax] }, 'customer');
    expect(bare.charges.find(({ id }) => id === 'tax')?.on).toEqual(['energy']);
    expect(JSON.stringify(bare)).not.toContain('"customer"');
  });

  it('first prices move with the day the plan holds from, while they are the same day', () => {
    const entry = emptyEntry('');
    const dated = holdingFrom(entry, '2026-03-01');
    expect(dated.form.prices[0]?.from).toBe('2026-03-01');
    const own = { ...dated, form: { ...dated.form, prices: [{ from: '2025-01-01', cells: {} }] } };
    expect(holdingFrom(own, '2026-05-01').form.prices[0]?.from).toBe('2025-01-01');
  });

  it('pays a leftover kWh at its own price, and asks for that price', () => {
    const form = withExportRule(emptyPlanForm(FROM), 'carried');
    const banks = form.banks.map((bank) => ({
      ...bank,
      trueUps: [newTrueUp({ action: 'pay', priced: 'own', to: 'separate', months: ['3'] })],
    }));
    const full = priced({ ...form, banks }, '0.04');
    expect(planFormFaults({ ...form, banks }, FROM).some(({ path }) => path.includes('creditBank#0'))).toBe(true);
    expect(planOf(full, ZONE).banks[0]?.trueUps[0]).toMatchObject({
      at: { months: [3] },
      action: 'pay',
      rates: [{ from: FROM, rate: '0.04' }],
    });
  });

  it('an entry read from a plan says the same plan, and a broken JSON is a fault', () => {
    const plan = planOf(priced(timeOfUse()), ZONE);
    const entry = entryOf({ from: FROM as never, plan, withoutRoof: null });
    expect(entry.written).toBe('questions');
    expect(entryFaults(entry)).toEqual([]);
    expect(planOfEntry(entry, ZONE).plan).toEqual(plan);
    expect(entryFaults({ ...entry, written: 'json', json: '{' })[0]?.path).toBe('json');
  });

  it('begins on a day no other plan begins on', () => {
    const entry = { ...entryOf({ from: FROM as never, plan: planOf(priced(timeOfUse()), ZONE), withoutRoof: null }) };
    expect(entryFaults(entry, ['2025-01-01'])).toEqual([]);
    expect(entryFaults(entry, [FROM])).toEqual([
      { path: 'from', message: 'Another plan begins on this day. Change that one, or choose another day.' },
    ]);
  });
});

describe('the plan without the roof', () => {
  const access = newCharge('gridAccess', 'Grid access', 'demand', 'kW', { kWOf: 'dc', solarOnly: true });
  const form = emptyPlanForm(FROM);
  const plan = planOf(priced({ ...form, charges: [...form.charges, access] }), ZONE);

  it('is the same one by default, and says what is left out of it', () => {
    const entry = entryOf({ from: FROM as never, plan, withoutRoof: null });
    expect(entry.withoutRoof).toBe('same');
    expect(planOfEntry(entry, ZONE).withoutRoof).toBeNull();
    expect(ordinaryPlan(entry, ZONE)?.leftOut).toEqual(['Grid access', 'Export credit', 'Credit bank']);
    expect(ordinaryPlan({ ...entry, written: 'json', json: '{' }, ZONE)).toBeNull();
  });

  it('is another one as stated, opened and saved unchanged, its own faults under its own fields', () => {
    const ordinary = ordinaryPlan(entryOf({ from: FROM as never, plan, withoutRoof: null }), ZONE)?.plan ?? plan;
    const dearer = { ...ordinary, name: 'R-1 Ordinary', charges: ordinary.charges.slice(0, 1) };
    const entry = entryOf({ from: FROM as never, plan, withoutRoof: dearer });
    expect(entry.withoutRoof).toBe('other');
    expect(planOfEntry(entry, ZONE)).toEqual({ from: FROM, plan, withoutRoof: dearer });
    const broken = { ...entry, other: entry.other && { ...entry.other, written: 'json' as const, json: '{' } };
    expect(entryFaults(broken).map(({ path }) => path)).toEqual(['other.json']);
    // Choosing “the same” again keeps what was written, and says it no longer.
    expect(planOfEntry({ ...entry, withoutRoof: 'same' }, ZONE).withoutRoof).toBeNull();
    expect(entryFaults({ ...broken, withoutRoof: 'same' })).toEqual([]);
  });
});
