import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bankWorth } from '#shared/position/bank-worth.ts';
import { electricDue } from '#shared/position/bill-side.ts';
import { wholeBalance } from '#shared/settlement/bank-state.ts';
import { bankCents, type CompiledCycle, compileCycle, dueOf } from '#shared/settlement/compile-cycle.ts';
import { capName, newSlots, stateOf } from '#shared/settlement/compile-state.ts';
import type { CompiledUsage } from '#shared/settlement/compile-usage.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { compare, qtyOfText } from '#shared/settlement/quantity.ts';
import { orRefusal } from '#shared/settlement/refused.ts';
import { settleAmounts } from '#shared/settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING, type Opening } from '#shared/settlement/settlement.ts';
import { wh } from '#shared/units/energy.ts';
import { splitWhole } from '#shared/units/split.ts';
import { readVectors, vectorOpening, vectorPlan, vectorUsage } from '#tests/support/netmetering-adapter.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { statedPlans, wholeCyclePlans } from './arbitrary-plan.ts';
import { usages } from './arbitrary-usage.ts';

/** A cycle by its totals and, where they are known, its periods and clock hours, with its load as the plan reads it. */
function totalsOf(plan: RatePlan, usage: CycleUsage): CycleUsage {
  const made = usage.productionWh ?? 0;
  const load = usage.importWh + made - usage.exportWh;
  const ids = Object.keys(usage.byPeriod ?? {});
  // What is made beside export goes to the periods in turn, the last takes the rest.
  const self = splitWhole(made - usage.exportWh, ids.map((_, at) => at + 1).concat(ids.length === 0 ? [1] : []));
  const own = ids.map((id, at) => {
    const { importWh = 0, exportWh = 0 } = usage.byPeriod?.[id] ?? {};
    const kept = self[at] ?? 0;
    return [id, { productionWh: wh(exportWh + kept), loadWh: wh(importWh + kept) }] as const;
  });
  return {
    ...usage,
    productionWh: wh(made),
    loadWh: plan.load === 'metered' ? (usage.loadWh ?? wh(load)) : wh(load),
    ...(ids.length === 0 ? {} : { ownByPeriod: Object.fromEntries(own) }),
    payments: [],
    finalBill: false,
    intervals: null,
  };
}

/** The same as the compiled settlement takes it. */
function compiledUsage(plan: RatePlan, usage: CycleUsage): CompiledUsage {
  const { importWh, exportWh, productionWh, loadWh, byPeriod, netted, ownByPeriod } = usage;
  const totals = { importWh, exportWh, productionWh: productionWh ?? 0, loadWh: loadWh ?? 0 };
  if (byPeriod === null && Object.keys(netted).length === 0) return { ...totals, split: null };
  const ids = plan.calendar.periods.map((period) => period.id);
  const block = (of: '15min' | 'hour') => {
    const given = netted[of] ?? { importWh, exportWh, byPeriod };
    return {
      importWh: given.importWh,
      exportWh: given.exportWh,
      periods: ids.map((id) => given.byPeriod?.[id] ?? null),
    };
  };
  return {
    ...totals,
    split: {
      periods: ids.map((id) => {
        const flow = byPeriod?.[id];
        const own = ownByPeriod?.[id];
        return flow && own ? { ...flow, ...own } : null;
      }),
      netted: { hour: block('hour'), '15min': block('15min') },
    },
  };
}

type Seen = { compiled: number; exact: number; refused: number };

/** Settles the cycles both ways in turn and compares due, balances, averages, caps and the banks' worth; counts how each went. */
function compareBoth(plan: RatePlan, opening: Opening, given: readonly CycleUsage[], apart: boolean, seen: Seen): void {
  const cycles = given.map((usage) => totalsOf(plan, usage));
  const slots = newSlots();
  const compiled: (CompiledCycle | null)[] = cycles.map(({ from, to, kW }) =>
    compileCycle({ plan, from, to, kW, incentiveApart: apart, slots }),
  );
  if (compiled.some((cycle) => cycle === null)) {
    seen.exact += 1;
    return;
  }
  const state = stateOf(slots, opening);
  let held: Opening = { ...opening, balanceCents: null };
  for (const [at, usage] of cycles.entries()) {
    const cycle = compiled[at];
    if (!cycle) throw new Error('not compiled');
    const full = settleAmounts(plan, held, usage);
    const quick = orRefusal(() => dueOf(cycle, compiledUsage(plan, usage), state));
    expect(quick.ok).toBe(full.ok);
    if (!full.ok || !quick.ok) {
      seen.refused += 1;
      return;
    }
    held = full.value.closing;
    expect(quick.value).toBe(electricDue(full.value.settlement, apart));
    expect(bankCents(cycle, state)).toBe(bankWorth(plan, held, usage.from, usage.to));
    for (const [id, place] of slots.banks) {
      expect(compare(state.balances[place] ?? 0, wholeBalance(held.banks[id] ?? '0'))).toBe(0);
      const counted = held.usageSinceTrueUp[id];
      if (counted) {
        expect(state.usageCycles[place]).toBe(counted.cycles);
        expect(compare(state.usageKwh[place] ?? 0, qtyOfText(counted.kWh))).toBe(0);
      }
    }
    for (const [credit, used] of Object.entries(held.capUsed)) {
      for (const [key, amount] of Object.entries(used)) {
        const place = slots.caps.get(capName(credit, key));
        if (place !== undefined) expect((state.capUsed[place] ?? 0) * 10).toBe(qtyOfText(amount));
      }
    }
  }
  seen.compiled += 1;
}

describe('a compiled settlement', () => {
  it('gives the cents, balances, averages and caps of the full one, whatever the plan and the cycles', () => {
    const seen: Seen = { compiled: 0, exact: 0, refused: 0 };
    fc.assert(
      fc.property(wholeCyclePlans, usages, fc.boolean(), (plan, cycles, apart) => {
        compareBoth(plan, EMPTY_OPENING, cycles, apart, seen);
      }),
      { numRuns: PROPERTY_RUNS },
    );
    // Most plans without lots are compiled; the others are settled in full.
    expect(seen.compiled).toBeGreaterThan(PROPERTY_RUNS / 3);
  }, 120_000);

  it('gives them by period and after netting in clock blocks too', () => {
    const seen: Seen = { compiled: 0, exact: 0, refused: 0 };
    fc.assert(
      fc.property(statedPlans, usages, fc.boolean(), (plan, cycles, apart) => {
        compareBoth(plan, EMPTY_OPENING, cycles, apart, seen);
      }),
      { numRuns: PROPERTY_RUNS },
    );
    // Left to the full settlement: lots, balances by period and tiers over periods.
    expect(seen.compiled).toBeGreaterThan(PROPERTY_RUNS / 4);
    expect(seen.refused).toBeLessThan(PROPERTY_RUNS / 10);
  }, 120_000);

  it('gives the due of every vector it can be compiled for, from the vector’s own opening', () => {
    const seen: Seen = { compiled: 0, exact: 0, refused: 0 };
    for (const vector of readVectors().vectors) {
      const plan = vectorPlan(vector.plan);
      const cycles = vector.cycles.map(({ inputs }) => vectorUsage(inputs));
      for (const apart of [false, true]) compareBoth(plan, vectorOpening(vector.opening), cycles, apart, seen);
    }
    expect(seen.compiled).toBeGreaterThan(0);
  });
});
