import { and, eq } from 'drizzle-orm';
import type { Role } from '#shared/api/endpoint.ts';
import type { Reader } from '../db/client.ts';
import { memberships } from '../db/schema/people.ts';

/** What a user may do in a household now; null where there is no such household or the user has no part in it. */
export function roleIn(db: Reader, householdId: string, userId: string): Role | null {
  const row = db
    .select({ role: memberships.role })
    .from(memberships)
    .where(and(eq(memberships.householdId, householdId), eq(memberships.userId, userId)))
    .get();
  return row?.role ?? null;
}
