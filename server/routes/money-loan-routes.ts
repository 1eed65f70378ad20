import { moneyLoanApi } from '#shared/api/money-loan.ts';
import { type Result, succeed } from '#shared/problem.ts';
import type { Actor, Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import {
  addLoanBalance,
  addRefinance,
  putLoanContract,
  removeLoanBalance,
  removeRefinance,
} from '../services/money/loan-contract.ts';
import { loanScheduleCsv } from '../services/money/loan-csv.ts';
import { viewPayoff } from '../services/money/loan-payoff.ts';
import { viewLoan } from '../services/money/loan-view.ts';

export function moneyLoanRoutes(api: Api, deps: Deps): void {
  const viewAfter = (done: Result<null>, { householdId }: Actor) =>
    done.ok ? succeed(viewLoan(deps, householdId)) : done;

  api.household(moneyLoanApi.view, ({ actor }) => succeed(viewLoan(deps, actor.householdId)));
  api.household(moneyLoanApi.putContract, ({ actor, body }) => viewAfter(putLoanContract(deps, actor, body), actor));
  api.household(moneyLoanApi.addBalance, ({ actor, body }) => viewAfter(addLoanBalance(deps, actor, body), actor));
  api.household(moneyLoanApi.removeBalance, ({ actor, param }) =>
    viewAfter(removeLoanBalance(deps, actor, param('id')), actor),
  );
  api.household(moneyLoanApi.addRefinance, ({ actor, body }) => viewAfter(addRefinance(deps, actor, body), actor));
  api.household(moneyLoanApi.removeRefinance, ({ actor, param }) =>
    viewAfter(removeRefinance(deps, actor, param('id')), actor),
  );
  api.household(moneyLoanApi.payoff, ({ actor, dayParam }) => viewPayoff(deps, actor.householdId, dayParam('on')));
  api.download(moneyLoanApi.scheduleCsv, ({ actor }) => loanScheduleCsv(deps, actor.householdId));
}
