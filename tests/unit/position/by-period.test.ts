import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import { cellsOf } from '#shared/metering/period-hours.ts';
import { electricDue, settleSide } from '#shared/position/bill-side.ts';
import { usageWithoutRoof, usageWithRoof } from '#shared/position/period-usage.ts';
import { energyFrom, type PeriodEnergy, periodsAfter } from '#shared/position/periods.ts';
import { projectFrom, projectParts } from '#shared/position/project.ts';
import { rangeOf } from '#shared/position/range.ts';
import { shareBook } from '#shared/position/year-shares.ts';
import { intervalView, nettedOver } from '#shared/settlement/interval-flows.ts';
import { keptAt } from '#shared/settlement/place.ts';
import { type RatePlan, type RateRow, ratePlanSchema } from '#shared/settlement/plan.ts';
import { planFaults } from '#shared/settlement/plan-faults.ts';
import { settleAmounts } from '#shared/settlement/settle.ts';
import type { CycleUsage, Opening } from '#shared/settlement/settlement.ts';
import { addMonths, type Day, day, daysBetween } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import { readVectors, vectorPlan } from '#tests/support/netmetering-adapter.ts';
import { assuming, builtLedger } from './built-basis.ts';

/** A zone whose days all have 24 hours, as the built readings have. */
const ZONE = 'America/Phoenix';
const START = day('2025-10-01');
const HOURLY = { channels: ['import' as const, 'export' as const, 'production' as const], minutes: 60 as const };

const EVENING: RatePlan = inForceSince(
  ratePlanSchema.parse(JSON.parse(readFileSync('fixtures/plans/evening-peak.json', 'utf8'))),
);

/** The plan with its prices in force before the record begins, in the house's zone. */
function inForceSince(plan: RatePlan): RatePlan {
  const rates = <T extends { from: Day }>(rows: T[]): T[] => rows.map((row) => ({ ...row, from: day('2020-01-01') }));
  return {
    ...plan,
    timeZone: ZONE,
    charges: plan.charges.map((one) => ({ ...one, rates: rates(one.rates) })),
    credits: plan.credits.map((one) => ({ ...one, rates: one.rates && rates(one.rates) })),
  };
}

/** One price for all periods. */
const flat = (rows: RateRow[]): RateRow[] =>
  rows.filter((row) => row.period !== 'peak').map(({ period: _, ...row }) => row);

type Built = Parameters<typeof builtLedger>[0];

function household(plan: RatePlan, options: Built = {}) {
  const on = (facts: HouseholdFacts): HouseholdFacts => ({
    ...facts,
    house: { ...facts.house, timeZone: ZONE },
    plans: [{ from: day('2020-01-01'), plan, withoutRoof: null }],
  });
  return builtLedger({ cycles: 12, start: START, bare: true, ...options }, on);
}

const PLANS = [
  ...readVectors().vectors.map(({ id, plan }) => ({ id, plan: { ...vectorPlan(plan), timeZone: ZONE } })),
  { id: 'evening peak', plan: EVENING },
  { id: 'by the hour', plan: { ...EVENING, netting: 'hour' as const } },
];

function projected(of: ReturnType<typeof household>) {
  const made = projectFrom(of.basis);
  if (!made.ok) throw new Error(made.why);
  return made.projection;
}

const assumption = (of: ReturnType<typeof household>, name: string) =>
  projected(of).assumptions.find((one) => one.name === name);

