import { asc, eq } from 'drizzle-orm';
import type { SessionView } from '#shared/api/session.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { verifyPassword } from '../auth/passwords.ts';
import type { Reader } from '../db/client.ts';
import { households } from '../db/schema/households.ts';
import { memberships, users } from '../db/schema/people.ts';
import type { Deps } from '../deps.ts';

/** One spelling of an e-mail address. */
export function normalEmail(email: string): string {
  return email.trim().toLowerCase();
}

/** The user's name and households, oldest first; null when there is no such user. */
export function sessionViewOf(db: Reader, userId: string): SessionView | null {
  const user = db
    .select({ id: users.id, name: users.name, email: users.email })
    .from(users)
    .where(eq(users.id, userId))
    .get();
  if (user === undefined) return null;
  const list = db
    .select({ id: households.id, name: households.name, role: memberships.role })
    .from(memberships)
    .innerJoin(households, eq(households.id, memberships.householdId))
    .where(eq(memberships.userId, userId))
    .orderBy(asc(households.createdAt), asc(households.id))
    .all();
  return { user, households: list };
}

/** Checks e-mail and password; the same refusal, after the same time, whichever is wrong. */
export async function signIn(
  { db, log }: Pick<Deps, 'db' | 'log'>,
  given: { email: string; password: string },
): Promise<Result<SessionView>> {
  const user = db
    .select({ id: users.id, passwordHash: users.passwordHash })
    .from(users)
    .where(eq(users.email, normalEmail(given.email)))
    .get();
  const right = await verifyPassword(user?.passwordHash ?? null, given.password);
  const view = user !== undefined && right ? sessionViewOf(db, user.id) : null;
  if (view === null) {
    log('warn', 'sign-in-failed', { user: user?.id ?? '-' });
    return fail('wrong-sign-in', 'E-mail or password is not right.');
  }
  log('info', 'signed-in', { user: view.user.id });
  return succeed(view);
}
