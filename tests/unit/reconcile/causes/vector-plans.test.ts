import { describe, expect, test } from 'vitest';
import type { CauseCycle } from '#shared/reconcile/causes/cause.ts';
import type { Edit, Place } from '#shared/reconcile/causes/edit.ts';
import { findCauses } from '#shared/reconcile/causes/find-causes.ts';
import { HYPOTHESES } from '#shared/reconcile/causes/registry.ts';
import { billedSums } from '#shared/reconcile/causes/reproduces.ts';
import { type SettledCycle, settleCycle } from '#shared/settlement/settle.ts';
import type { CycleUsage, Opening } from '#shared/settlement/settlement.ts';
import { day } from '#shared/units/day.ts';
import {
  readVectors,
  taken,
  type Vector,
  vectorOpening,
  vectorPlan,
  vectorUsage,
} from '#tests/support/netmetering-adapter.ts';
import { statementOf } from './billed-house.ts';

/** Cycles to plant mistakes in: a roll-over of the dials in winter, a meter exchange in early summer. */
const CYCLES = [3, 8];
/** One ratio stands for all multipliers here: they differ in nothing but the number. */
const MULTIPLIER = '10';

type Given = { opening: Opening; cycle: CauseCycle; truth: SettledCycle };

function cyclesOf(vector: Vector): Given[] {
  const plan = vectorPlan(vector.plan);
  let opening = vectorOpening(vector.opening);
  return vector.cycles.map(({ inputs }) => {
    const usage = vectorUsage(inputs);
    const truth = taken(settleCycle(plan, opening, usage));
    const reads = (inputs.reads ?? []).map((read) => {
      const { from, to } = { from: inputs.from, to: inputs.to, ...read };
      return { ...read, from: day(from), to: day(to) };
    });
    const given = { opening, truth, cycle: { plan, usage, reads, billed: statementOf(truth.settlement, usage) } };
    opening = truth.closing;
    return given;
  });
}

/** Every way in which every mistake could be made in the cycle, whatever was billed. */
function everyEdit({ opening, cycle, truth }: Given): { cause: string; edit: Edit }[] {
  const silent = { ...cycle.billed, importWh: null, exportWh: null, productionWh: null };
  const place: Place = {
    index: 0,
    cycle: { ...cycle, billed: silent },
    opening,
    truth,
    sums: billedSums(silent),
    differs: new Set(),
    mayDiffer: () => true,
    planBefore: null,
  };
  return HYPOTHESES.flatMap(({ cause, attempts }) =>
    attempts({ places: [place], firstOff: 0, opening }).flatMap((attempt) =>
      attempt.map((made) => ({ cause, edit: made.edit })),
    ),
  ).filter(({ edit }) => (edit.found.multiplier ?? MULTIPLIER) === MULTIPLIER);
}

/** The statement that comes of a mistake; null where it cannot be made, or changes nothing. */
function billedWith(edit: Edit, { opening, cycle }: Given): CauseCycle['billed'] | null {
  const usage: CycleUsage = edit.usage ?? cycle.usage;
  const settled = settleCycle(edit.plan ?? cycle.plan, edit.opening ? edit.opening(opening) : opening, usage);
  if (!settled.ok) return null;
  const made = edit.after ? edit.after(settled.value) : settled.value;
  if (made === null) return null;
  const { days, banks, amountDueCents } = made.settlement;
  const settlement = { ...settled.value.settlement, days, banks, amountDueCents };
  const lines = made.settlement.lines.map((line) => ({ ...line }));
  const payouts = made.settlement.payouts.map(({ component, amountCents }) => ({ component, amountCents }));
  const statement = { ...statementOf(settlement, usage), lines, payouts };
  const money = (one: CauseCycle['billed']) =>
    JSON.stringify([
      (one.lines ?? [])
        .filter((line) => line.amountCents !== 0)
        .map(({ component, quantity, amountCents }) => [component, quantity, amountCents]),
      one.banks,
      one.payouts,
      one.amountDueCents,
    ]);
  return money(statement) === money(cycle.billed) ? null : statement;
}

/**
 * Source: the plans and meters of this project's own vectors. What is planted comes of the hypotheses themselves, so this does not show that they are
 * the right ones (the error fixtures and the planted houses do), but that under every kind of plan each is found again, and no other with it.
 */
describe.each(readVectors().vectors)('the plan of $id', (vector) => {
  const given = cyclesOf(vector);

  test('billed rightly, no cycle has a cause, alone or among the others', () => {
    for (const { opening, cycle } of given) expect(findCauses({ opening, cycles: [cycle] })).toEqual([]);
    expect(findCauses({ opening: vectorOpening(vector.opening), cycles: given.map((one) => one.cycle) })).toEqual([]);
  });

  test('billed with any one mistake, that mistake alone is found', () => {
    let planted = 0;
    for (const at of CYCLES) {
      const one = given[at];
      if (!one) continue;
      for (const { cause, edit } of everyEdit(one)) {
        const billed = billedWith(edit, one);
        if (billed === null) continue;
        planted += 1;
        const found = findCauses({ opening: one.opening, cycles: [{ ...one.cycle, billed }] });
        expect
          .soft(
            found.map((each) => each.cause),
            `${cause} ${edit.key} in cycle ${at + 1}`,
          )
          .toEqual([cause]);
      }
    }
    expect(planted).toBeGreaterThan(0);
  }, 30_000);
});
