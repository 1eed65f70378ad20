import type { RatePlan } from './plan.ts';

const made = new WeakMap<RatePlan, RatePlan>();

/**
 * A plan to settle on totals: where prices or seasons change interval by interval, without intervals they change by days (rate-plan.md, `rateChangeBy`, `seasonBy`). The
 * same plan gives the same object.
 */
export function planByDays(plan: RatePlan): RatePlan {
  if (plan.rateChangeBy !== 'intervals' && plan.seasonBy !== 'intervals') return plan;
  const known = made.get(plan);
  if (known) return known;
  const changed: RatePlan = {
    ...plan,
    rateChangeBy: plan.rateChangeBy === 'intervals' ? 'days' : plan.rateChangeBy,
    seasonBy: plan.seasonBy === 'intervals' ? 'days' : plan.seasonBy,
  };
  made.set(plan, changed);
  return changed;
}
