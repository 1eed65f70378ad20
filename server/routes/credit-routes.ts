import { creditApi, creditPaperKindSchema } from '#shared/api/credit.ts';
import { type Result, succeed } from '#shared/problem.ts';
import type { Actor, Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { addPaper, putPaperKind, readPaper } from '../services/credit/papers.ts';
import { putCarriedIn } from '../services/credit/put-carried-in.ts';
import { putCost } from '../services/credit/put-cost.ts';
import { putYear, removeYear } from '../services/credit/put-year.ts';
import { creditSummaryCsv } from '../services/credit/summary-csv.ts';
import { creditSummaryPdf } from '../services/credit/summary-pdf.ts';
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
  api.household(creditApi.putCarriedIn, ({ actor, body }) => viewAfter(putCarriedIn(deps, actor, body), actor));
  api.household(creditApi.putCost, ({ actor, body, param }) =>
    viewAfter(putCost(deps, actor, param('id'), body), actor),
  );
  api.upload(creditApi.addPaper, ({ actor, file, field }) => {
    const kind = creditPaperKindSchema.safeParse(field('kind'));
    return viewAfter(addPaper(deps, actor, file, kind.success ? kind.data : null), actor);
  });
  api.household(creditApi.putPaperKind, ({ actor, body, param }) =>
    viewAfter(putPaperKind(deps, actor, param('documentId'), body.kind), actor),
  );
  api.download(creditApi.paper, ({ actor, param }) => readPaper(deps, actor, param('documentId')));
  api.download(creditApi.summaryCsv, ({ actor }) => succeed(creditSummaryCsv(deps, actor)));
  api.download(creditApi.summaryPdf, async ({ actor }) => succeed(await creditSummaryPdf(deps, actor)));
}
