import { outlookApi } from '#shared/api/outlook.ts';
import { positionApi } from '#shared/api/position.ts';
import { succeed } from '#shared/problem.ts';
import type { Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { saveAssumptions } from '../services/save-assumptions.ts';
import { viewOutlook } from '../services/view-outlook.ts';
import { viewPosition } from '../services/view-position.ts';

export function positionRoutes(api: Api, deps: Deps): void {
  api.household(positionApi.view, ({ actor }) => succeed(viewPosition(deps, actor.householdId)));
  api.household(outlookApi.view, ({ actor }) => succeed(viewOutlook(deps, actor.householdId)));
  api.household(outlookApi.saveAssumptions, ({ actor, body }) => {
    const done = saveAssumptions(deps, actor, body);
    return done.ok ? succeed(viewOutlook(deps, actor.householdId)) : done;
  });
}
