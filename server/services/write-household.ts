import { eq, sql } from 'drizzle-orm';
import { fail, type Problem, type Result } from '#shared/problem.ts';
import { type Db, inTransaction, type Tx } from '../db/client.ts';
import { auditEvents, households } from '../db/schema/households.ts';
import type { Actor, Deps } from '../deps.ts';

/** Carries an expected refusal out of a transaction, so that what was written before it is rolled back. */
class Refusal extends Error {
  readonly problem: Problem;
  constructor(problem: Problem) {
    super(problem.code);
    this.problem = problem;
  }
}

function allOrNothing<T>(db: Db, work: (tx: Tx) => Result<T>): Result<T> {
  try {
    return inTransaction(db, (tx): Result<T> => {
      const result = work(tx);
      if (!result.ok) throw new Refusal(result.problem);
      return result;
    });
  } catch (error) {
    if (error instanceof Refusal) return fail(error.problem.code, error.problem.detail, error.problem.faults);
    throw error;
  }
}

/**
 * One use case that changes a household: all or nothing. A failed result rolls back; a good one raises the household's version
 * (which drops its remembered ledger) and leaves a line in the record of who did what.
 */
export function writeHousehold<T>(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  event: { action: string; about: string },
  work: (tx: Tx) => Result<T>,
): Result<T> {
  return allOrNothing(deps.db, (tx) => {
    const result = work(tx);
    if (result.ok) {
      tx.update(households)
        .set({ version: sql`${households.version} + 1` })
        .where(eq(households.id, actor.householdId))
        .run();
      tx.insert(auditEvents)
        .values({
          householdId: actor.householdId,
          at: deps.clock().toISOString(),
          userId: actor.userId,
          byName: actor.name,
          action: event.action,
          about: event.about,
        })
        .run();
    }
    return result;
  });
}

/** A change to the log in progress, which is no fact yet: all or nothing, and the household's ledger stays as remembered. */
export function writeDraft<T>(deps: Pick<Deps, 'db'>, work: (tx: Tx) => Result<T>): Result<T> {
  return allOrNothing(deps.db, work);
}
