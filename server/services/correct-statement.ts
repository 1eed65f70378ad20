import type { StatementBody } from '#shared/api/cycles.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import type { Day } from '#shared/units/day.ts';
import { insertStatement } from '../db/facts/write-papers.ts';
import type { Actor, Deps } from '../deps.ts';
import { fieldFault } from './field-fault.ts';
import { ledgerOf } from './ledger-of.ts';
import { sayCycle } from './say-days.ts';
import { bodyOfStatement, overlap, sameStatement, statementsInForce } from './statements-in-force.ts';
import { writeHousehold } from './write-household.ts';

/** Faults of a statement that its schema cannot see. */
export function statementFaults(body: StatementBody): ReturnType<typeof fieldFault>[] {
  const faults: ReturnType<typeof fieldFault>[] = [];
  if (body.from >= body.to) faults.push(fieldFault('statement.to', 'The end must lie after the start.'));
  for (const [index, read] of body.reads.entries()) {
    if (read.from > read.to)
      faults.push(fieldFault(`statement.reads.${index}.to`, 'The end must lie after the start.'));
  }
  return faults;
}

/** Corrects a posted statement: a new revision with a reason, typed by the owner; the old one stays. Answers the day the cycle now ends on. */
export function correctStatement(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  given: { to: Day | null; statement: StatementBody; reason: string },
): Result<{ to: Day }> {
  const { ledger, facts, today } = ledgerOf(deps, actor.householdId);
  const cycle = ledger.cycles.find((found) => found.to === given.to);
  if (cycle === undefined) return fail('not-found', 'No cycle ends on this day.');
  const faults = statementFaults(given.statement);
  if (faults.length > 0) return fail('invalid-fields', faults[0]?.message ?? null, faults);
  const inForce = statementsInForce(facts.statements);
  const current = inForce.find((found) => found.id === cycle.statement.id);
  if (current === undefined) throw new Error(`cycle ${cycle.to} has no statement`);
  const crossed = inForce.find((found) => found.id !== current.id && overlap(found, given.statement));
  if (crossed !== undefined) {
    return fail('cycle-overlaps', `${sayCycle(given.statement)} overlaps ${sayCycle(crossed)}, which is posted.`);
  }
  if (sameStatement(bodyOfStatement(current), given.statement)) {
    return fail('conflict', 'Nothing differs from the statement as it stands.');
  }
  return writeHousehold(deps, actor, { action: 'statement-corrected', about: sayCycle(current) }, (tx) => {
    insertStatement(tx, actor.householdId, {
      ...given.statement,
      reads: given.statement.reads.map((read) => ({ ...read, row: null })),
      lines: given.statement.lines.map((line) => ({ ...line, row: null })),
      banks: given.statement.banks.map((bank) => ({ ...bank, row: null })),
      id: current.id,
      revision: current.revision + 1,
      source: { kind: 'typed', by: actor.name, on: today },
      reason: given.reason,
      enteredBy: actor.name,
      enteredAt: deps.clock().toISOString(),
    });
    return succeed({ to: given.statement.to });
  });
}
