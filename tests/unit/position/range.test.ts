import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ProjectionBasis } from '#shared/position/basis.ts';
import { drawing } from '#shared/position/chance.ts';
import { candidateAt, candidatesOf, drawnEnergy, urnsOf } from '#shared/position/draws.ts';
import type { Range } from '#shared/position/outlook.ts';
import { energyFrom, periodsAfter } from '#shared/position/periods.ts';
import { projectFrom } from '#shared/position/project.ts';
import { rangeOf } from '#shared/position/range.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { addMonths, day, daysBetween, monthOf } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { rangeMethod, rangeSentence } from '#src/features/position/chart-words.ts';
import { assuming, builtLedger } from './built-basis.ts';

const { basis } = builtLedger({}, (facts) => ({
  ...facts,
  assumptions: { ...facts.assumptions, horizonMonths: 180 },
}));

function ranged(of: ProjectionBasis, options: Parameters<typeof rangeOf>[1] = {}): Range {
  const made = rangeOf(of, options);
  if (!made.ok) throw new Error(made.why);
  return made.range;
}

function based(of: ProjectionBasis) {
  const made = projectFrom(of);
  if (!made.ok) throw new Error(made.why);
  return made.projection;
}

/** The basis with its plan changed. */
function withPlan(change: (plan: RatePlan) => RatePlan): ProjectionBasis {
  const plans = basis.facts.plans.map((one) => ({ ...one, plan: change(one.plan) }));
  return { ...basis, facts: { ...basis.facts, plans } };
}

