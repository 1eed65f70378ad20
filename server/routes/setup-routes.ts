import { setupApi } from '#shared/api/setup.ts';
import { type Result, succeed } from '#shared/problem.ts';
import type { Actor, Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { createHousehold } from '../services/create-household.ts';
import {
  saveBefore,
  saveCash,
  saveCredit,
  saveHouse,
  saveIncentive,
  saveLoan,
  saveMortgage,
  savePlans,
  saveRoof,
  skipStep,
} from '../services/save-step.ts';
import { viewSetup } from '../services/view-setup.ts';

export function setupRoutes(api: Api, deps: Deps): void {
  const viewAfter = (saved: Result<null>, { householdId }: Actor) =>
    saved.ok ? succeed(viewSetup(deps, householdId)) : saved;

  api.signedIn(setupApi.create, ({ session, body }) => createHousehold(deps, session.user, body));
  api.household(setupApi.view, ({ actor }) => succeed(viewSetup(deps, actor.householdId)));
  api.household(setupApi.house, ({ actor, body }) => viewAfter(saveHouse(deps, actor, body), actor));
  api.household(setupApi.roof, ({ actor, body }) => viewAfter(saveRoof(deps, actor, body), actor));
  api.household(setupApi.plan, ({ actor, body }) => viewAfter(savePlans(deps, actor, body), actor));
  api.household(setupApi.before, ({ actor, body }) => viewAfter(saveBefore(deps, actor, body), actor));
  api.household(setupApi.loan, ({ actor, body }) => viewAfter(saveLoan(deps, actor, body), actor));
  api.household(setupApi.mortgage, ({ actor, body }) => viewAfter(saveMortgage(deps, actor, body), actor));
  api.household(setupApi.credit, ({ actor, body }) => viewAfter(saveCredit(deps, actor, body), actor));
  api.household(setupApi.incentive, ({ actor, body }) => viewAfter(saveIncentive(deps, actor, body), actor));
  api.household(setupApi.cash, ({ actor, body }) => viewAfter(saveCash(deps, actor, body), actor));
  api.household(setupApi.skip, ({ actor, body }) => viewAfter(skipStep(deps, actor, body.step), actor));
}
