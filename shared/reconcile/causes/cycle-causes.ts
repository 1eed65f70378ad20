import type { CyclePaper } from '../../ledger/cycle-papers.ts';
import { accountLines, budgetOf, electricCents } from '../../ledger/due-parts.ts';
import { printedBankId, type SettledCycle } from '../../ledger/settle-cycle.ts';
import type { MeteredCycle } from '../../metering/cycle-energy.ts';

import type { RatePlan } from '../../settlement/plan.ts';
import { exactText, plus, qtyOfText } from '../../settlement/quantity.ts';
import type { CycleUsage } from '../../settlement/settlement.ts';
import { cents } from '../../units/cents.ts';
import type { Wh } from '../../units/energy.ts';
import { roundToWh } from '../../units/rate.ts';
import { isElectric } from '../electric-lines.ts';
import type { BilledBank, BilledCycle, BilledLine, Cause, CauseCycle } from './cause.ts';
import { actualSplit, isEstimatedPair } from './estimated-pair.ts';
import { findCauses } from './find-causes.ts';
import { readKwh } from './meter-reads.ts';

/** What the ledger has of a cycle. `usage` is what it was settled on (`usageOf`); null where it could not be settled. */
export type LedgerCycle = {
  paper: CyclePaper;
  settled: SettledCycle;
  metered: Pick<MeteredCycle, 'witnesses'>;
  usage: CycleUsage | null;
};

/**
 * The mistakes that explain a cycle's bill to the cent. Nothing is said of a cycle split at switch-on, of one that cannot be settled, or of a statement
 * whose lines are not entered. Where the cycle or the one before closed on an estimated read, the two are tried together on what the interval data
 * say the reads were.
 */
export function causesOfCycle(
  own: LedgerCycle,
  neighbours: { before: LedgerCycle | null; after: LedgerCycle | null },
): Cause[] {
  const given = causeCycle(own);
  if (given === null) return [];
  const found = findCauses({ opening: own.settled.opening, cycles: [given] });
  if (found.length > 0) return found;
  return [
    ...(neighbours.before === null ? [] : estimatedPair(neighbours.before, own)),
    ...(neighbours.after === null ? [] : estimatedPair(own, neighbours.after)),
  ];
}

function estimatedPair(first: LedgerCycle, second: LedgerCycle): Cause[] {
  if (!isEstimatedPair(first.paper, second.paper)) return [];
  const cycles = [causeCycle(first), causeCycle(second)].flatMap((cycle) => cycle ?? []);
  const [a, b] = cycles;
  if (!a || !b) return [];
  const actual = actualSplit([a.usage, b.usage], [first.metered.witnesses, second.metered.witnesses], first.paper);
  if (actual === null) return [];
  const input = {
    opening: first.settled.opening,
    cycles: [
      { ...a, usage: actual[0], reads: [] },
      { ...b, usage: actual[1], reads: [] },
    ],
  };
  return findCauses(input).filter((found) => found.cause === 'estimatedRead');
}

function causeCycle({ paper, settled, usage }: LedgerCycle): CauseCycle | null {
  if (settled.plan === null || usage === null || paper.split !== null || paper.lines.length === 0) return null;
  const { plan } = settled.plan;
  return { plan, usage, reads: paper.reads, billed: billedOf(paper, plan, settled.components) };
}

function billedOf(paper: CyclePaper, plan: RatePlan, components: readonly (string | null)[]): BilledCycle {
  const { statement } = paper;
  const lines: BilledLine[] = [];
  const onBudget = budgetOf(paper) !== null;
  // On a budget plan the amount due does not hold the plan's lines; their own sum does.
  let due: number = onBudget ? electricCents(paper.lines) : statement.amountDueCents;
  for (const line of onBudget ? [] : accountLines(paper)) due -= line.amountCents;
  paper.lines.forEach((line, at) => {
    const component = components[at] ?? null;
    if (component !== null) lines.push({ ...line, component });
    else if (onBudget ? isElectric(line) : line.inDue) due -= line.amountCents;
  });
  // A line's own kWh say more than those printed beside the registers, which may be right though the line is not.
  const beside = (channel: 'import' | 'export' | 'production', printed: Wh | null) =>
    saysKwh(lines, plan, channel) ? null : printed;
  return {
    days: statement.printedDays,
    reads: paper.reads.map((read) => ({ ...read, usageWh: roundToWh(readKwh(read)) })),
    importWh: beside('import', statement.importWh),
    exportWh: beside('export', statement.exportWh),
    productionWh: beside('production', statement.productionWh),
    lines,
    banks: statement.banks.flatMap((bank) => bankOf(bank, plan)),
    payouts: null,
    amountDueCents: cents(due),
  };
}

function saysKwh(lines: readonly BilledLine[], plan: RatePlan, channel: 'import' | 'export' | 'production'): boolean {
  const ids = [...plan.charges, ...plan.credits].filter((item) => item.basis === channel).map((item) => item.id);
  return lines.some((line) => ids.includes(line.component) && line.quantity !== null && line.unit === 'kWh');
}

/** A bank printed as one figure; one the plan keeps by period cannot be faced with it. */
function bankOf(printed: CyclePaper['statement']['banks'][number], plan: RatePlan): BilledBank[] {
  const id = printedBankId(printed, plan);
  if (id === null || plan.banks.some((bank) => bank.id === id && bank.byPeriod)) return [];
  const { open, close, sentOut } = printed;
  // What went to other service points is no mistake of this bill: the bank is taken as it would have closed with it.
  const kept = close === null || sentOut === null ? close : exactText(plus(qtyOfText(close), qtyOfText(sentOut)));
  return [{ bank: id, period: null, open, earned: null, used: null, expired: null, paid: null, close: kept }];
}