describe('the range', () => {
  it('is none before twelve complete cycles, nor from provisional ones', () => {
    const short = { ...basis, cycles: basis.cycles.slice(0, 11) };
    expect(rangeOf(short)).toEqual({ ok: false, why: 'A range needs twelve complete cycles; the record has 11.' });
    const estimated = { ...basis, cycles: basis.cycles.map((cycle) => ({ ...cycle, provisional: true })) };
    expect(rangeOf(estimated)).toMatchObject({ ok: false });
    const unmeasured = { ...basis, cycles: basis.cycles.map((cycle) => ({ ...cycle, exportWh: null })) };
    expect(rangeOf(unmeasured)).toMatchObject({ ok: false });
    expect(rangeOf({ ...basis, cycles: basis.cycles.slice(-12) }).ok).toBe(true);
  });

  it('is the same for the same seed, and another for another', () => {
    expect(ranged(basis, { resamples: 20 })).toEqual(ranged(basis, { resamples: 20 }));
    expect(ranged(basis, { resamples: 20, seed: 5 })).not.toEqual(ranged(basis, { resamples: 20 }));
  });

  it('has a month for each of the projection, its low end at or under its high end, and the base about its middle', () => {
    const range = ranged(basis, { resamples: 100 });
    const { months, evenOn } = based(basis);
    expect(range.resamples).toBe(100);
    expect(range.months).toHaveLength(months.length);
    for (const { lowCents, highCents } of range.months) expect(lowCents).toBeLessThanOrEqual(highCents);
    const inside = months.filter((month, at) => {
      const { lowCents = 0, highCents = 0 } = range.months[at] ?? {};
      return month.settledTodayCents >= lowCents && month.settledTodayCents <= highCents;
    });
    expect(inside.length).toBeGreaterThan(months.length * 0.9);
    expect(range.evenWithin).toBe(100);
    expect(range.evenEarliest && evenOn && range.evenEarliest <= evenOn).toBe(true);
    expect(range.evenLatest && evenOn && range.evenLatest >= evenOn).toBe(true);
  });

  it('is the base itself where every day was recorded the same', () => {
    const steady = assuming(
      {
        ...basis,
        cycles: basis.cycles.map((cycle) => {
          const days = daysBetween(cycle.from, cycle.to);
          const daily = { importWh: wh(20_000 * days), exportWh: wh(10_000 * days), productionWh: wh(30_000 * days) };
          return { ...cycle, ...daily };
        }),
      },
      { degradation: '0' },
    );
    const range = ranged(steady, { resamples: 12 });
    const base = based(steady);
    expect(range.months).toEqual(
      base.months.map(({ settledTodayCents }) => ({ lowCents: settledTodayCents, highCents: settledTodayCents })),
    );
    expect([range.evenEarliest, range.evenLatest]).toEqual([base.evenOn, base.evenOn]);
  });

  it('counts honestly what does not come even within the horizon', () => {
    const never = ranged(assuming(basis, { horizonMonths: 24 }), { resamples: 10 });
    expect(never).toMatchObject({ evenEarliest: null, evenLatest: null, evenWithin: 0 });
    const late = ranged({ ...basis, evenSince: null }, { resamples: 10 });
    expect(late.evenWithin).toBe(10);
  });

  it('settles in full, with fewer futures, where the plan cannot be compiled, and comes to the same months', () => {
    const lots = withPlan((plan) => ({
      ...plan,
      banks: plan.banks.map((bank) => ({ ...bank, lotLife: { cycles: 400 } })),
    }));
    const short = assuming(lots, { horizonMonths: 24 });
    const full = ranged(short);
    expect(full.resamples).toBe(40);
    // Lots that never die change nothing.
    const compiled = ranged(assuming(basis, { horizonMonths: 24 }), { resamples: 40 });
    expect(full.months).toEqual(compiled.months);
  });

  it('carries a bank of the plan without a roof from month to month, compiled or not', () => {
    const own = (lotLife: { cycles: number } | null): ProjectionBasis => {
      const plans = basis.facts.plans.map((one) => ({
        ...one,
        withoutRoof: { ...one.plan, credits: [], banks: one.plan.banks.map((bank) => ({ ...bank, lotLife })) },
      }));
      return assuming({ ...basis, facts: { ...basis.facts, plans } }, { horizonMonths: 24 });
    };
    expect(ranged(own(null), { resamples: 12 }).months).toEqual(ranged(own({ cycles: 400 }), { resamples: 12 }).months);
  });

  it('says why where nothing can be projected or a drawn month cannot be settled', () => {
    const unpriced = withPlan((plan) => ({ ...plan, timeZone: 'Nowhere' }));
    expect(rangeOf(unpriced)).toMatchObject({ ok: false, why: expect.stringContaining('cannot be settled') });
    const dear = withPlan((plan) => ({
      ...plan,
      charges: plan.charges.map((charge) => ({
        ...charge,
        rates: charge.rates.map((rate) => ({ ...rate, rate: '9999999' })),
      })),
    }));
    const made = rangeOf(dear);
    expect(made.ok).toBe(false);
  });

  describe('where only a drawn month comes to more than a house could owe', () => {
    // The first year used four times as much as the last: a draw of it takes more than the base, which repeats the last.
    const cycles = basis.cycles.map((cycle, at) =>
      at < 13 && cycle.importWh !== null ? { ...cycle, importWh: wh(cycle.importWh * 4) } : cycle,
    );
    const priced = (plan: RatePlan, rate: string): RatePlan => ({
      ...plan,
      charges: plan.charges
        .filter((charge) => charge.id === 'energy')
        .map((charge) => ({ ...charge, rates: [{ from: day('2020-01-01'), rate }] })),
    });
    const whyOf = (change: (plan: RatePlan) => { plan: RatePlan; withoutRoof: RatePlan }): string | null => {
      const plans = basis.facts.plans.map((one) => ({ ...one, ...change(one.plan) }));
      const of = assuming(
        { ...basis, cycles, facts: { ...basis.facts, plans } },
        { horizonMonths: 12, priceRise: '0', degradation: '0' },
      );
      expect(projectFrom(of).ok).toBe(true);
      const made = rangeOf(of, { resamples: 20 });
      return made.ok ? null : made.why;
    };
    const why =
      'A drawn month cannot be settled. A line comes to more than any house could owe. Check the rates and the kWh.';
    const plain = (plan: RatePlan) => ({ ...plan, credits: [], banks: [] });

    it('with the roof', () => {
      expect(whyOf((plan) => ({ plan: priced(plan, '9000000'), withoutRoof: plain(priced(plan, '0.1')) }))).toBe(why);
    });

    it('without it', () => {
      expect(whyOf((plan) => ({ plan: priced(plan, '0.1'), withoutRoof: plain(priced(plan, '5000000')) }))).toBe(why);
    });

    it('without it, on a plan that carries a bank on', () => {
      expect(
        whyOf((plan) => ({
          plan: priced(plan, '0.1'),
          withoutRoof: { ...plain(priced(plan, '5000000')), banks: plan.banks },
        })),
      ).toBe(why);
    });

    it('and nothing is refused where no month does', () => {
      expect(whyOf((plan) => ({ plan: priced(plan, '0.1'), withoutRoof: plain(priced(plan, '0.2')) }))).toBeNull();
    });
  });

  it('moves through a month the record has nothing complete for as the base does', () => {
    const off = builtLedger({ exportTo: 'bill' }).basis;
    const cycles = off.cycles.map((cycle) =>
      monthOf(cycle.from) === 3 || monthOf(cycle.to) === 3 ? { ...cycle, provisional: true } : cycle,
    );
    const gap = assuming({ ...off, cycles }, { horizonMonths: 24 });
    const range = ranged(gap, { resamples: 1 });
    const { months } = based(gap);
    const changes = months.map((month, at) => {
      const before = at - 1;
      const drawn = (range.months[at]?.lowCents ?? 0) - (range.months[before]?.lowCents ?? 0);
      return {
        month: monthOf(month.on),
        drawn,
        base: month.settledTodayCents - (months[before]?.settledTodayCents ?? 0),
      };
    });
    const march = changes.filter(({ month }) => month === 4);
    expect(march).toHaveLength(2);
    for (const { drawn, base } of march) expect(drawn).toBe(base);
    expect(changes.slice(1).some(({ drawn, base }) => drawn !== base)).toBe(true);
  });

  it('leaves a calendar month at the base where the record has none like it', () => {
    const few = { ...basis, cycles: basis.cycles.slice(0, 9) };
    const urns = urnsOf(few);
    const [empty] = periodsAfter(basis.close.on, 24).filter((period) => candidatesOf(urns, period).days === 0);
    expect(empty).toBeDefined();
  });
});

