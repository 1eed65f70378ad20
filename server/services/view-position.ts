import type { PositionView } from '#shared/api/position.ts';
import type { CycleState } from '#shared/ledger/cycle.ts';
import { readSteps } from '../db/facts/read-house.ts';
import type { Deps } from '../deps.ts';
import { ledgerOf } from './ledger-of.ts';

/** The running net position, what asks for the owner, and what is missing from the set-up. */
export function viewPosition(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): PositionView {
  const { row, facts, ledger } = ledgerOf(deps, householdId);
  const count = (state: CycleState) => ledger.cycles.filter((cycle) => cycle.state === state).length;
  const last = ledger.cycles.at(-1);
  return {
    householdName: row.name,
    utility: facts.house.utility,
    lastCycle: last === undefined ? null : { from: last.from, to: last.to },
    counts: {
      cycles: ledger.cycles.length,
      balanced: count('balanced'),
      differs: count('differs'),
      accepted: count('accepted'),
      open: count('open'),
    },
    position: ledger.position,
    needs: ledger.needs,
    unfinishedSteps: readSteps(deps.db, householdId)
      .filter(({ state }) => state !== 'done')
      .map(({ step }) => step),
    sample: row.sample,
  };
}
