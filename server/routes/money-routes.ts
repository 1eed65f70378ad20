import { moneyApi } from '#shared/api/money.ts';
import { type Result, succeed } from '#shared/problem.ts';
import type { Actor, Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { addCost, removeCost } from '../services/money/costs.ts';
import { addLoanPayment, addReceipt, removeLoanPayment, removeReceipt } from '../services/record-money.ts';
import { viewMoney } from '../services/view-money.ts';

export function moneyRoutes(api: Api, deps: Deps): void {
  const viewAfter = (done: Result<null>, { householdId }: Actor) =>
    done.ok ? succeed(viewMoney(deps, householdId)) : done;

  api.household(moneyApi.view, ({ actor }) => succeed(viewMoney(deps, actor.householdId)));
  api.household(moneyApi.addLoanPayment, ({ actor, body }) => viewAfter(addLoanPayment(deps, actor, body), actor));
  api.household(moneyApi.removeLoanPayment, ({ actor, param }) =>
    viewAfter(removeLoanPayment(deps, actor, param('id')), actor),
  );
  api.household(moneyApi.addReceipt, ({ actor, body }) => viewAfter(addReceipt(deps, actor, body), actor));
  api.household(moneyApi.removeReceipt, ({ actor, param }) =>
    viewAfter(removeReceipt(deps, actor, param('id')), actor),
  );
  api.household(moneyApi.addCost, ({ actor, body }) => viewAfter(addCost(deps, actor, body), actor));
  api.household(moneyApi.removeCost, ({ actor, param }) => viewAfter(removeCost(deps, actor, param('id')), actor));
}