describe('a draw', () => {
  it('picks a recorded day of the calendar month, so that a cycle weighs as its days in it', () => {
    const urns = urnsOf(basis);
    const [period] = periodsAfter(basis.close.on, 1);
    if (!period) throw new Error('no period');
    const urn = candidatesOf(urns, period);
    const counts = urn.candidates.map(() => 0);
    for (let at = 0; at < urn.days; at += 1) counts[candidateAt(urn, at)] = (counts[candidateAt(urn, at)] ?? 0) + 1;
    expect(counts).toEqual(urn.candidates.map((candidate) => candidate.days));
  });

  it('has in the mean of its days the base’s production and use, to the rounding', () => {
    const steady = assuming(basis, { degradation: '0' });
    const made = projectFrom(steady);
    if (!made.ok) throw new Error(made.why);
    const urns = urnsOf(steady);
    for (const period of periodsAfter(steady.close.on, 14).slice(1)) {
      const urn = candidatesOf(urns, period);
      const base = energyFrom(1_000_000, 900_000, 400_000);
      const days = urn.candidates.map((candidate) => ({
        candidate,
        energy: drawnEnergy(urns, period, candidate, base),
      }));
      const use = days.reduce((sum, { candidate, energy }) => sum + energy.useWh * candidate.days, 0) / urn.days;
      expect(Math.abs(use - base.useWh)).toBeLessThan(2);
      for (const { energy } of days) {
        expect(energy.importWh + energy.productionWh - energy.exportWh).toBe(energy.useWh);
        expect(energy.exportWh).toBeLessThanOrEqual(energy.productionWh);
      }
    }
  });

  it('ages a cycle of long ago by all its years, however few cycles there are', () => {
    const [first] = basis.cycles;
    const [period] = periodsAfter(basis.close.on, 1);
    if (!first || !period) throw new Error('no cycle');
    const old = { ...first, from: addMonths(first.from, -480), to: addMonths(first.to, -480) };
    const urns = urnsOf(
      assuming({ ...basis, cycles: [old, ...basis.cycles] }, { degradation: '0.01', horizonMonths: 12 }),
    );
    const month = urns.months.find((urn) => urn.candidates.some(({ age }) => age > 40));
    const candidate = month?.candidates.find(({ age }) => age > 40);
    if (!candidate) throw new Error('no candidate');
    const { productionWh } = drawnEnergy(urns, { ...period, index: 11 }, candidate, energyFrom(0, 0, 0));
    const days = daysBetween(period.from, period.to);
    const whole = (candidate.productionWh * days) / candidate.cycleDays;
    expect(productionWh / whole).toBeCloseTo(0.99 ** (candidate.age + 1), 5);
  });

  it('takes a cycle without production or use as it was', () => {
    const dark = {
      ...basis,
      cycles: basis.cycles.map((cycle) => ({ ...cycle, importWh: wh(0), exportWh: wh(0), productionWh: wh(0) })),
    };
    const urns = urnsOf(dark);
    const [period] = periodsAfter(dark.close.on, 1);
    const urn = period && candidatesOf(urns, period);
    const first = urn?.candidates[0];
    if (!period || !first) throw new Error('no candidate');
    expect(drawnEnergy(urns, period, first, energyFrom(5_000, 7_000, 0))).toMatchObject({
      productionWh: 0,
      exportWh: 0,
      useWh: 7_000,
    });
  });

  it('comes evenly and within bounds from any seed', () => {
    fc.assert(
      fc.property(fc.nat(), fc.integer({ min: 1, max: 400 }), (seed, below) => {
        const draw = drawing(seed);
        const again = drawing(seed);
        for (let at = 0; at < 20; at += 1) {
          const drawn = draw(below);
          expect(drawn).toBe(again(below));
          expect(drawn >= 0 && drawn < below).toBe(true);
        }
      }),
    );
    const draw = drawing(1);
    const counts = Array.from({ length: 10 }, () => 0);
    for (let at = 0; at < 10_000; at += 1) {
      const drawn = draw(10);
      counts[drawn] = (counts[drawn] ?? 0) + 1;
    }
    for (const count of counts) expect(Math.abs(count - 1_000)).toBeLessThan(150);
  });
});

