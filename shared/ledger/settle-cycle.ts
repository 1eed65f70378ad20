import { dcWattsOf } from '../facts/dc-rating.ts';
import type { HouseholdFacts, PlanInForce } from '../facts/household.ts';
import type { Statement } from '../facts/papers.ts';
import { isComplete, type MeteredCycle } from '../metering/cycle-energy.ts';
import { asksForIntervals, cycleIntervals } from '../metering/cycle-intervals.ts';
import type { EnergySplit } from '../metering/energy-split.ts';
import type { IntervalIndex } from '../metering/interval-index.ts';
import { billedQuantity } from '../reconcile/billed-quantities.ts';
import { matchLines } from '../reconcile/match.ts';
import { lastDigit } from '../reconcile/tolerance.ts';
import type { RatePlan } from '../settlement/plan.ts';
import { planFor } from '../settlement/plan-in-force.ts';
import { qtyText } from '../settlement/quantity.ts';
import { settleCycle } from '../settlement/settle.ts';
import type { CycleUsage, Opening, Settlement } from '../settlement/settlement.ts';
import { exact } from '../units/rate.ts';
import type { CyclePaper } from './cycle-papers.ts';
import { splitOfCycle } from './cycle-split.ts';
import { type LearnedRates, learnRates, withLearnedRates } from './learned-rates.ts';
import { sentOutOf, withSentOut } from './sent-out.ts';

/** A settlement and what the utility's books should hold after it. */
export type Settled = { settlement: Settlement; closing: Opening };

/** A cycle with its plan, what it came to on our energy, and what it comes to on the kWh as billed. */
export type SettledCycle = {
  plan: PlanInForce | null;
  /** The plan's component of each printed line, in order. */
  components: (string | null)[];
  /** What the utility's books held before the cycle, as carried (`nextOpening`). */
  opening: Opening;
  ours: Settled | null;
  why: string | null;
  /** The same on the billed kWh and the opening as this statement prints it; null where it cannot be settled. */
  asBilled: Settled | null;
  /** The riders' prices as this bill and those before it print them. */
  learned: LearnedRates;
  /** How its energy fell on the plan's periods and clock hours; null where the plan asks for neither or nothing tells. */
  split: EnergySplit | null;
};

export function settleOne(
  facts: HouseholdFacts,
  paper: CyclePaper,
  metered: MeteredCycle,
  index: IntervalIndex,
  opening: Opening,
  before: LearnedRates,
): SettledCycle {
  const stated = planFor(facts.plans, paper.from);
  if (stated === null) {
    return {
      plan: null,
      components: paper.lines.map(() => null),
      opening,
      ours: null,
      why: 'There is no rate plan yet. Enter the plan on your statement to compare this bill.',
      asBilled: null,
      learned: before,
      split: null,
    };
  }
  const components = matchLines(paper.lines, stated.plan);
  const learned = learnRates(stated.plan, paper.lines, components, before);
  const inForce = withLearnedRates(stated, learned, paper.from);
  const { plan } = inForce;
  const usage = usageOf(facts, paper, metered, index, plan);
  const intervals = typeof usage === 'string' ? null : usage.intervals;
  const split = asksForIntervals(plan) ? splitOfCycle(plan, intervals, paper, components) : null;
  const base = { plan: inForce, components, opening, learned, split };
  if (typeof usage === 'string') return { ...base, ours: null, why: usage, asBilled: null };
  const settled = settleCycle(plan, opening, usage);
  if (!settled.ok) return { ...base, ours: null, why: refusal(settled.problem), asBilled: null };
  const sent = sentOutOf(paper.statement, (printed) => printedBankId(printed, plan));
  const ours = withSentOut(settled.value, sent);

  const importWh = billedQuantity(paper, 'import', plan, components) ?? usage.importWh;
  const exportWh = billedQuantity(paper, 'export', plan, components) ?? usage.exportWh;
  const printed = withPrintedBanks(opening, paper.statement, plan, 'open');
  const same = importWh === usage.importWh && exportWh === usage.exportWh && printed === opening;
  if (same) return { ...base, ours, why: null, asBilled: ours };
  const asBilled = settleCycle(plan, printed, { ...usage, importWh, exportWh });
  return { ...base, ours, why: null, asBilled: asBilled.ok ? withSentOut(asBilled.value, sent) : null };
}

