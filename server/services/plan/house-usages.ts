import type { HouseholdFacts } from '#shared/facts/household.ts';
import { cyclePapers, statementsInForce } from '#shared/ledger/cycle-papers.ts';
import { usageOf } from '#shared/ledger/settle-cycle.ts';
import { meterCycle, witnessCycle } from '#shared/metering/cycle-energy.ts';
import { estimatedRuns } from '#shared/metering/estimated-reads.ts';
import { indexIntervals } from '#shared/metering/interval-index.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import type { CycleUsage } from '#shared/settlement/settlement.ts';
import type { Day } from '#shared/units/day.ts';

export type HouseCycle = {
  from: Day;
  to: Day;
  /** What a plan would be settled on in this cycle, or a sentence that says what is missing. */
  usage(plan: RatePlan): CycleUsage | string;
};

/** The house's cycles with the energy each plan would be settled on, by the same rules as the ledger's own settlement. */
export function houseCycles(facts: HouseholdFacts): HouseCycle[] {
  const papers = cyclePapers(statementsInForce(facts.statements), facts.house);
  const index = indexIntervals(facts.intervals, facts.documents);
  const runs = estimatedRuns(papers);
  const witnessed = papers.map((paper) => witnessCycle(paper, index));
  return papers.map((paper) => ({
    from: paper.from,
    to: paper.to,
    usage: (plan) => usageOf(facts, paper, meterCycle(paper, witnessed, runs), index, plan),
  }));
}
