import { tryApi } from '#shared/api/try.ts';
import { succeed } from '#shared/problem.ts';
import type { Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { keepScenario, removeScenario } from '../services/try/scenarios.ts';
import { viewTry } from '../services/try/view-try.ts';

/** Try a change: what the browser projects from, and the changes kept by name. Nothing here touches the record. */
export function tryRoutes(api: Api, deps: Deps): void {
  api.household(tryApi.view, ({ actor }) => succeed(viewTry(deps, actor.householdId)));
  api.household(tryApi.keep, ({ actor, body, param }) => {
    const done = keepScenario(deps, actor, param('id'), body);
    return done.ok ? succeed(viewTry(deps, actor.householdId)) : done;
  });
  api.household(tryApi.remove, ({ actor, param }) => {
    const done = removeScenario(deps, actor, param('id'));
    return done.ok ? succeed(viewTry(deps, actor.householdId)) : done;
  });
}