/**
 * What the next cycle opens with: each bank as the statement prints its close, else as we closed it. The printed close is taken even where we
 * found another, so that one error is reported in the cycle where it was made and not again in every cycle after it; the cycle that opens with
 * something else than the last one printed is found by the bank's own check. By-period balances and lots cannot be replaced by one printed
 * figure and are carried as ours.
 */
export function nextOpening(cycle: SettledCycle, statement: Statement): Opening {
  const closing = cycle.ours?.closing ?? cycle.opening;
  return cycle.plan === null ? closing : withPrintedBanks(closing, statement, cycle.plan.plan, 'close');
}

/** The opening of the first cycle: as stated, else as the first statement prints it. */
export function firstOpening(facts: HouseholdFacts, paper: CyclePaper): Opening {
  const plan = planFor(facts.plans, paper.from)?.plan;
  // The account's balance is followed by its own check, on the printed figures; a settlement holds current charges only.
  const stated: Opening = { ...facts.opening, balanceCents: null };
  if (!plan) return stated;
  const printed = withPrintedBanks(stated, paper.statement, plan, 'open');
  return { ...stated, banks: { ...printed.banks, ...stated.banks } };
}

/** The plan's bank a printed balance belongs to: by id, else the only one of its unit; null when neither says. */
export function printedBankId(printed: { bank: string; unit: 'kWh' | 'USD' }, plan: RatePlan): string | null {
  if (plan.banks.some((bank) => bank.id === printed.bank)) return printed.bank;
  const [only, ...more] = plan.banks.filter((bank) => bank.unit === printed.unit);
  return only && more.length === 0 ? only.id : null;
}

function withPrintedBanks(opening: Opening, statement: Statement, plan: RatePlan, side: 'open' | 'close'): Opening {
  let banks: Opening['banks'] | null = null;
  for (const printed of statement.banks) {
    const value = printed[side];
    const id = printedBankId(printed, plan);
    if (value === null || id === null) continue;
    const held = opening.banks[id];
    if (held !== undefined && typeof held !== 'string') continue;
    if (held !== undefined && printsAs(held, value, printed.unit)) continue;
    banks ??= { ...opening.banks };
    banks[id] = value;
  }
  return banks === null ? opening : { ...opening, banks };
}

/** Whether a balance is the one printed: kWh may be printed rounded, dollars are not. */
function printsAs(held: string, printed: string, unit: 'kWh' | 'USD'): boolean {
  if (held === printed) return true;
  const tolerance = unit === 'kWh' ? lastDigit(printed) : 0;
  return exact(held).minus(exact(printed)).abs().lte(tolerance);
}

/** The usage to settle on, or a sentence that says what is missing and what to do. */
export function usageOf(
  facts: HouseholdFacts,
  paper: CyclePaper,
  metered: MeteredCycle,
  index: IntervalIndex,
  plan: RatePlan,
): CycleUsage | string {
  const { energy } = metered;
  if (!isComplete(energy.import) || !isComplete(energy.export)) {
    const missing = [isComplete(energy.import) ? null : 'import', isComplete(energy.export) ? null : 'export'];
    return `The ${missing.filter((name) => name !== null).join(' and ')} of this cycle is not known. Add the meter reads from the statement or upload an interval file for its days.`;
  }
  // The files hold the house's own meter; kWh of other places that are netted with it are only in the reads.
  const own = paper.elsewhere.joined.size === 0;
  const intervals =
    own && asksForIntervals(plan) ? cycleIntervals(index, paper.from, paper.to, facts.house.timeZone) : null;
  const dcWatts = dcWattsOf(facts.house.arrays);
  const kW: CycleUsage['kW'] = {};
  if (dcWatts > 0) kW.dc = qtyText(dcWatts);
  if (facts.house.inverterAcWatts !== null) kW.ac = qtyText(facts.house.inverterAcWatts);
  return {
    from: paper.from,
    to: paper.to,
    importWh: energy.import.wh,
    exportWh: energy.export.wh,
    productionWh: isComplete(energy.production) ? energy.production.wh : null,
    loadWh: energy.use?.wh ?? null,
    byPeriod: null,
    netted: {},
    kW,
    payments: [],
    finalBill: false,
    intervals,
  };
}

function refusal(found: { detail: string | null; faults: { message: string }[] }): string {
  const said = found.faults[0]?.message ?? found.detail;
  return said === null || said === ''
    ? 'The rate plan cannot settle this cycle with what is known of it.'
    : `The rate plan cannot settle this cycle: ${said}`;
}