describe('the range in words', () => {
  const range = ranged(basis, { resamples: 10 });

  it('says between which months it comes even', () => {
    const early = '2034-03-01' as typeof range.evenEarliest;
    const late = '2037-06-01' as typeof range.evenLatest;
    const say = (changes: Partial<Range>) =>
      rangeSentence({ ...range, resamples: 200, evenWithin: 200, ...changes }, 25);
    expect(say({ evenEarliest: early, evenLatest: late })).toBe(
      'Even between Mar 2034 and Jun 2037 in 8 of 10 resampled futures.',
    );
    expect(say({ evenEarliest: early, evenLatest: early })).toBe(
      'Even in Mar 2034 in at least 8 of 10 resampled futures.',
    );
    expect(say({ evenEarliest: early, evenLatest: null, evenWithin: 150 })).toBe(
      'Even in Mar 2034 at the earliest in nine of ten resampled futures; 50 of 200 do not come even within the 25 years.',
    );
    expect(say({ evenEarliest: null, evenLatest: null, evenWithin: 3 })).toBe(
      'Even within the 25 years in 3 of 200 resampled futures.',
    );
    expect(say({ evenEarliest: null, evenLatest: null, evenWithin: 0 })).toBe(
      'Not even within the 25 years in any of 200 resampled futures.',
    );
    expect(rangeMethod(range)).toContain('8 of 10 of 10 futures');
  });
});
