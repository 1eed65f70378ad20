import type { Day } from '../units/day.ts';
import { daysBetween } from '../units/day.ts';
import { type IntervalView, intervalView, mustCover, nettedOver } from './interval-flows.ts';
import type { Part } from './parts.ts';
import type { Netting } from './plan.ts';
import type { PreparedPlan } from './prepare.ts';
import { refuse } from './refused.ts';
import type { CycleUsage } from './settlement.ts';

/** Import and export in Wh after netting, in all and by time-of-use period where that is known. */
export type NettedFlow = {
  import: number;
  export: number;
  byPeriod: Record<string, { import: number; export: number }> | null;
};

/** A cycle being settled. */
export type Cycle = {
  prepared: PreparedPlan;
  usage: CycleUsage;
  from: Day;
  to: Day;
  days: number;
  flows: Partial<Record<Netting, NettedFlow>>;
  intervals: IntervalView | null;
  /** The cycle as one part (`splitCycle`), once an item has asked for it. */
  unsplit: readonly Part[] | null;
  /** Whether lines say how they came about. A projection settles hundreds of bills for their amounts alone. */
  says: boolean;
};

export function openCycle(prepared: PreparedPlan, usage: CycleUsage, says = true): Cycle {
  const days = daysBetween(usage.from, usage.to);
  if (!(days > 0)) refuse('A cycle must end after it begins.');
  return { prepared, usage, from: usage.from, to: usage.to, days, flows: {}, intervals: null, unsplit: null, says };
}

/** The interval data of the cycle with each step's local day and period; refused when there are none. */
export function viewOf(cycle: Cycle): IntervalView {
  if (cycle.intervals) return cycle.intervals;
  const { intervals } = cycle.usage;
  if (!intervals) return refuse('The plan needs interval data for this cycle.');
  cycle.intervals = intervalView(intervals, cycle.prepared.plan);
  mustCover(cycle.intervals, cycle.from, cycle.to);
  return cycle.intervals;
}

/** Import and export of the cycle under a netting; refused when the inputs do not hold what it needs. */
export function flowOf(cycle: Cycle, netting: Netting): NettedFlow {
  const known = cycle.flows[netting];
  if (known) return known;
  const made = netted(cycle, netting);
  cycle.flows[netting] = made;
  return made;
}

function netted(cycle: Cycle, netting: Netting): NettedFlow {
  const { usage } = cycle;
  switch (netting) {
    case 'none':
      return { import: usage.importWh, export: usage.exportWh, byPeriod: periodsOf(cycle) };
    case 'cycle': {
      const net = usage.importWh - usage.exportWh;
      return { import: Math.max(net, 0), export: Math.max(-net, 0), byPeriod: null };
    }
    case 'period': {
      const registers =
        periodsOf(cycle) ?? refuse('The plan nets by time-of-use period: import and export by period are needed.');
      const flow = { import: 0, export: 0, byPeriod: {} as Record<string, { import: number; export: number }> };
      for (const [period, { import: bought, export: sent }] of Object.entries(registers)) {
        const part = { import: Math.max(bought - sent, 0), export: Math.max(sent - bought, 0) };
        flow.byPeriod[period] = part;
        flow.import += part.import;
        flow.export += part.export;
      }
      return flow;
    }
    case '15min':
    case 'hour': {
      const given = usage.netted[netting];
      if (!given) {
        if (!usage.intervals)
          return refuse(
            `The plan nets by ${netting === 'hour' ? 'the hour' : 'quarter-hours'}: interval data are needed.`,
          );
        return nettedOver(viewOf(cycle), netting, null, null);
      }
      return {
        import: given.importWh,
        export: given.exportWh,
        byPeriod: given.byPeriod ? plainPeriods(cycle, given.byPeriod) : null,
      };
    }
  }
}

function periodsOf(cycle: Cycle): NettedFlow['byPeriod'] {
  const { usage, prepared } = cycle;
  if (usage.byPeriod) return plainPeriods(cycle, usage.byPeriod);
  if (!usage.intervals || prepared.period.size === 0) return null;
  return nettedOver(viewOf(cycle), 'none', null, null).byPeriod;
}

function plainPeriods(cycle: Cycle, given: NonNullable<CycleUsage['byPeriod']>): NonNullable<NettedFlow['byPeriod']> {
  const made: NonNullable<NettedFlow['byPeriod']> = {};
  for (const [period, flow] of Object.entries(given)) {
    if (!cycle.prepared.period.has(period)) refuse(`The plan has no period ${period}.`);
    made[period] = { import: flow.importWh, export: flow.exportWh };
  }
  return made;
}
