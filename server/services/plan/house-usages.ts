import type { HouseholdFacts } from '#shared/facts/household.ts';
import { cyclePapers, statementsInForce } from '#shared/ledger/cycle-papers.ts';
import { type LearnedRates, learnRates, NOTHING_LEARNED } from '#shared/ledger/learned-rates.ts';
import { usageOf } from '#shared/ledger/settle-cycle.ts';
import { meterCycle, witnessCycle } from '#shared/metering/cycle-energy.ts';
import { estimatedRuns } from '#shared/metering/estimated-reads.ts';
import { indexIntervals } from '#shared/metering/interval-index.ts';
import { matchLines } from '#shared/reconcile/match.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { planFor } from '#shared/settlement/plan-in-force.ts';
import type { CycleUsage } from '#shared/settlement/settlement.ts';
import type { Day } from '#shared/units/day.ts';

export type HouseCycle = {
  from: Day;
  to: Day;
  /** What a plan would be settled on in this cycle, or a sentence that says what is missing. */
  usage(plan: RatePlan): CycleUsage | string;
  /** The prices of the house's riders as this bill and those before it print them. */
  learned: LearnedRates;
};

/** The house's cycles with the energy each plan would be settled on, by the same rules as the ledger's own settlement. */
export function houseCycles(facts: HouseholdFacts): HouseCycle[] {
  const papers = cyclePapers(statementsInForce(facts.statements), facts.house);
  const index = indexIntervals(facts.intervals, facts.documents);
  const runs = estimatedRuns(papers);
  const witnessed = papers.map((paper) => witnessCycle(paper, index));
  let learned: LearnedRates = NOTHING_LEARNED;
  return papers.map((paper) => {
    const plan = planFor(facts.plans, paper.from)?.plan;
    if (plan) learned = learnRates(plan, paper.lines, matchLines(paper.lines, plan), learned);
    return {
      from: paper.from,
      to: paper.to,
      usage: (tried) => usageOf(facts, paper, meterCycle(paper, witnessed, runs), index, tried),
      learned,
    };
  });
}
