import { peopleApi } from '#shared/api/people.ts';
import { succeed } from '#shared/problem.ts';
import type { Sessions } from '../auth/sessions.ts';
import type { Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import type { Limits } from '../http/limits.ts';
import { changePassword } from '../services/change-password.ts';
import { exportHousehold } from '../services/export-household.ts';
import { addPerson, listPeople, removePerson } from '../services/people.ts';

export function peopleRoutes(api: Api, deps: Deps, sessions: Sessions, limits: Limits): void {
  api.household(peopleApi.list, ({ actor }) => succeed(listPeople(deps, actor)));
  api.household(peopleApi.add, ({ actor, body }) => addPerson(deps, actor, body));
  api.household(peopleApi.remove, ({ actor, param }) => {
    const removed = removePerson(deps, actor, param('userId'));
    return removed.ok ? succeed(undefined) : removed;
  });

  api.signedIn(
    peopleApi.changePassword,
    async ({ body, session, setCookie }) => {
      const changed = await changePassword(deps, session.user.id, body);
      if (!changed.ok) return changed;
      await sessions.closeAll(session.user.id);
      setCookie(await sessions.open(session.user.id, null));
      return succeed(undefined);
    },
    limits.password,
  );

  api.download(peopleApi.exportHousehold, ({ actor }) => {
    const exported = exportHousehold(deps, actor.householdId);
    return succeed({
      fileName: `gablebook-household-${exported.today}.json`,
      contentType: 'application/json; charset=utf-8',
      body: JSON.stringify(exported),
    });
  });
}
