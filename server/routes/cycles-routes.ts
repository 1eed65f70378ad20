import { cyclesApi } from '#shared/api/cycles.ts';
import { succeed } from '#shared/problem.ts';
import type { Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { acceptDifference, withdrawAcceptance } from '../services/accept-difference.ts';
import { correctStatement } from '../services/correct-statement.ts';
import { readPaper } from '../services/credit/papers.ts';
import { listCycles } from '../services/list-cycles.ts';
import { viewCycle } from '../services/view-cycle.ts';

export function cyclesRoutes(api: Api, deps: Deps): void {
  api.household(cyclesApi.list, ({ actor }) => succeed(listCycles(deps, actor.householdId)));
  api.household(cyclesApi.one, ({ actor, dayParam }) => viewCycle(deps, actor.householdId, dayParam('to')));
  api.download(cyclesApi.paper, ({ actor, param }) => readPaper(deps, actor, param('documentId')));
  api.household(cyclesApi.accept, ({ actor, body, dayParam }) => {
    const saved = acceptDifference(deps, actor, { to: dayParam('to'), ...body });
    return saved.ok ? viewCycle(deps, actor.householdId, dayParam('to')) : saved;
  });
  api.household(cyclesApi.withdrawAccept, ({ actor, body, dayParam }) => {
    const saved = withdrawAcceptance(deps, actor, { to: dayParam('to'), ...body });
    return saved.ok ? viewCycle(deps, actor.householdId, dayParam('to')) : saved;
  });
  api.household(cyclesApi.correct, ({ actor, body, dayParam }) =>
    correctStatement(deps, actor, { to: dayParam('to'), ...body }),
  );
}
