import type { HouseholdFacts, PlanInForce } from '../facts/household.ts';
import { energyByMeter } from '../metering/by-meter.ts';
import { meterCycle, type WitnessedCycle, witnessCycle } from '../metering/cycle-energy.ts';
import type { EnergySplit } from '../metering/energy-split.ts';
import { estimatedRuns } from '../metering/estimated-reads.ts';
import { indexIntervals } from '../metering/interval-index.ts';
import type { Figure } from '../position/position.ts';
import type { Check } from '../reconcile/check.ts';
import { programmeOf } from '../reconcile/programme.ts';
import { isProvisional } from '../reconcile/reads.ts';
import { runChecks } from '../reconcile/run-checks.ts';
import type { Opening } from '../settlement/settlement.ts';
import { ZERO_CENTS } from '../units/cents.ts';
import { billAsItWas } from './as-it-was.ts';
import type { Cycle, CycleState } from './cycle.ts';
import { type CyclePaper, cyclePapers, statementsInForce } from './cycle-papers.ts';
import { facingLines } from './facing.ts';
import { type LearnedRates, NOTHING_LEARNED, withLearnedRates } from './learned-rates.ts';
import { nameCauses } from './name-causes.ts';
import { sentOutOf } from './sent-out.ts';
import { firstOpening, nextOpening, printedBankId, type SettledCycle, settleOne, usageOf } from './settle-cycle.ts';
import { usageBeforeRoof } from './use-before.ts';
import { utilityBank } from './utility-bank.ts';
import { billWithoutRoof } from './without-roof.ts';

/** A cycle before its entries are placed, with what the position and the "Needs you" list ask of it. */
export type AssembledCycle = {
  cycle: Cycle;
  paper: CyclePaper;
  settled: SettledCycle;
  /** How its energy fell on the plan's periods and cancelled inside clock hours; null where the plan asks for neither or nothing tells. */
  split: EnergySplit | null;
  /** What the utility holds for the house at the close. */
  utilityBank: Figure;
  /** The days without any production reading, where production comes from a file or its monitoring has gaps. */
  monitorGapDays: number;
};

export type Assembled = {
  cycles: AssembledCycle[];
  /** What the utility's books hold after the last cycle. */
  closing: Opening;
  /** The plans with their riders at the price last read from a bill, for what comes after the last cycle. */
  plans: PlanInForce[];
};

/**
 * From papers to cycles: statements in force → cycles → energy → settlement → facing lines → checks. Each cycle opens with what the statement
 * before it printed as its close (`nextOpening`).
 */
export function assembleCycles(facts: HouseholdFacts): Assembled {
  const inForce = statementsInForce(facts.statements);
  const papers = cyclePapers(inForce, facts.house);
  const index = indexIntervals(facts.intervals, facts.documents);
  const runs = estimatedRuns(papers);
  const witnessed: WitnessedCycle[] = papers.map((paper) => witnessCycle(paper, index));
  const usage = usageBeforeRoof(facts.usageBefore, inForce, facts.house.switchOn);
  const cycles: AssembledCycle[] = [];
  const measured = papers.map((paper) => ({ paper, metered: meterCycle(paper, witnessed, runs) }));
  const meters = measured.map(({ metered }) => metered);
  const programme = programmeOf(facts.incentive, papers, meters);
  let opening: Opening | null = null;
  let before: SettledCycle | null = null;
  for (const { paper, metered } of measured) {
    opening ??= firstOpening(facts, paper);
    const settled: SettledCycle = settleOne(facts, paper, metered, index, opening, before?.learned ?? NOTHING_LEARNED);
    const facing = facingLines(paper, settled);
    const { balanceCents: openingBalanceCents } = facts.opening;
    const own = { paper, metered, settled, before, facing, openingBalanceCents };
    const checks = runChecks({ ...own, facts, papers, witnessed, runs, meters, index, programme }, facts.accepted);
    const provisional = isProvisional({ paper, runs });
    opening = nextOpening(settled, paper.statement);
    before = settled;
    const { split } = settled;
    cycles.push({
      paper,
      settled,
      split,
      utilityBank: utilityBank(paper, settled.plan?.plan ?? null, opening),
      monitorGapDays: metered.monitor?.missingDays ?? 0,
      cycle: {
        index: paper.index,
        from: paper.from,
        to: paper.to,
        days: paper.days,
        state: stateOf(settled, provisional, checks),
        provisional,
        split: paper.split !== null,
        statement: paper.statement,
        energy: metered.energy,
        meters: energyByMeter(paper, facts.house.meters),
        sentOut: sentOutOf(paper.statement, (printed) =>
          settled.plan === null ? null : printedBankId(printed, settled.plan.plan),
        ),
        settlement: settled.ours?.settlement ?? null,
        whyNotSettled: settled.why,
        planFrom: settled.plan?.from ?? null,
        facing: facing.lines,
        billedDueCents: facing.billedDueCents,
        oursDueCents: facing.oursDueCents,
        withoutRoof: billWithoutRoof(paper, metered.energy, settled.plan, usage, split),
        asItWas: billAsItWas(paper, facts.incentive),
        checks,
        causes: [],
        entries: [],
        addedCents: ZERO_CENTS,
        loanPayments: 0,
      },
    });
  }
  const named = nameCauses(cycles, (at) => {
    const [one, metered] = [cycles[at], meters[at]];
    if (!one || !metered || one.settled.plan === null) return null;
    const usage = usageOf(facts, one.paper, metered, index, one.settled.plan.plan);
    return { paper: one.paper, settled: one.settled, metered, usage: typeof usage === 'string' ? null : usage };
  });
  const learned: LearnedRates = before?.learned ?? NOTHING_LEARNED;
  const end = papers.at(-1)?.to;
  const plans = end === undefined ? facts.plans : facts.plans.map((plan) => withLearnedRates(plan, learned, end));
  return { cycles: named, closing: opening ?? facts.opening, plans };
}

/** Open while it cannot be settled or an estimate awaits its read; else by what differs and whether all of it is accepted. */
function stateOf(settled: SettledCycle, provisional: boolean, checks: readonly Check[]): CycleState {
  if (settled.ours === null || provisional) return 'open';
  const differing = checks.filter((check) => check.verdict === 'differs');
  if (differing.length === 0) return 'balanced';
  return differing.every((check) => check.accepted !== null) ? 'accepted' : 'differs';
}
