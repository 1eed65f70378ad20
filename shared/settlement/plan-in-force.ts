import type { PlanInForce } from '../facts/household.ts';
import type { Day } from '../units/day.ts';

/**
 * The plan a cycle is settled by: a plan starts with the first cycle that begins on or after its `from`, and a cycle before the first plan takes
 * the first. Null where there is none.
 */
export function planFor(plans: readonly PlanInForce[], cycleFrom: Day): PlanInForce | null {
  let found: PlanInForce | null = null;
  let first: PlanInForce | null = null;
  for (const plan of plans) {
    if (plan.from <= cycleFrom && (found === null || plan.from >= found.from)) found = plan;
    if (first === null || plan.from < first.from) first = plan;
  }
  return found ?? first;
}