describe('every plan of the vectors is projected', () => {
  it.each(PLANS)('$id, whatever the household, with and without readings by the hour', ({ plan }) => {
    const kwh = fc.integer({ min: 0, max: 900 });
    fc.assert(
      fc.property(fc.array(fc.tuple(kwh, kwh, kwh), { minLength: 2, maxLength: 2 }), fc.boolean(), (drawn, read) => {
        const change: NonNullable<Built>['change'] = (cycle, at) => {
          const [importKwh, exportKwh, selfKwh] = drawn[at % drawn.length] ?? [0, 0, 0];
          return { ...cycle, importKwh, exportKwh, productionKwh: exportKwh + selfKwh };
        };
        const { basis } = household(plan, { cycles: 3, change, intervals: read ? HOURLY : null });
        const made = projectFrom(assuming(basis, { horizonMonths: 30 }));
        expect(made.ok).toBe(true);
      }),
      { numRuns: 4 },
    );
  });

  it.each(PLANS)('$id: the first year’s bills are those of the same months settled on their readings', ({ plan }) => {
    const built = household(plan, { intervals: HOURLY });
    const basis = assuming(built.basis, { degradation: '0', priceRise: '0', horizonMonths: 12 });
    const parts = projectParts(basis);
    if (!parts.ok) throw new Error(parts.why);
    const { sides, energies, periods } = parts;
    const opening: Opening = { ...basis.opening, balanceCents: null };
    const settled = settleSide(sides.roof, opening, (at) => sides.usageWith(at, keptAt(energies, at), null));
    if (!settled.ok) throw new Error(settled.why);
    let held = opening;
    const direct = periods.map(({ from, to }) => {
      const month = settleAmounts(plan, held, monthOnReadings(built.facts, plan, from, to));
      if (!month.ok) throw new Error(month.problem.detail ?? '');
      held = month.value.closing;
      return electricDue(month.value.settlement, false);
    });
    expect(settled.value.dueCents).toEqual(direct);
  });
});

/** A month to come with the energy of the same month a year before, netted and told by period from its readings here. */
function monthOnReadings(facts: HouseholdFacts, plan: RatePlan, from: Day, to: Day): CycleUsage {
  const before = addMonths(from, -12);
  const days = daysBetween(before, addMonths(to, -12));
  const read = (channel: string) =>
    facts.intervals
      .filter((one) => one.channel === channel && one.day >= before && one.day < addMonths(to, -12))
      .flatMap((one) => one.values.map((value) => value ?? 0));
  const data = {
    startUtc: `${before}T07:00:00Z`,
    minutes: 60,
    importWh: read('import'),
    exportWh: read('export'),
    productionWh: read('production'),
  };
  expect(data.importWh).toHaveLength(days * 24);
  const view = intervalView(data, plan);
  const sum = (values: readonly number[]) => wh(values.reduce((total, value) => total + value, 0));
  const byPeriod = (netting: 'none' | 'hour') => {
    const flow = nettedOver(view, netting, null, null);
    const parts = Object.entries(flow.byPeriod ?? {}).map(([id, part]) => [
      id,
      { importWh: wh(part.import), exportWh: wh(part.export) },
    ]);
    const periods = cellsOf(plan.calendar)[0] === null ? null : Object.fromEntries(parts);
    return { importWh: wh(flow.import), exportWh: wh(flow.export), byPeriod: periods };
  };
  const [importWh, exportWh, productionWh] = [sum(data.importWh), sum(data.exportWh), sum(data.productionWh)];
  return {
    from,
    to,
    importWh,
    exportWh,
    productionWh,
    loadWh: wh(importWh + productionWh - exportWh),
    byPeriod: byPeriod('none').byPeriod,
    netted: { hour: byPeriod('hour') },
    kW: { dc: '11.48', ac: '9.6' },
    payments: [],
    finalBill: false,
    intervals: null,
  };
}

