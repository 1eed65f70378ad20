import { sessionApi } from '#shared/api/session.ts';
import { succeed } from '#shared/problem.ts';
import type { Sessions } from '../auth/sessions.ts';
import type { Deps } from '../deps.ts';
import type { Api } from '../http/api.ts';
import type { Limits } from '../http/limits.ts';
import { sessionViewOf, signIn } from '../services/sign-in.ts';
import { signUp } from '../services/sign-up.ts';

export function sessionRoutes(api: Api, deps: Deps, sessions: Sessions, limits: Limits): void {
  api.anyone(sessionApi.current, ({ session }) =>
    succeed(session === null ? null : sessionViewOf(deps.db, session.user.id)),
  );

  api.anyone(
    sessionApi.signIn,
    async ({ body, cookie, setCookie }) => {
      const result = await signIn(deps, body);
      if (result.ok) setCookie(await sessions.open(result.value.user.id, cookie));
      return result;
    },
    limits.signIn,
  );

  api.signedIn(sessionApi.signOut, async ({ session, setCookie }) => {
    await sessions.close(session.sessionId);
    setCookie(sessions.blank());
    deps.log('info', 'signed-out', { user: session.user.id });
    return succeed(undefined);
  });

  api.anyone(
    sessionApi.signUp,
    async ({ body, cookie, setCookie }) => {
      const result = await signUp(deps, body);
      if (result.ok) setCookie(await sessions.open(result.value.user.id, cookie));
      return result;
    },
    limits.signUp,
  );
}
