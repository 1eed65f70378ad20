import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { type SettledAmounts, settle, settleAmounts } from '#shared/settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING, type Opening } from '#shared/settlement/settlement.ts';
import { cents } from '#shared/units/cents.ts';
import { banksConserve, centsConserve, dollarsConserve, kWhConserve } from '#tests/support/conserves.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { houses } from '#tests/unit/settlement/arbitrary-usage.ts';
import { ALL_FEATURES, featuresOf } from '#tests/unit/settlement/plan-features.ts';
import { settled } from '#tests/unit/settlement/plans.ts';

// Source of these rules: the rate plan's own page, “Order in a cycle” and “Opening, inputs, result” (close = open + earned − used − expired − paid;
// amount due = sum of the lines in due; settling is a pure function of plan, opening and inputs).

const runs = { numRuns: PROPERTY_RUNS };
const opening: Opening = { ...EMPTY_OPENING, balanceCents: cents(0) };

function settledInTurn(of: RatePlan, cycles: readonly CycleUsage[]): SettledAmounts[] {
  let held = opening;
  return cycles.map((cycle) => {
    const made = taken(settleAmounts(of, held, cycle));
    held = made.closing;
    return made;
  });
}

function frozen<T>(value: T): T {
  if (typeof value === 'object' && value !== null && !Object.isFrozen(value)) {
    Object.freeze(value);
    for (const inner of Object.values(value)) frozen(inner);
  }
  return value;
}

describe('whatever the plan and the cycles', () => {
  test('kWh and dollars are conserved in every bank and between bank, meter and bill, and the rounded lines in due are the amount due', () => {
    const counts = new Map<string, number>(ALL_FEATURES.map((feature) => [feature, 0]));
    fc.assert(
      fc.property(houses, ({ plan, cycles }) => {
        const made = settledInTurn(plan, cycles);
        expect(made).toHaveLength(cycles.length);
        banksConserve(made);
        dollarsConserve(plan, made);
        kWhConserve(plan, cycles, made);
        centsConserve(made);
        for (const feature of new Set(featuresOf(plan, cycles, made)))
          counts.set(feature, (counts.get(feature) ?? 0) + 1);
      }),
      runs,
    );
    // With fewer runs, as under mutation testing, a feature may not come up.
    const least = PROPERTY_RUNS < 1000 ? 0 : 1;
    for (const [feature, count] of counts) expect.soft(count, feature).toBeGreaterThanOrEqual(least);
  }, 120_000);

  test('every working gives its figure, and cycles settled one by one come out as cycles settled together', () => {
    fc.assert(
      fc.property(houses, ({ plan, cycles }) => {
        const together = taken(settle(plan, opening, cycles));
        let held = opening;
        const apart = cycles.map((cycle) => {
          // Throws unless every working gives its figure.
          const one = settled(plan, cycle, held);
          held = one.closing;
          return one.settlement;
        });
        expect(JSON.stringify([apart, held])).toBe(JSON.stringify([together.settlements, together.closing]));
      }),
      runs,
    );
  }, 120_000);

  test('settling is pure: the same twice, last cycle first, on values that cannot be changed, on a plan read again, however its rows are ordered', () => {
    fc.assert(
      fc.property(houses, fc.array(fc.nat(1000), { minLength: 7, maxLength: 7 }), ({ plan, cycles }, order) => {
        const some = frozen(cycles.slice(0, 2));
        const alone = (of: RatePlan) => (cycle: CycleUsage) =>
          JSON.stringify(taken(settleAmounts(of, frozen(opening), cycle)));
        const first = some.map(alone(frozen(plan)));
        const again = taken(parsePlan(JSON.parse(JSON.stringify(plan))));
        const mixed = {
          ...again,
          charges: again.charges.map((item) => ({ ...item, rates: shuffle(item.rates, order) })),
          credits: again.credits.map((item) => ({ ...item, rates: item.rates && shuffle(item.rates, order) })),
        };
        expect(some.toReversed().map(alone(plan)).toReversed()).toEqual(first);
        expect(some.map(alone(mixed))).toEqual(first);
      }),
      runs,
    );
  }, 120_000);
});

function shuffle<T>(items: readonly T[], order: readonly number[]): T[] {
  const keyed = items.map((item, at) => ({ item, key: order[at % order.length] ?? 0 }));
  return keyed.sort((a, b) => a.key - b.key).map(({ item }) => item);
}
