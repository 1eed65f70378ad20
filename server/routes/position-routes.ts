import { positionApi } from '#shared/api/position.ts';
import { succeed } from '#shared/problem.ts';
import type { Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { viewPosition } from '../services/view-position.ts';

export function positionRoutes(api: Api, deps: Deps): void {
  api.household(positionApi.view, ({ actor }) => succeed(viewPosition(deps, actor.householdId)));
}
