import type { HouseholdFacts } from '#shared/facts/household.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import type { Ledger } from '#shared/ledger/ledger.ts';
import type { ProjectionBasis } from '#shared/position/basis.ts';
import { addDays, addMonths, type Day, day } from '#shared/units/day.ts';
import { type BuildOptions, buildHousehold } from '#tests/support/build-household.ts';

export const BUILT_START: Day = day('2025-01-14');

/** A built household, its ledger a week after its last cycle, and what its projection starts from. */
export function builtLedger(
  options: BuildOptions = {},
  change: (facts: HouseholdFacts) => HouseholdFacts = (facts) => facts,
): { facts: HouseholdFacts; ledger: Ledger; basis: ProjectionBasis } {
  const { cycles = 26, start = BUILT_START } = options;
  const facts = change(buildHousehold({ ...options, cycles, start }));
  const ledger = computeLedger(facts, { today: addDays(addMonths(start, cycles), 7) });
  if (ledger.basis === null) throw new Error(ledger.position.whyNoProjection ?? 'there is no projection');
  return { facts, ledger, basis: ledger.basis };
}

/** The basis with other assumptions. */
export function assuming(basis: ProjectionBasis, changes: Partial<HouseholdFacts['assumptions']>): ProjectionBasis {
  return { ...basis, facts: { ...basis.facts, assumptions: { ...basis.facts.assumptions, ...changes } } };
}
