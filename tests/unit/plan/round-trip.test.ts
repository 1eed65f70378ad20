import { describe, expect, it } from 'vitest';
import { ratePlanSchema } from '#shared/settlement/plan.ts';
import { planOf } from '#src/ui/plan-form/plan-of.ts';
import { planFormOf } from '#src/ui/plan-form/read-plan.ts';
import { samePlan } from '#src/ui/plan-form/same-plan.ts';
import { readVectors } from '#tests/support/netmetering-adapter.ts';

describe('every plan of the vectors', () => {
  const { vectors, errorFixtures } = readVectors();
  const plans = [...vectors, ...errorFixtures].map(({ id, plan }) => ({ id, plan: ratePlanSchema.parse(plan) }));

  it.each(plans)('$id is said by the form and said back unchanged', ({ plan }) => {
    const form = planFormOf(plan);
    expect(form).not.toBeNull();
    expect(form && samePlan(planOf(form, plan.timeZone), plan)).toBe(true);
  });

  it('counts them: all are said in questions, none only as JSON', () => {
    const said = vectors.filter(({ plan }) => planFormOf(ratePlanSchema.parse(plan)) !== null);
    expect(said.length).toBe(vectors.length);
    expect(vectors.length).toBeGreaterThanOrEqual(20);
  });
});
