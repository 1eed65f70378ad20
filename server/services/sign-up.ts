import { eq } from 'drizzle-orm';
import type { SessionView } from '#shared/api/session.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { acceptPassword, hashPassword } from '../auth/passwords.ts';
import { inTransaction, type Reader } from '../db/client.ts';
import { users } from '../db/schema/people.ts';
import type { Deps } from '../deps.ts';
import { newId } from '../ids.ts';
import { normalEmail, sessionViewOf } from './sign-in.ts';

export function emailIsTaken(db: Reader, email: string): boolean {
  return (
    db
      .select({ id: users.id })
      .from(users)
      .where(eq(users.email, normalEmail(email)))
      .get() !== undefined
  );
}

/** A new user without a household. */
export async function signUp(
  deps: Pick<Deps, 'db' | 'clock' | 'log' | 'settings'>,
  given: { name: string; email: string; password: string },
): Promise<Result<SessionView>> {
  if (deps.settings.signUp === 'closed') {
    return fail('forbidden', 'This installation takes no sign-ups. Ask its owner, or set SIGN_UP=open.');
  }
  const accepted = acceptPassword(given.password, [given.name, given.email, 'gablebook']);
  if (!accepted.ok) return accepted;
  const passwordHash = await hashPassword(accepted.value);
  const id = newId();
  const taken = inTransaction(deps.db, (tx) => {
    if (emailIsTaken(tx, given.email)) return true;
    tx.insert(users)
      .values({
        id,
        email: normalEmail(given.email),
        name: given.name.trim(),
        passwordHash,
        createdAt: deps.clock().toISOString(),
      })
      .run();
    return false;
  });
  if (taken) return fail('email-taken', 'Somebody has signed up with this address. Sign in instead.');
  const view = sessionViewOf(deps.db, id);
  if (view === null) throw new Error('the new user is not there');
  deps.log('info', 'signed-up', { user: id });
  return succeed(view);
}