describe('a plan by period', () => {
  it('is projected as the record’s cycles fell on its periods, and says so', () => {
    const built = household(EVENING, { intervals: HOURLY });
    expect(assumption(built, 'periods')).toMatchObject({ value: '12 months as the record’s cycles were' });
    expect(assumption(built, 'selfUse')).toBeUndefined();
    const range = rangeOf(assuming(built.basis, { horizonMonths: 24 }));
    expect(range).toMatchObject({ ok: true, range: { resamples: 200 } });
    expect(built.ledger.cycles.every((cycle) => cycle.withoutRoof !== null)).toBe(true);
  });

  it('is an estimate by a stated shape of the day where nothing is read by the hour, in the projection and in the past', () => {
    const built = household(EVENING);
    expect(assumption(built, 'periods')?.value).toMatch(/^estimated: 12 months by an assumed shape of the day/);
    expect(assumption(built, 'selfUse')?.value).toMatch(/^estimated/);
    for (const { withoutRoof } of built.ledger.cycles) {
      expect(withoutRoof?.working.basis).toBe('estimated');
      expect(withoutRoof?.working.words).toContain('assumed shape of the day');
    }
    const avoided = built.ledger.entries.filter((entry) => entry.book === 'billAvoided');
    expect(avoided).toHaveLength(12);
    expect(avoided.every((entry) => entry.working.basis === 'estimated')).toBe(true);
  });

  it('takes months the cycles do not hold from the mean day of the readings', () => {
    const built = household(EVENING, { cycles: 5, intervals: HOURLY });
    expect(assumption(built, 'periods')?.value).toBe(
      'estimated: 5 months as the record’s cycles were, 7 months by the hours of the readings',
    );
  });

  it('is told by the lines of a statement that prints its periods', () => {
    const printed = household(EVENING, {}).facts;
    const line = (label: string, component: string, kwh: string, rate: string) => ({
      component,
      kind: component === 'energy' ? ('import' as const) : ('export' as const),
      label,
      quantity: kwh,
      unit: 'kWh' as const,
      rate,
      amountCents: printed.statements[0]?.lines[0]?.amountCents ?? fail(),
      inDue: true,
      row: null,
    });
    const built = builtLedger({ cycles: 12, start: START, bare: true }, (facts) => ({
      ...facts,
      house: { ...facts.house, timeZone: ZONE },
      plans: [{ from: day('2020-01-01'), plan: EVENING, withoutRoof: null }],
      statements: facts.statements.map((statement) => ({
        ...statement,
        lines: [
          line('Energy, on-peak', 'energy', '30', '0.3480'),
          line('Energy, off-peak', 'energy', '170', '0.1420'),
          line('Export, on-peak', 'exportCredit', '5', '0.1100'),
          line('Export, off-peak', 'exportCredit', '95', '0.0550'),
          { ...line('Service', 'customer', '1', '1'), kind: 'fixed' as const, quantity: null, unit: null },
        ],
      })),
    }));
    expect(built.basis.cycles[0]?.split).toMatchObject({ importWh: [30_000, 170_000], exportWh: [5_000, 95_000] });
    expect(assumption(built, 'periods')?.value).toBe('12 months as the record’s cycles were');
    expect(assumption(built, 'selfUse')?.value).toMatch(/^estimated/);
  });

  it('cannot be projected where an hour of the day is in none of its periods', () => {
    const [peak] = EVENING.calendar.periods;
    if (!peak) throw new Error('no peak');
    const gap = { ...EVENING, calendar: { ...EVENING.calendar, periods: [peak] } };
    const priced = gap.charges.map((one) => ({ ...one, rates: one.rates.filter((row) => row.period !== 'offPeak') }));
    const credits = gap.credits.map((one) => ({
      ...one,
      rates: one.rates?.filter((row) => row.period !== 'offPeak') ?? null,
    }));
    const plan = { ...gap, charges: priced, credits };
    expect(planFaults(plan)).toEqual([]);
    for (const intervals of [null, HOURLY]) {
      const facts = household(EVENING, { intervals });
      const plans = [{ from: day('2020-01-01'), plan, withoutRoof: null }];
      const made = projectFrom({ ...facts.basis, facts: { ...facts.basis.facts, plans } });
      expect(made).toMatchObject({ ok: false, why: expect.stringContaining('by period') });
    }
  });

  it('carries workings that come to their figures', () => {
    const { ledger } = household(EVENING, { intervals: HOURLY });
    const worked = everyWorking({ cycles: ledger.cycles, entries: ledger.entries });
    expect(worked.length).toBeGreaterThan(100);
    expect(worked.filter((one) => !one.agrees)).toEqual([]);
  });
});

describe('netting inside the hour', () => {
  const plan = { ...EVENING, netting: 'hour' as const };

  it('is as recorded where readings tell', () => {
    expect(assumption(household(plan, { intervals: HOURLY }), 'netting')?.value).toBe('as recorded');
  });

  it('is taken for none, and called an estimate, where they do not or are too coarse', () => {
    expect(assumption(household(plan), 'netting')?.value).toMatch(/^estimated: none/);
    const quarter = household({ ...EVENING, netting: '15min' }, { intervals: HOURLY });
    expect(assumption(quarter, 'netting')?.value).toMatch(/^estimated: none/);
  });

  it('goes by seasons that change interval by interval as if by days', () => {
    const by = { ...plan, seasonBy: 'intervals' as const, rateChangeBy: 'intervals' as const };
    expect(projected(household(by, { intervals: HOURLY })).months.length).toBeGreaterThan(0);
  });
});

describe('refused', () => {
  it('where the plan without a roof cannot be settled', () => {
    const { basis } = household(EVENING);
    const withoutRoof = { ...EVENING, timeZone: 'Nowhere' };
    const plans = [{ from: day('2020-01-01'), plan: EVENING, withoutRoof }];
    const made = projectFrom({ ...basis, facts: { ...basis.facts, plans } });
    expect(made).toMatchObject({ ok: false, why: expect.stringContaining('Nowhere') });
  });
});

