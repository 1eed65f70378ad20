import type { Request, Response } from 'express';
import type { Role } from '#shared/api/endpoint.ts';
import type { Sessions, SignedIn } from '../auth/sessions.ts';
import type { Actor, Deps } from '../deps.ts';
import { roleIn } from '../services/role-in.ts';
import { Refused } from './refused.ts';

/** Who is asking, and whether they may. Each guard throws `Refused` where they may not. */
export function createGuards(deps: Deps, sessions: Sessions) {
  const sessionOf = async (req: Request, res: Response): Promise<SignedIn | null> => {
    const found = await sessions.read(req.get('cookie') ?? null);
    if (found === null) return null;
    if (found.setCookie !== null) res.append('Set-Cookie', found.setCookie);
    res.locals.userId = found.user.id;
    return { user: found.user, sessionId: found.sessionId };
  };

  const signedInOf = async (req: Request, res: Response): Promise<SignedIn> => {
    const session = await sessionOf(req, res);
    if (session === null) throw new Refused('not-signed-in');
    return session;
  };

  const actorOf = async (req: Request, res: Response, roles: readonly Role[]): Promise<Actor> => {
    const { user } = await signedInOf(req, res);
    const householdId = String(req.params.householdId ?? '');
    const role = roleIn(deps.db, householdId, user.id);
    // Another household's id is as unknown as one that does not exist.
    if (role === null) throw new Refused('not-found');
    if (!roles.includes(role)) {
      deps.log('warn', 'role-refused', { user: user.id, role, method: req.method, path: req.path });
      throw new Refused('forbidden', 'Your role in this household does not allow this.');
    }
    return { userId: user.id, name: user.name, householdId, role };
  };

  return { sessionOf, signedInOf, actorOf };
}
