import type { CyclePaper } from '../ledger/cycle-papers.ts';
import type { Facing } from '../ledger/facing.ts';
import type { SettledCycle } from '../ledger/settle-cycle.ts';
import type { MeteredCycle, WitnessedCycle } from '../metering/cycle-energy.ts';
import type { EstimatedRun } from '../metering/estimated-reads.ts';
import type { Cents } from '../units/cents.ts';

/** Everything the checks of one cycle look at. */
export type CheckContext = {
  paper: CyclePaper;
  papers: readonly CyclePaper[];
  metered: MeteredCycle;
  witnessed: readonly WitnessedCycle[];
  runs: ReadonlyMap<string, EstimatedRun>;
  settled: SettledCycle;
  /** The cycle before, for what it closed with; null for the first. */
  before: SettledCycle | null;
  facing: Facing;
  /** The account's balance before the first cycle, as stated; null when it was not. */
  openingBalanceCents: Cents | null;
};