describe('settled in full and compiled', () => {
  const seasonal: RatePlan = {
    ...EVENING,
    calendar: {
      ...EVENING.calendar,
      periods: EVENING.calendar.periods.map((one) =>
        one.when === 'rest' ? one : { ...one, when: one.when.map((span) => ({ ...span, season: 'summer' })) },
      ),
    },
  };
  const plain: RatePlan = {
    ...EVENING,
    netting: 'hour',
    calendar: { ...EVENING.calendar, periods: [] },
    charges: EVENING.charges.map((one) => ({ ...one, rates: flat(one.rates) })),
    credits: EVENING.credits.map((one) => ({ ...one, rates: one.rates && flat(one.rates) })),
  };
  const kept = (plan: RatePlan, lotLife: { cycles: number } | null): RatePlan => ({
    ...plan,
    banks: plan.banks.map((bank) => ({ ...bank, lotLife, trueUps: [] })),
  });

  it.each([
    ['by period', EVENING],
    ['by period and hour', { ...EVENING, netting: 'hour' as const }],
    ['by a period of the summer alone', seasonal],
    ['by the hour without periods', plain],
  ])('%s, the months are the same', (_, plan) => {
    const { basis } = household(EVENING, { intervals: HOURLY });
    const months = (of: RatePlan) => {
      const plans = [{ from: day('2020-01-01'), plan: of, withoutRoof: null }];
      const parts = projectParts(assuming({ ...basis, facts: { ...basis.facts, plans } }, { horizonMonths: 24 }));
      if (!parts.ok) throw new Error(parts.why);
      return { isCompiled: parts.sides.roof.compiled !== null, months: parts.months };
    };
    // Lots that never die change nothing but the way.
    const compiled = months(kept(plan, null));
    const full = months(kept(plan, { cycles: 400 }));
    expect([compiled.isCompiled, full.isCompiled]).toEqual([true, false]);
    expect(full.months).toEqual(compiled.months);
  });
});

describe('a cycle’s split', () => {
  const splits = (plan: RatePlan, options: Built, change: (facts: HouseholdFacts) => HouseholdFacts = (same) => same) =>
    builtLedger({ cycles: 2, start: START, bare: true, ...options }, (facts) =>
      change({
        ...facts,
        house: { ...facts.house, timeZone: ZONE },
        plans: [{ from: day('2020-01-01'), plan, withoutRoof: null }],
      }),
    ).basis.cycles.map((cycle) => cycle.split);

  it('has one part where the plan nets by the hour without periods', () => {
    const plan = { ...EVENING, netting: 'hour' as const, calendar: { ...EVENING.calendar, periods: [] } };
    const rates = (rows: RateRow[]) => rows.filter((row) => row.period === undefined);
    const charges = plan.charges.map((one) => ({
      ...one,
      rates: one.id === 'energy' ? [{ from: START, rate: '0.2' }] : rates(one.rates),
    }));
    const credits = plan.credits.map((one) => ({ ...one, rates: [{ from: START, rate: '0.1' }] }));
    const [first] = splits({ ...plan, charges, credits }, { intervals: HOURLY });
    expect(first?.importWh).toHaveLength(1);
    expect(first?.cancels['15min']).toBeNull();
    expect(first?.selfWh).toEqual([first ? 830_000 - (first.exportWh[0] ?? 0) : 0]);
    expect(splits({ ...plan, charges, credits }, {})).toEqual([null, null]);
  });

  it('knows no self-use where production is not read by the hour', () => {
    const [first] = splits(EVENING, { intervals: { channels: ['import', 'export'], minutes: 60 } });
    expect(first).toMatchObject({ selfWh: null });
  });

  it('is none where the readings do not cover the cycle by the plan’s clock', () => {
    expect(splits({ ...EVENING, timeZone: 'Asia/Tokyo' }, { intervals: HOURLY })).toEqual([null, null]);
  });

  it('is none where an hour lies in no period, and holds nothing of a period of another season', () => {
    const [peak] = EVENING.calendar.periods;
    if (!peak || peak.when === 'rest') throw new Error('no peak');
    const only = (periods: RatePlan['calendar']['periods']): RatePlan => ({
      ...EVENING,
      calendar: { ...EVENING.calendar, periods },
      charges: EVENING.charges.map((one) => ({ ...one, rates: flat(one.rates) })),
      credits: EVENING.credits.map((one) => ({ ...one, rates: one.rates && flat(one.rates) })),
    });
    expect(splits(only([peak]), { intervals: HOURLY })).toEqual([null, null]);
    const summer = { ...peak, when: peak.when.map((span) => ({ ...span, season: 'summer' })) };
    const winter = { ...peak, id: 'winterPeak', when: peak.when.map((span) => ({ ...span, season: 'winter' })) };
    const seasonal = splits(only([summer, winter, { id: 'offPeak', label: '', when: 'rest' }]), { intervals: HOURLY });
    expect(seasonal[1]?.importWh[0]).toBe(0);
    expect(seasonal[1]?.selfWh?.[0]).toBe(0);
    expect(seasonal[1]?.importWh[1]).toBeGreaterThan(0);
  });

  it('is none where the lines print no kWh by period, or only of one side', () => {
    expect(splits(EVENING, {})).toEqual([null, null]);
  });
});

