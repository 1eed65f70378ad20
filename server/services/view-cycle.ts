import type { CycleView } from '#shared/api/cycles.ts';
import type { DocumentFacts } from '#shared/facts/papers.ts';
import type { Cycle } from '#shared/ledger/cycle.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import type { Day } from '#shared/units/day.ts';
import type { Deps } from '../deps.ts';
import { type HouseholdLedger, ledgerOf } from './ledger-of.ts';

/** The files a cycle rests on: those of its statement's revisions and of the readings of its days. */
function documentsOf({ facts }: HouseholdLedger, cycle: Cycle): DocumentFacts[] {
  const ids = new Set<string>();
  for (const statement of facts.statements) {
    if (statement.id === cycle.statement.id && statement.source.kind === 'file') ids.add(statement.source.documentId);
  }
  for (const interval of facts.intervals) {
    if (interval.documentId !== null && interval.day >= cycle.from && interval.day < cycle.to)
      ids.add(interval.documentId);
  }
  return facts.documents.filter((document) => ids.has(document.id));
}

/** One cycle by the day it ends on, with its neighbours, revisions, accepted differences and files. */
export function viewCycle(deps: Pick<Deps, 'db' | 'clock'>, householdId: string, to: Day | null): Result<CycleView> {
  const household = ledgerOf(deps, householdId);
  const { ledger, facts } = household;
  const index = ledger.cycles.findIndex((found) => found.to === to);
  const cycle = ledger.cycles[index];
  if (cycle === undefined) return fail('not-found', 'No cycle ends on this day.');
  const previous = ledger.cycles[index - 1];
  const next = ledger.cycles[index + 1];
  return succeed({
    cycle,
    previousTo: previous?.to ?? null,
    nextTo: next?.to ?? null,
    previousLabel: previous ? { from: previous.from, to: previous.to } : null,
    nextLabel: next ? { from: next.from, to: next.to } : null,
    revisions: facts.statements
      .filter(({ id, revision }) => id === cycle.statement.id && revision < cycle.statement.revision)
      .sort((a, b) => b.revision - a.revision),
    accepted: facts.accepted.filter((accepted) => accepted.cycleTo === cycle.to),
    documents: documentsOf(household, cycle).map(({ id, fileName }) => ({ id, fileName })),
  });
}
