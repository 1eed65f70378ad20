import type { TryView } from '#shared/api/try.ts';
import { hourlyExportOf } from '#shared/try/hourly-export.ts';
import type { Deps } from '../../deps.ts';
import { ledgerOf } from '../ledger-of.ts';

/** What the Try a change screen computes from: the projection's basis without papers or readings, and the changes kept by name. */
export function viewTry(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): TryView {
  const { facts, ledger, today } = ledgerOf(deps, householdId);
  return {
    today,
    basis: ledger.basis,
    why: ledger.basis === null ? ledger.position.whyNoProjection : null,
    hourly: hourlyExportOf(facts.intervals),
    scenarios: facts.scenarios,
  };
}
