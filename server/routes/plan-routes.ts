import { planApi } from '#shared/api/plan.ts';
import { succeed } from '#shared/problem.ts';
import type { Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { workExample } from '../services/plan/example.ts';
import { tryPlan } from '../services/plan/trial.ts';

/** The example month and the trial: both settle, neither stores. Plans are saved by the set-up. */
export function planRoutes(api: Api, deps: Deps): void {
  api.household(planApi.example, ({ actor, body }) => succeed(workExample(deps, actor.householdId, body)));
  api.household(planApi.trial, ({ actor, body }) => tryPlan(deps, actor.householdId, body));
}
