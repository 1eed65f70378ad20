import { eq } from 'drizzle-orm';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { acceptPassword, hashPassword, verifyPassword } from '../auth/passwords.ts';
import { inTransaction } from '../db/client.ts';
import { users } from '../db/schema/people.ts';
import type { Deps } from '../deps.ts';
import { fieldFault } from './field-fault.ts';

/** Changes a password for one who knows the present one. The caller ends the user's sessions. */
export async function changePassword(
  { db, log }: Pick<Deps, 'db' | 'log'>,
  userId: string,
  given: { current: string; next: string },
): Promise<Result<null>> {
  const user = db
    .select({ name: users.name, email: users.email, passwordHash: users.passwordHash })
    .from(users)
    .where(eq(users.id, userId))
    .get();
  if (!(await verifyPassword(user?.passwordHash ?? null, given.current)) || user === undefined) {
    log('warn', 'password-change-refused', { user: userId });
    return fail('wrong-sign-in', 'The present password is not right.', [
      fieldFault('current', 'The present password is not right.'),
    ]);
  }
  const accepted = acceptPassword(given.next, [user.name, user.email, 'gablebook']);
  if (!accepted.ok) return accepted;
  const passwordHash = await hashPassword(accepted.value);
  inTransaction(db, (tx) => {
    tx.update(users).set({ passwordHash }).where(eq(users.id, userId)).run();
    return null;
  });
  log('info', 'password-changed', { user: userId });
  return succeed(null);
}
