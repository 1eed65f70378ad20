import { describe, expect, test } from 'vitest';
import { findCauses } from '#shared/reconcile/causes/find-causes.ts';
import { settleCycle } from '#shared/settlement/settle.ts';
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
import { billedWith, everyEdit, type Given } from './plant.ts';

/** Cycles to plant mistakes in: a roll-over of the dials in winter, a meter exchange in early summer. */
const CYCLES = [3, 8];
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
