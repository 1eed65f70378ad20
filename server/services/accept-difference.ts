import { fail, type Result, succeed } from '#shared/problem.ts';
import type { Day } from '#shared/units/day.ts';
import { deleteAccepted, putAccepted } from '../db/facts/write-papers.ts';
import type { Actor, Deps } from '../deps.ts';
import { ledgerOf } from './ledger-of.ts';
import { writeHousehold } from './write-household.ts';

type AcceptDeps = Pick<Deps, 'db' | 'clock'>;

/** Lets a differing check of a cycle stand, with a note; a second time changes the note. */
export function acceptDifference(
  deps: AcceptDeps,
  actor: Actor,
  given: { to: Day | null; check: string; note: string },
): Result<null> {
  const { ledger, today } = ledgerOf(deps, actor.householdId);
  const cycle = ledger.cycles.find((found) => found.to === given.to);
  if (cycle === undefined) return fail('not-found', 'No cycle ends on this day.');
  const check = cycle.checks.find((found) => found.key === given.check);
  if (check === undefined) return fail('not-found', 'This cycle has no such check.');
  if (check.verdict !== 'differs') return fail('conflict', 'This check does not differ; there is nothing to accept.');
  return writeHousehold(deps, actor, { action: 'difference-accepted', about: `${cycle.to} ${check.key}` }, (tx) => {
    putAccepted(tx, actor.householdId, {
      cycleTo: cycle.to,
      check: check.key,
      note: given.note,
      by: actor.name,
      on: today,
    });
    return succeed(null);
  });
}

/** Takes an acceptance back. */
export function withdrawAcceptance(
  deps: AcceptDeps,
  actor: Actor,
  given: { to: Day | null; check: string },
): Result<null> {
  const { to } = given;
  if (to === null) return fail('not-found', 'No cycle ends on this day.');
  return writeHousehold(deps, actor, { action: 'acceptance-withdrawn', about: `${to} ${given.check}` }, (tx) =>
    deleteAccepted(tx, actor.householdId, to, given.check)
      ? succeed(null)
      : fail('not-found', 'This difference is not accepted.'),
  );
}
