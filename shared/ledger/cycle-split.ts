import type { EnergySplit } from '../metering/energy-split.ts';
import { cellsOf } from '../metering/period-hours.ts';
import { matchParts } from '../reconcile/match-parts.ts';
import type { NettedFlow } from '../settlement/cycle-flows.ts';
import { intervalView, mustCover, nettedOver, producedOver } from '../settlement/interval-flows.ts';
import type { RatePlan } from '../settlement/plan.ts';
import { qtyOfText } from '../settlement/quantity.ts';
import { orRefusal } from '../settlement/refused.ts';
import type { CycleUsage } from '../settlement/settlement.ts';
import type { CyclePaper } from './cycle-papers.ts';

/**
 * How a cycle's energy fell on the periods of a plan, and what cancelled inside clock hours: from its interval data, else import and export as its statement prints
 * them by period. Null where neither tells.
 */
export function splitOfCycle(
  plan: RatePlan,
  intervals: CycleUsage['intervals'],
  paper: CyclePaper,
  components: readonly (string | null)[],
): EnergySplit | null {
  if (intervals === null) return printedSplit(plan, paper, components);
  const made = orRefusal(() => measuredSplit(plan, intervals, paper));
  return made.ok ? made.value : null;
}

function measuredSplit(
  plan: RatePlan,
  intervals: NonNullable<CycleUsage['intervals']>,
  { from, to }: CyclePaper,
): EnergySplit | null {
  const cells = cellsOf(plan.calendar);
  const view = intervalView(intervals, plan);
  mustCover(view, from, to);
  const gross = nettedOver(view, 'none', null, null);
  // An hour that no period of the plan holds.
  if (plan.calendar.periods.length > 0 && gross.byPeriod === null) return null;
  const inCells = (flow: NettedFlow, side: 'import' | 'export') =>
    cells.map((id) => (id === null ? flow[side] : ({ ...flow.byPeriod }[id]?.[side] ?? 0)));
  const bought = inCells(gross, 'import');
  const sent = inCells(gross, 'export');
  const made = intervals.productionWh.length === intervals.importWh.length ? producedOver(view, from, to) : null;
  const cancels = (block: 'hour' | '15min') => {
    if (intervals.minutes > (block === 'hour' ? 60 : 15)) return null;
    return inCells(nettedOver(view, block, null, null), 'import').map((left, at) => Number(bought[at]) - left);
  };
  return {
    importWh: bought,
    exportWh: sent,
    selfWh:
      made === null
        ? null
        : cells.map((id, at) => Math.max(0, (id === null ? made.total : (made.byPeriod[id] ?? 0)) - Number(sent[at]))),
    cancels: { hour: cancels('hour'), '15min': cancels('15min') },
  };
}

/** Import and export by period as the lines of a charge and a credit print them: those that take the registers as they are. */
function printedSplit(plan: RatePlan, paper: CyclePaper, components: readonly (string | null)[]): EnergySplit | null {
  if (plan.calendar.periods.length === 0) return null;
  const parts = matchParts(paper.lines, components, plan, []);
  const of = (basis: 'import' | 'export'): number[] | null => {
    const gross = [...plan.charges, ...plan.credits].filter(
      (item) => item.basis === basis && (item.netting ?? plan.netting) === 'none',
    );
    for (const { id } of gross) {
      const sums = plan.calendar.periods.map(() => 0);
      let found = 0;
      for (const [at, line] of paper.lines.entries()) {
        if (components[at] !== id || line.quantity === null || line.unit !== 'kWh') continue;
        const cell = plan.calendar.periods.findIndex((period) => period.id === parts[at]?.period);
        if (cell < 0) continue;
        sums[cell] = Number(sums[cell]) + Math.abs(Math.round(Number(qtyOfText(line.quantity))));
        found += 1;
      }
      if (found > 0) return sums;
    }
    return null;
  };
  const bought = of('import');
  const sent = of('export');
  if (bought === null || sent === null) return null;
  return { importWh: bought, exportWh: sent, selfWh: null, cancels: { hour: null, '15min': null } };
}
