import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { BilledCycle, CauseId, TrueRead } from '#shared/reconcile/causes/cause.ts';
import type { Edit } from '#shared/reconcile/causes/edit.ts';
import { findCauses } from '#shared/reconcile/causes/find-causes.ts';
import { billedOtherwise, billedSums } from '#shared/reconcile/causes/reproduces.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { settleCycle } from '#shared/settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { houses } from '#tests/unit/settlement/arbitrary-usage.ts';
import { readOf, statementOf } from './billed-house.ts';
import { billedWith, everyEdit, type Given } from './plant.ts';

/** A fifth of the usual runs: each tries every mistake. */
const RUNS = Math.ceil(PROPERTY_RUNS / 5);

/** The second cycle of a drawn house, billed as it should be, with reads: its export meter exchanged on its second day, its import past all nines. */
function givenOf(plan: RatePlan, cycles: readonly CycleUsage[]): Given {
  const [first, usage] = cycles;
  if (!first || !usage) throw new Error('a house has two cycles');
  const opening = { ...taken(settleCycle(plan, EMPTY_OPENING, first)).closing };
  const truth = taken(settleCycle(plan, opening, usage));
  return {
    opening,
    truth,
    cycle: { plan, usage, reads: readsOf(usage), billed: statementOf(truth.settlement, usage) },
  };
}

function readsOf({ from, to, importWh, exportWh, productionWh }: CycleUsage): TrueRead[] {
  return [
    readOf('import', from, to, 99_990, importWh / 1000),
    readOf('export', from, to, 17, exportWh / 1000),
    readOf('production', from, to, 5000, Number(productionWh) / 1000, { meter: 'roof' }),
  ];
}

function paidCents({ amountDueCents, payouts }: BilledCycle): number {
  return Number(amountDueCents) - (payouts ?? []).reduce((sum, payout) => sum + payout.amountCents, 0);
}

/** One of the mistakes that could be made in the cycle: any cause as often as any other. */
function pickedFrom(edits: ReturnType<typeof everyEdit>, pick: number): (typeof edits)[number] | null {
  const causes = [...new Set(edits.map(({ cause }) => cause))];
  const own = edits.filter(({ cause }) => cause === causes[pick % causes.length]);
  return own[Math.floor(pick / causes.length) % own.length] ?? null;
}

/**
 * Whether all that a mistake is said to touch is billed otherwise. Where a bank has taken all kWh of a charge, its price shows in a tax alone; what
 * dollars pay shows in their bank; a Wh that went lost shows in no digit printed.
 */
function shows({ found }: Edit, given: Given, billed: BilledCycle): boolean {
  const differs = billedOtherwise(billedSums(billed), given.truth);
  const paying = given.cycle.plan.banks.find((bank) => bank.id === found.bank);
  const ids =
    paying?.unit === 'USD' ? paying.id : [found.items, found.charges].filter((of) => of !== undefined).join(', ');
  return differs.size > 0 && (ids === '' || ids.split(', ').every((id) => differs.has(id)));
}

// What is planted comes of the hypotheses themselves: this shows that under any plan each is found again, and nothing that costs other cents.
test('a mistake planted in any house is among what is found, and all that is found costs the cents that were billed too much', () => {
  const planted = new Map<CauseId, number>();
  fc.assert(
    fc.property(houses, fc.nat(), ({ plan, cycles }, pick) => {
      const given = givenOf(plan, cycles);
      expect(findCauses({ opening: given.opening, cycles: [given.cycle] })).toEqual([]);
      const picked = pickedFrom(everyEdit(given), pick);
      const billed = picked && billedWith(picked.edit, given);
      if (!picked || !billed) return;
      const found = findCauses({ opening: given.opening, cycles: [{ ...given.cycle, billed }] });
      const over = paidCents(billed) - paidCents(given.cycle.billed);
      expect(found.map((one) => [one.cause, one.overbilledCents])).toEqual(found.map((one) => [one.cause, over]));
      if (!shows(picked.edit, given, billed)) return;
      planted.set(picked.cause, (planted.get(picked.cause) ?? 0) + 1);
      expect(
        found.map((one) => one.cause),
        picked.edit.key,
      ).toContain(picked.cause);
    }),
    { numRuns: RUNS },
  );
  if (RUNS >= 200) expect(planted.size).toBeGreaterThan(8);
}, 180_000);
