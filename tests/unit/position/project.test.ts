import { describe, expect, it } from 'vitest';
import { costEntries } from '#shared/books/costs.ts';
import { incentiveEarned } from '#shared/books/incentive.ts';
import { loanEntries } from '#shared/books/loan.ts';
import { DEFAULT_ASSUMPTIONS } from '#shared/facts/household.ts';
import { foldPosition } from '#shared/position/fold.ts';
import { monthlyEnergy } from '#shared/position/monthly-energy.ts';
import { placeEntries } from '#shared/position/place.ts';
import type { Figure, Projection } from '#shared/position/position.ts';
import { type ProjectionFacts, type ProjectionInput, projectBase } from '#shared/position/project.ts';
import { type RatePlanInput, ratePlanSchema } from '#shared/settlement/plan.ts';
import { EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { cents, sumCents } from '#shared/units/cents.ts';
import { addMonths, day, daysBetween } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { creditOf, incentiveOf, loanOf, mortgageOf } from '../books/facts.ts';

const NOTHING: Figure = {
  amountCents: cents(0),
  working: { words: '', formula: '0', inputs: [], unit: 'USD', basis: 'computed' },
};

/** Import at 20 cents, export at 10 cents off the same bill, no other charge. */
const FLAT: RatePlanInput = {
  timeZone: 'America/New_York',
  netting: 'none',
  charges: [
    { id: 'energy', label: 'Energy', kind: 'import', basis: 'import', rates: [{ from: '2020-01-01', rate: '0.20' }] },
  ],
  credits: [
    {
      id: 'sold',
      label: 'Export',
      kind: 'export',
      basis: 'export',
      to: 'bill',
      rates: [{ from: '2020-01-01', rate: '0.10' }],
    },
  ],
};

/** kWh rollover at 20 cents: what is sent out in one month pays for another. */
const ROLLOVER: RatePlanInput = {
  timeZone: 'America/New_York',
  netting: 'cycle',
  charges: [
    { id: 'energy', label: 'Energy', kind: 'import', basis: 'import', rates: [{ from: '2020-01-01', rate: '0.20' }] },
  ],
  banks: [{ id: 'kwh', label: 'kWh bank', unit: 'kWh', offsets: ['energy'] }],
};

/** Twelve calendar-month cycles of 2025, each day 30 kWh used, 20 made, 12 of them sent out, 22 bought. */
const YEAR = Array.from({ length: 12 }, (_, index) => {
  const from = addMonths(day('2025-01-01'), index);
  const to = addMonths(from, 1);
  const days = daysBetween(from, to);
  return {
    from,
    to,
    importWh: wh(22_000 * days),
    exportWh: wh(12_000 * days),
    productionWh: wh(20_000 * days),
    provisional: false,
  };
});

function factsOf(changes: Partial<ProjectionFacts> = {}, plan: RatePlanInput = FLAT): ProjectionFacts {
  return {
    house: {
      name: '12 Tern Lane',
      place: 'Port Calder',
      utility: 'Harrow Bay Electric Cooperative',
      timeZone: 'America/New_York',
      latitude: null,
      longitude: null,
      switchOn: day('2025-01-01'),
      arrays: [{ id: 'a', label: 'South', modules: 28, moduleWatts: 410, tiltDegrees: null, facingDegrees: null }],
      inverterAcWatts: null,
      expectedMonthlyWh: null,
      meters: [],
      aggregation: 'none',
    },
    plans: [{ from: day('2020-01-01'), plan: ratePlanSchema.parse(plan), withoutRoof: null }],
    loan: null,
    otherLoans: [],
    lease: null,
    mortgage: null,
    credit: null,
    incentive: null,
    costs: [],
    usageBefore: [],
    assumptions: {
      ...DEFAULT_ASSUMPTIONS,
      degradation: '0',
      priceRise: '0',
      horizonMonths: 36,
      upkeepYearlyCents: cents(0),
    },
    ...changes,
  };
}

function inputOf(facts: ProjectionFacts, changes: Partial<ProjectionInput> = {}): ProjectionInput {
  const today = day('2026-01-10');
  const cycles = changes.cycles ?? YEAR;
  const folded = cycles.map((cycle) => ({ ...cycle, provisional: false, utilityBank: NOTHING }));
  const entries = placeEntries(facts.loan ? loanEntries(facts.loan, today) : [], folded);
  const points = foldPosition({
    entries,
    cycles: folded,
    today,
    loans: facts.loan ? [facts.loan] : [],
    credit: facts.credit,
  });
  const since = entries.filter((entry) => entry.cycle === 'since');
  return { facts, today, cycles, opening: EMPTY_OPENING, points, since, ...changes };
}

function project(facts: ProjectionFacts, changes: Partial<ProjectionInput> = {}): Projection {
  const made = projectBase(inputOf(facts, changes));
  if (!made.ok) throw new Error(made.why);
  return made.projection;
}

describe('the projection', () => {
  it('runs by calendar months from the last close, the first being what is left of its month', () => {
    expect(
      project(factsOf())
        .months.slice(0, 2)
        .map((month) => month.on),
    ).toEqual(['2026-02-01', '2026-03-01']);
    const shifted = [{ ...(YEAR[0] ?? fail()), from: day('2025-12-14'), to: day('2026-01-14') }];
    const { months } = project(factsOf(), { cycles: shifted });
    expect(months.map((month) => month.on).slice(0, 2)).toEqual(['2026-02-01', '2026-03-01']);
    expect(months).toHaveLength(36);
  });

  it('settles each month by the plan: use at the full price less what is bought and sent out', () => {
    const { months } = project(factsOf());
    // January: 31 × (30 × 0.20) − 31 × (22 × 0.20 − 12 × 0.10) = 186.00 − 99.20
    expect(months[0]?.books.billAvoided).toBe(8_680);
    expect(months[1]?.books.billAvoided).toBe(28 * 280);
    expect(months[12]?.books.billAvoided).toBe(8_680);
  });

  it('raises prices by whole years and ages the panels by a year at once', () => {
    const { months } = project(
      factsOf({
        assumptions: {
          ...DEFAULT_ASSUMPTIONS,
          degradation: '0.01',
          priceRise: '0.05',
          horizonMonths: 36,
          upkeepYearlyCents: cents(0),
        },
      }),
    );
    // 19.8 kWh a day made, 60 % sent out: 11.88; self-use 7.92; bought 22.08.
    expect(months[0]?.books.billAvoided).toBe(18_600 - (13_690 - 3_683));
    // Second year: 19.602 made, 11.7612 sent, 22.1592 bought, at 0.21 and 0.105.
    expect(months[12]?.books.billAvoided).toBe(19_530 - (14_426 - 3_828));
  });

  it('carries the plan’s bank from month to month, and counts what is in it as settled', () => {
    const sunny = YEAR.map((cycle, index) =>
      index >= 3 && index <= 8
        ? { ...cycle, productionWh: wh(cycle.productionWh * 3), exportWh: wh(cycle.exportWh * 3) }
        : cycle,
    );
    const { months } = project(factsOf({}, ROLLOVER), { cycles: sunny });
    const september = months[8];
    const december = months[11];
    expect((september?.settledTodayCents ?? 0) - (september?.cashSoFarCents ?? 0)).toBeGreaterThan(0);
    // With the bank full, December buys nothing: all of its use is avoided.
    expect(december?.books.billAvoided).toBe(31 * 30 * 20);
  });

  it('ends the incentive, the insurance and the loan each on its own day', () => {
    const facts = factsOf({
      incentive: incentiveOf({ firstDay: day('2025-01-01'), lastDay: day('2026-03-15') }),
      mortgage: mortgageOf({}, { appreciationOn: day('2026-06-01') }),
      loan: loanOf({ termMonths: 30 }),
    });
    const { months } = project(facts);
    const of = (on: string) => months.find((month) => month.on === on)?.books;
    expect(of('2026-03-01')?.incentive).toBe(Math.round(28 * 20 * 4.5));
    // March: 15 of 31 days in the term.
    expect(of('2026-04-01')?.incentive).toBe(Math.round(31 * 20 * 4.5 * (15 / 31)));
    expect(of('2026-05-01')?.incentive).toBe(0);
    expect(of('2026-07-01')?.insurance).toBe(14_250);
    expect(of('2026-08-01')?.insurance).toBe(0);
    expect(of('2027-01-01')?.loan).toBeLessThan(0);
    expect(of('2027-02-01')?.loan).toBe(0);
    expect(months.find((month) => month.on === '2027-01-01')?.loanBalanceCents).toBe(0);
  });

  it('takes the planned parts of the credit when they are expected, and leaves the rest still to come', () => {
    const { months } = project(factsOf({ credit: creditOf() }));
    const came = months.filter((month) => month.books.credit !== 0).map((month) => [month.on, month.books.credit]);
    // The 2025 return was filed on 2 March 2026, after the day the projection is made.
    expect(came).toEqual([
      ['2026-04-01', 505_000],
      ['2027-05-01', 187_000],
    ]);
  });

  it('collects what is owed of the incentive next, and owes nothing in the end', () => {
    const incentive = incentiveOf({ firstDay: day('2025-01-01'), lastDay: day('2026-03-15') });
    const today = day('2026-01-10');
    const entries = placeEntries(incentiveEarned(incentive, YEAR), YEAR);
    const folded = YEAR.map((cycle) => ({ ...cycle, provisional: false, utilityBank: NOTHING }));
    const points = foldPosition({ entries, cycles: folded, today, loans: [], credit: null });
    const { months } = project(factsOf({ incentive }), { points });
    const owed = points.at(-1)?.incentiveOwedCents ?? cents(0);
    expect(owed).toBe(sumCents(entries.map((entry) => entry.amountCents)));
    expect(months[0]?.books.incentive).toBe(owed + Math.round(31 * 20 * 4.5));
    expect(months.at(-1)?.settledTodayCents).toBe(months.at(-1)?.cashSoFarCents);
  });

  it('spends the upkeep of a year over its months, to the cent', () => {
    const { months } = project(
      factsOf({
        assumptions: {
          ...DEFAULT_ASSUMPTIONS,
          degradation: '0',
          priceRise: '0',
          horizonMonths: 24,
          upkeepYearlyCents: cents(14_001),
        },
      }),
    );
    expect(sumCents(months.slice(0, 12).map((month) => month.books.upkeep))).toBe(-14_001);
  });

  it('keeps what is already known since the last close', () => {
    const [known] = placeEntries(
      costEntries(
        [
          {
            id: 'k',
            on: day('2026-01-05'),
            kind: 'repair',
            label: 'Repair',
            amountCents: cents(9_000),
            documentId: null,
            every: null,
            until: null,
          },
        ],
        day('2026-01-10'),
      ),
      YEAR,
    );
    expect(project(factsOf(), { since: known ? [known] : [] }).months[0]?.books.upkeep).toBe(-9_000);
  });

  it('adds up: each month’s books to what it added, and those to cash so far', () => {
    const facts = factsOf({ loan: loanOf(), credit: creditOf(), incentive: incentiveOf(), mortgage: mortgageOf() });
    const input = inputOf(facts);
    const { months } = project(facts);
    let cash = input.points.at(-2)?.cashSoFarCents ?? cents(0);
    for (const month of months) {
      expect(sumCents(Object.values(month.books))).toBe(month.addedCents);
      cash = cents(cash + month.addedCents);
      expect(month.cashSoFarCents).toBe(cash);
    }
  });

  it('is even from the first month that stays at or above zero', () => {
    const facts = factsOf({ loan: loanOf({ principalCents: cents(200_000), termMonths: 24 }) });
    const { months, evenOn } = project(facts);
    const index = months.findIndex((month) => month.on === evenOn);
    expect(index).toBeGreaterThan(0);
    expect(months.slice(index).every((month) => month.settledTodayCents >= 0)).toBe(true);
    expect(months[index - 1]?.settledTodayCents).toBeLessThan(0);
  });

  it('states every assumption with its source', () => {
    const { assumptions } = project(factsOf({ credit: creditOf(), incentive: incentiveOf() }));
    expect(assumptions.map((one) => one.name)).toEqual([
      'degradation',
      'priceRise',
      'horizonMonths',
      'upkeepYearlyCents',
      'production',
      'use',
      'export',
      'rules',
      'discountRate',
      'grid',
      'incentive',
      'credit',
    ]);
    expect(assumptions.every((one) => one.value !== '' && one.source !== '')).toBe(true);
  });

  it('says why there is none', () => {
    const why = (facts: ProjectionFacts, changes: Partial<ProjectionInput> = {}) => {
      const made = projectBase(inputOf(facts, changes));
      return made.ok ? null : made.why;
    };
    expect(why(factsOf(), { cycles: [] })).toContain('first cycle');
    expect(why(factsOf({ plans: [] }))).toContain('rate plan');
    expect(why(factsOf(), { cycles: YEAR.map((cycle) => ({ ...cycle, productionWh: null })) })).toContain('production');
  });
});

describe('the year to repeat', () => {
  const base = { lastTo: day('2026-01-01'), expectedMonthlyWh: null, usageBefore: [], degradation: '0' };

  it('fills a month without record from the installer’s estimate, scaled by record ÷ estimate', () => {
    // 10 kWh a day expected to June, 20 from July; the record made 20 a day, twice what was expected.
    const expected = YEAR.map(({ from, to }, index) => wh((index < 6 ? 10_000 : 20_000) * daysBetween(from, to)));
    const made = monthlyEnergy({
      ...base,
      lastTo: day('2025-07-01'),
      cycles: YEAR.slice(0, 6),
      expectedMonthlyWh: expected,
    });
    expect(made?.productionBasis).toEqual([...Array(6).fill('record'), ...Array(6).fill('installer')]);
    expect(made?.productionPerDay[6]?.toNumber()).toBe(40_000);
  });

  it('fills a month without record by the record’s mean where there is no estimate', () => {
    const made = monthlyEnergy({ ...base, lastTo: day('2025-07-01'), cycles: YEAR.slice(0, 6) });
    expect(made?.productionPerDay[9]?.toNumber()).toBe(20_000);
    expect(made?.productionBasis[9]).toBe('mean');
  });

  it('takes use of the same month before the roof where the record has none', () => {
    const before = [{ from: day('2023-10-01'), to: day('2023-11-01'), importWh: wh(31 * 41_000) }];
    const made = monthlyEnergy({ ...base, lastTo: day('2025-07-01'), cycles: YEAR.slice(0, 6), usageBefore: before });
    expect(made?.usePerDay[9]?.toNumber()).toBe(41_000);
    expect(made?.useBasis[9]).toBe('before');
  });

  it('brings older years to the age of the last one', () => {
    const older = YEAR.map((cycle) => ({ ...cycle, from: addMonths(cycle.from, -12), to: addMonths(cycle.to, -12) }));
    const made = monthlyEnergy({ ...base, cycles: [...older, ...YEAR], degradation: '0.01' });
    // The older July made 20 a day, worth 19.8 at the last year's age.
    expect(made?.productionPerDay[6]?.toNumber()).toBe(19_900);
  });

  it('shares a cycle between its months by days', () => {
    const cycle = {
      from: day('2025-01-17'),
      to: day('2025-02-16'),
      importWh: wh(0),
      exportWh: wh(0),
      productionWh: wh(30_001),
      provisional: false,
    };
    const made = monthlyEnergy({ ...base, lastTo: day('2025-02-16'), cycles: [cycle] });
    expect(
      made?.productionPerDay[0]
        ?.times(15)
        .plus(made.productionPerDay[1]?.times(15) ?? 0)
        .toNumber(),
    ).toBe(30_001);
  });
});

function fail(): never {
  throw new Error('the year has no months');
}
