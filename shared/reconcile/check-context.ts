import type { HouseholdFacts } from '../facts/household.ts';
import type { CyclePaper } from '../ledger/cycle-papers.ts';
import type { Facing } from '../ledger/facing.ts';
import type { SettledCycle } from '../ledger/settle-cycle.ts';
import type { MeteredCycle, WitnessedCycle } from '../metering/cycle-energy.ts';
import type { EstimatedRun } from '../metering/estimated-reads.ts';
import type { IntervalIndex } from '../metering/interval-index.ts';
import type { Cents } from '../units/cents.ts';
import type { Programme } from './programme.ts';

/** Everything the checks of one cycle look at. */
export type CheckContext = {
  facts: Pick<HouseholdFacts, 'house' | 'assumptions' | 'incentive'>;
  paper: CyclePaper;
  papers: readonly CyclePaper[];
  metered: MeteredCycle;
  /** Every cycle's energy, by place. */
  meters: readonly MeteredCycle[];
  index: IntervalIndex;
  /** What the incentive earned in every cycle and which receipt pays which; null without one. */
  programme: Programme | null;
  witnessed: readonly WitnessedCycle[];
  runs: ReadonlyMap<string, EstimatedRun>;
  settled: SettledCycle;
  /** The cycle before, for what it closed with; null for the first. */
  before: SettledCycle | null;
  facing: Facing;
  /** The account's balance before the first cycle, as stated; null when it was not. */
  openingBalanceCents: Cents | null;
};
