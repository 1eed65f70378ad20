import { and, asc, eq } from 'drizzle-orm';
import type * as z from 'zod/mini';
import type { addPersonBody, PersonView } from '#shared/api/people.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { acceptPassword, hashPassword } from '../auth/passwords.ts';
import { memberships, users } from '../db/schema/people.ts';
import type { Actor, Deps } from '../deps.ts';
import { newId } from '../ids.ts';
import { normalEmail } from './sign-in.ts';
import { emailIsTaken } from './sign-up.ts';
import { writeHousehold } from './write-household.ts';

const ROLE_ORDER = { owner: 0, member: 1, preparer: 2 } as const;

/** Who may see this household: owners, members, preparers; within a role the longest first, then by name. */
export function listPeople({ db }: Pick<Deps, 'db'>, actor: Actor): PersonView[] {
  return db
    .select({
      userId: users.id,
      name: users.name,
      email: users.email,
      role: memberships.role,
      since: memberships.since,
    })
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(eq(memberships.householdId, actor.householdId))
    .orderBy(asc(memberships.since), asc(users.name), asc(users.id))
    .all()
    .sort((a, b) => ROLE_ORDER[a.role] - ROLE_ORDER[b.role])
    .map((person) => ({ ...person, you: person.userId === actor.userId }));
}

/** A new user with a first password, and a role in this household. */
export async function addPerson(
  deps: Pick<Deps, 'db' | 'clock' | 'log'>,
  actor: Actor,
  given: z.infer<typeof addPersonBody>,
): Promise<Result<PersonView>> {
  const accepted = acceptPassword(given.password, [given.name, given.email, 'gablebook']);
  if (!accepted.ok) return accepted;
  const passwordHash = await hashPassword(accepted.value);
  const since = deps.clock().toISOString();
  const person = { userId: newId(), name: given.name.trim(), email: normalEmail(given.email), role: given.role, since };
  const added = writeHousehold(
    deps,
    actor,
    { action: 'person-added', about: `${person.name}, ${person.role}` },
    (tx) => {
      if (emailIsTaken(tx, person.email)) {
        return fail('email-taken', 'Somebody has signed up with this address already.');
      }
      const { userId: id, name, email, role } = person;
      tx.insert(users).values({ id, name, email, passwordHash, createdAt: since }).run();
      tx.insert(memberships).values({ householdId: actor.householdId, userId: id, role, since }).run();
      return succeed({ ...person, you: false });
    },
  );
  if (added.ok) deps.log('info', 'person-added', { by: actor.userId, user: person.userId, role: person.role });
  return added;
}

/** Takes a person's part in this household away; it holds from the next request on. */
export function removePerson(deps: Pick<Deps, 'db' | 'clock' | 'log'>, actor: Actor, userId: string): Result<null> {
  const removed = writeHousehold(deps, actor, { action: 'person-removed', about: userId }, (tx) => {
    const people = tx
      .select({ userId: memberships.userId, role: memberships.role })
      .from(memberships)
      .where(eq(memberships.householdId, actor.householdId))
      .all();
    const person = people.find((found) => found.userId === userId);
    if (person === undefined) return fail('not-found', 'This person has no part in the household.');
    const owners = people.filter((found) => found.role === 'owner');
    if (person.role === 'owner' && owners.length === 1) {
      return fail('conflict', 'A household keeps at least one owner.');
    }
    tx.delete(memberships)
      .where(and(eq(memberships.householdId, actor.householdId), eq(memberships.userId, userId)))
      .run();
    return succeed(null);
  });
  if (removed.ok) deps.log('info', 'person-removed', { by: actor.userId, user: userId });
  return removed;
}