describe('another plan, or use at other hours', () => {
  it('a plan by period tried on a flat household goes by the hours of its readings', () => {
    const built = builtLedger({ cycles: 12, start: START, bare: true, intervals: HOURLY });
    expect(built.basis.cycles.every((cycle) => cycle.split === null)).toBe(true);
    const plans = [{ from: day('2020-01-01'), plan: EVENING, withoutRoof: null }];
    const made = projectFrom({ ...built.basis, facts: { ...built.basis.facts, plans } });
    if (!made.ok) throw new Error(made.why);
    const said = made.projection.assumptions.find((one) => one.name === 'periods');
    // The record's cycles were under the plan they were billed by: with its own periods they would count as split by none.
    expect(said?.value).toBe('estimated: 12 months by the hours of the readings');
  });

  it('more use at stated hours falls on the periods of those hours, weekdays and weekends in their measure', () => {
    const { basis } = household(EVENING, { intervals: HOURLY });
    const [period] = periodsAfter(basis.close.on, 1);
    if (!period) throw new Error('no period');
    const shared = shareBook(basis).at(EVENING.calendar, period.from, period.to);
    const used = (atHours: PeriodEnergy['atHours']) => {
      const more = atHours ? atHours.importWh + atHours.selfWh : 0;
      const energy = energyFrom(900_000, 800_000 + more, 400_000 - (atHours?.selfWh ?? 0));
      const { split } = usageWithRoof(atHours ? { ...energy, atHours } : energy, shared, { period, plan: EVENING });
      return split?.periods.map((part) => [part?.importWh, part?.loadWh]);
    };
    const [peak = [], off = []] = used(undefined) ?? [];
    const plus = (at: (number | undefined)[], bought: number, load: number) => [
      (at[0] ?? 0) + bought,
      (at[1] ?? 0) + load,
    ];
    expect(used({ importWh: 70_000, selfWh: 0, fromHour: 23, toHour: 5 })).toEqual([peak, plus(off, 70_000, 70_000)]);
    expect(used({ importWh: 70_000, selfWh: 7_000, fromHour: 15, toHour: 20 })).toEqual([
      plus(peak, 50_000, 55_000),
      plus(off, 20_000, 22_000),
    ]);
  });

  it('without a roof all of it is bought when it is used, whatever the netting', () => {
    const { basis } = household(EVENING, { intervals: HOURLY });
    const [period] = periodsAfter(basis.close.on, 1);
    if (!period) throw new Error('no period');
    const shared = shareBook(basis).at(EVENING.calendar, period.from, period.to);
    const month = { period, plan: EVENING };
    const energy = energyFrom(900_000, 800_000, 400_000);
    const roof = usageWithRoof(energy, shared, month).split;
    const plain = usageWithoutRoof(energy, shared, month);
    expect(plain).toMatchObject({ importWh: 800_000, exportWh: 0, productionWh: 0, loadWh: 800_000 });
    expect(plain.split?.periods.map((part) => part?.importWh)).toEqual(roof?.periods.map((part) => part?.loadWh));
    expect(plain.split?.netted.hour).toMatchObject({ importWh: 800_000, exportWh: 0 });
  });
});

function fail(): never {
  throw new Error('the built household lacks it');
}
