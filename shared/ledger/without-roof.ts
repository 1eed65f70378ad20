import type { UsageBefore } from '../facts/house.ts';
import type { PlanInForce } from '../facts/household.ts';
import type { EnergySplit } from '../metering/energy-split.ts';
import { input, ownFigure } from '../metering/source.ts';
import { STATED_PROFILE_WORDS } from '../metering/stated-profile.ts';
import { type KnownUse, useByPeriod } from '../metering/use-by-period.ts';
import { planByDays } from '../settlement/plan-by-days.ts';
import { settleCycle } from '../settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING, type Settlement } from '../settlement/settlement.ts';
import { planWithoutRoof } from '../settlement/without-roof.ts';
import { type Cents, dollarsText, sumCents } from '../units/cents.ts';
import { kwhText, type Wh, wh, ZERO_WH } from '../units/energy.ts';
import { Exact, kwhOf, roundToCents, roundToWh, usdOf } from '../units/rate.ts';
import type { Cycle, CycleEnergy } from './cycle.ts';
import type { CyclePaper } from './cycle-papers.ts';
import { sayKwh } from './say.ts';
import { estimateUse } from './use-before.ts';

/**
 * The bill for the same use without the roof, on the plan of the cycle's own dates (ledger.md §5.1): the measured use, else the same
 * month's use before the roof, else the yearly mean; never old dollars. A cycle split from its first statement is settled over the whole statement and
 * shared by days, as its printed lines are, so that a monthly charge counts for its share. Null where there is no plan or nothing says the use.
 */
export function billWithoutRoof(
  paper: CyclePaper,
  energy: CycleEnergy,
  inForce: PlanInForce | null,
  before: readonly UsageBefore[],
  measuredSplit: EnergySplit | null,
): Cycle['withoutRoof'] {
  if (inForce === null) return null;
  const measured = energy.use !== null && energy.use.wh >= 0 ? energy.use.wh : null;
  const estimated = measured === null ? estimateUse(before, paper.from, paper.to) : null;
  const useWh = measured ?? estimated?.wh ?? null;
  if (useWh === null) return null;
  const plan = planByDays(planWithoutRoof(inForce));
  const { split } = paper;
  const whole = split === null ? useWh : roundToWh(kwhOf(useWh).times(split.of).div(split.days));
  const span = { from: split === null ? paper.from : paper.statement.from, to: paper.to };
  const shared = useByPeriod(plan.calendar, span, whole, {
    split: measured === null ? null : measuredSplit,
    calendar: inForce.plan.calendar,
    energy: measured === null || split !== null ? null : flowsOf(energy),
  });
  const settled = settleCycle(plan, EMPTY_OPENING, usageWithout(span.from, span.to, whole, shared?.byPeriod ?? null));
  if (!settled.ok) return null;
  const { settlement } = settled.value;
  const used = estimated?.words ?? `${sayKwh(useWh)} kWh used`;
  const isShapeAssumed = shared?.estimated ?? false;
  const said = isShapeAssumed ? `${used}, by ${STATED_PROFILE_WORDS}` : used;
  const isEstimated = isShapeAssumed || measured === null || energy.use?.working.basis === 'estimated';
  return {
    ...amount(settlement, split, said, useWh, isEstimated),
    method: estimated?.method ?? 'measured',
    useWh,
    settlement,
  };
}

function amount(
  settlement: Settlement,
  split: CyclePaper['split'],
  said: string,
  useWh: Wh,
  estimated: boolean,
): Pick<NonNullable<Cycle['withoutRoof']>, 'amountCents' | 'working'> {
  const due = settlement.lines.filter((line) => line.inDue);
  const total: Cents = sumCents(due.map((line) => line.amountCents));
  const lines = input(
    'lines',
    due.map((line) => line.label).join(', '),
    due.map((line) => dollarsText(line.amountCents)),
    'USD',
    ownFigure('the bill settled without the roof'),
  );
  const use = input('use', 'Use of the cycle', kwhText(useWh), 'kWh', ownFigure('use of the cycle'));
  if (split === null) {
    return {
      amountCents: total,
      working: {
        words: `${said}, on the plan without a roof: ${due.length} lines added`,
        formula: 'sum(lines)',
        inputs: [lines, use],
        unit: 'USD',
        basis: estimated ? 'estimated' : 'computed',
      },
    };
  }
  return {
    amountCents: roundToCents(usdOf(total).times(split.days).div(split.of)),
    working: {
      words: `${said}, on the plan without a roof; ${split.days} of the statement’s ${split.of} days`,
      formula: 'roundCents(sum(lines) * days / of)',
      inputs: [
        lines,
        input('days', 'Days from switch-on', new Exact(split.days), 'days', ownFigure('switch-on')),
        input('of', 'Days of the statement', new Exact(split.of), 'days', ownFigure('statement dates')),
        use,
      ],
      unit: 'USD',
      basis: 'estimated',
    },
  };
}

/** The energies behind a measured use; null where one is missing. */
function flowsOf({ import: bought, export: sent, production }: CycleEnergy): KnownUse['energy'] {
  return bought && sent && production ? { importWh: bought.wh, exportWh: sent.wh, productionWh: production.wh } : null;
}

function usageWithout(
  from: CycleUsage['from'],
  to: CycleUsage['to'],
  useWh: Wh,
  parts: Record<string, number> | null,
): CycleUsage {
  const byPeriod =
    parts &&
    Object.fromEntries(Object.entries(parts).map(([id, part]) => [id, { importWh: wh(part), exportWh: ZERO_WH }]));
  // Without export nothing cancels: netted in whatever blocks, what is bought is the use.
  const netted = { importWh: useWh, exportWh: ZERO_WH, byPeriod };
  return {
    from,
    to,
    importWh: useWh,
    exportWh: ZERO_WH,
    productionWh: ZERO_WH,
    loadWh: useWh,
    byPeriod,
    netted: { hour: netted, '15min': netted },
    kW: {},
    payments: [],
    finalBill: false,
    intervals: null,
  };
}
