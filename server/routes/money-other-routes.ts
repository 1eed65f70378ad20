import { moneyOtherApi } from '#shared/api/money-other.ts';
import { moneyPapersApi } from '#shared/api/money-papers.ts';
import { type Result, succeed } from '#shared/problem.ts';
import type { Actor, Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { readPaper } from '../services/credit/papers.ts';
import { changeCost } from '../services/money/costs.ts';
import { putLease, removeLease } from '../services/money/lease.ts';
import { linkPaper } from '../services/money/link-paper.ts';
import {
  addOtherLoan,
  addOtherPayment,
  changeOtherLoan,
  removeOtherLoan,
  removeOtherPayment,
} from '../services/money/other-loans.ts';
import { addMoneyPaper, removeMoneyPaper } from '../services/money/papers.ts';
import { viewOtherMoney } from '../services/money/view-other.ts';
import { viewPapers } from '../services/money/view-papers.ts';

/** Costs that change, other loans, the lease, and the papers behind all figures of Money. */
export function moneyOtherRoutes(api: Api, deps: Deps): void {
  const viewAfter = (done: Result<null>, { householdId }: Actor) =>
    done.ok ? succeed(viewOtherMoney(deps, householdId)) : done;
  const papersAfter = (done: Result<null>, { householdId }: Actor) =>
    done.ok ? succeed(viewPapers(deps, householdId)) : done;

  api.household(moneyOtherApi.view, ({ actor }) => succeed(viewOtherMoney(deps, actor.householdId)));
  api.household(moneyOtherApi.changeCost, ({ actor, body, param }) =>
    viewAfter(changeCost(deps, actor, param('id'), body), actor),
  );
  api.household(moneyOtherApi.addLoan, ({ actor, body }) => viewAfter(addOtherLoan(deps, actor, body), actor));
  api.household(moneyOtherApi.changeLoan, ({ actor, body, param }) =>
    viewAfter(changeOtherLoan(deps, actor, param('id'), body), actor),
  );
  api.household(moneyOtherApi.removeLoan, ({ actor, param }) =>
    viewAfter(removeOtherLoan(deps, actor, param('id')), actor),
  );
  api.household(moneyOtherApi.addPayment, ({ actor, body, param }) =>
    viewAfter(addOtherPayment(deps, actor, param('id'), body), actor),
  );
  api.household(moneyOtherApi.removePayment, ({ actor, param }) =>
    viewAfter(removeOtherPayment(deps, actor, param('id'), param('paymentId')), actor),
  );
  api.household(moneyOtherApi.putLease, ({ actor, body }) => viewAfter(putLease(deps, actor, body), actor));
  api.household(moneyOtherApi.removeLease, ({ actor }) => viewAfter(removeLease(deps, actor), actor));

  api.household(moneyPapersApi.list, ({ actor }) => succeed(viewPapers(deps, actor.householdId)));
  api.upload(moneyPapersApi.add, ({ actor, file }) => {
    const added = addMoneyPaper(deps, actor, file);
    return added.ok ? succeed({ ...added.value, view: viewPapers(deps, actor.householdId) }) : added;
  });
  api.household(moneyPapersApi.link, ({ actor, body }) => papersAfter(linkPaper(deps, actor, body), actor));
  api.download(moneyPapersApi.paper, ({ actor, param }) => readPaper(deps, actor, param('documentId')));
  api.household(moneyPapersApi.remove, ({ actor, param }) =>
    papersAfter(removeMoneyPaper(deps, actor, param('documentId')), actor),
  );
}
