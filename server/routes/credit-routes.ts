import { creditApi } from '#shared/api/credit.ts';
import { type Result, succeed } from '#shared/problem.ts';
import type { Actor, Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { addPaper, readPaper } from '../services/credit/papers.ts';
import { putYear, removeYear } from '../services/credit/put-year.ts';
import { creditSummaryCsv } from '../services/credit/summary-csv.ts';
import { viewCredit } from '../services/credit/view-credit.ts';

export function creditRoutes(api: Api, deps: Deps): void {
  const viewAfter = (done: Result<null>, { householdId }: Actor) =>
    done.ok ? succeed(viewCredit(deps, householdId)) : done;

  api.household(creditApi.view, ({ actor }) => succeed(viewCredit(deps, actor.householdId)));
  api.household(creditApi.putYear, ({ actor, body, param }) =>
    viewAfter(putYear(deps, actor, param('taxYear'), body), actor),
  );
  api.household(creditApi.removeYear, ({ actor, param }) =>
    viewAfter(removeYear(deps, actor, param('taxYear')), actor),
  );
  api.upload(creditApi.addPaper, ({ actor, file }) => viewAfter(addPaper(deps, actor, file), actor));
  api.download(creditApi.paper, ({ actor, param }) => readPaper(deps, actor, param('documentId')));
  api.download(creditApi.summaryCsv, ({ actor }) => succeed(creditSummaryCsv(deps, actor.householdId)));
}
