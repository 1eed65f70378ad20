import { logApi } from '#shared/api/log.ts';
import { intervalChannel } from '#shared/facts/papers.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import type { Actor, Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import { addProductionFile, changeMapping } from '../services/log/add-production.ts';
import {
  addStatementFile,
  addTypedStatement,
  changeStatement,
  removeStatement,
} from '../services/log/add-statement.ts';
import { discardDraft, removeFile, setKeepGoodRows } from '../services/log/change-files.ts';
import { postDraft } from '../services/log/post-draft.ts';
import { statementTemplate } from '../services/log/statement-template.ts';
import { viewDraft } from '../services/log/view-draft.ts';

export function logRoutes(api: Api, deps: Deps): void {
  const viewAfter = (done: Result<null>, actor: Actor) => (done.ok ? succeed(viewDraft(deps, actor)) : done);

  api.household(logApi.draft, ({ actor }) => succeed(viewDraft(deps, actor)));
  api.upload(logApi.addStatementFile, ({ actor, file }) => viewAfter(addStatementFile(deps, actor, file), actor));
  api.household(logApi.addStatement, ({ actor, body }) =>
    viewAfter(addTypedStatement(deps, actor, body.statement), actor),
  );
  api.household(logApi.changeStatement, ({ actor, body, param }) =>
    viewAfter(changeStatement(deps, actor, param('key'), body.statement), actor),
  );
  api.household(logApi.removeStatement, ({ actor, param }) =>
    viewAfter(removeStatement(deps, actor, param('key')), actor),
  );
  api.household(logApi.keepGoodRows, ({ actor, body, param }) =>
    viewAfter(setKeepGoodRows(deps, actor, param('documentId'), body.keep), actor),
  );
  api.household(logApi.removeFile, ({ actor, param }) =>
    viewAfter(removeFile(deps, actor, param('documentId')), actor),
  );
  api.upload(logApi.addProductionFile, ({ actor, file, field }) => {
    const channel = intervalChannel.safeParse(field('channel'));
    if (!channel.success) {
      return fail('bad-request', 'The field `channel` must be production, monitor, import or export.');
    }
    return viewAfter(addProductionFile(deps, actor, file, channel.data), actor);
  });
  api.household(logApi.changeMapping, ({ actor, body, param }) =>
    viewAfter(changeMapping(deps, actor, param('key'), body), actor),
  );
  api.household(logApi.post, ({ actor, body }) => postDraft(deps, actor, body));
  api.household(logApi.discard, ({ actor }) => viewAfter(discardDraft(deps, actor), actor));
  api.anyoneDownload(logApi.template, () => succeed(statementTemplate()));
}
