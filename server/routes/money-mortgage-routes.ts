import { moneyMortgageApi } from '#shared/api/money-mortgage.ts';
import { type Result, succeed } from '#shared/problem.ts';
import type { Actor, Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { mortgageScheduleCsv } from '../services/money/mortgage-csv.ts';
import {
  addAppraisal,
  addMortgageBalance,
  putMortgageEnd,
  putMortgagePremiums,
  putMortgageRecord,
  removeAppraisal,
  removeMortgageBalance,
} from '../services/money/mortgage-record.ts';
import { viewMortgage } from '../services/money/mortgage-view.ts';

export function moneyMortgageRoutes(api: Api, deps: Deps): void {
  const viewAfter = (done: Result<null>, { householdId }: Actor) =>
    done.ok ? succeed(viewMortgage(deps, householdId)) : done;

  api.household(moneyMortgageApi.view, ({ actor }) => succeed(viewMortgage(deps, actor.householdId)));
  api.household(moneyMortgageApi.addAppraisal, ({ actor, body }) => viewAfter(addAppraisal(deps, actor, body), actor));
  api.household(moneyMortgageApi.removeAppraisal, ({ actor, param }) =>
    viewAfter(removeAppraisal(deps, actor, param('id')), actor),
  );
  api.household(moneyMortgageApi.addBalance, ({ actor, body }) =>
    viewAfter(addMortgageBalance(deps, actor, body), actor),
  );
  api.household(moneyMortgageApi.removeBalance, ({ actor, param }) =>
    viewAfter(removeMortgageBalance(deps, actor, param('id')), actor),
  );
  api.household(moneyMortgageApi.putRecord, ({ actor, body }) =>
    viewAfter(putMortgageRecord(deps, actor, body), actor),
  );
  api.household(moneyMortgageApi.putEnd, ({ actor, body }) => viewAfter(putMortgageEnd(deps, actor, body), actor));
  api.household(moneyMortgageApi.putPremiums, ({ actor, body }) =>
    viewAfter(putMortgagePremiums(deps, actor, body), actor),
  );
  api.download(moneyMortgageApi.scheduleCsv, ({ actor }) => mortgageScheduleCsv(deps, actor.householdId));
}
