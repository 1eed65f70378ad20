import type { Basis } from './energy-figures.ts';
import type { Netting } from './plan.ts';

type Flow = { importWh: number; exportWh: number };

/** By period in the calendar's order; null where the span has no hour of the period. One figure where the calendar has no periods. */
type ByPeriod<T> = readonly (T | null)[];

/**
 * A month's energy as a compiled cycle takes it, in Wh. `split`: how it falls on the plan's periods, and what is left of import and export after
 * netting inside clock blocks; null where the plan asks for neither.
 */
export type CompiledUsage = Flow & {
  productionWh: number;
  loadWh: number;
  split: {
    periods: ByPeriod<Flow & { productionWh: number; loadWh: number }>;
    netted: Record<'hour' | '15min', Flow & { periods: ByPeriod<Flow> }>;
  } | null;
};

/** How a side of the energy is read. */
export type Side = { basis: Basis; netting: Netting };

/** The Wh of a side in all; null where the usage does not hold what its netting needs. */
export function totalOf({ basis, netting }: Side, usage: CompiledUsage): number | null {
  switch (basis) {
    case 'production':
      return usage.productionWh;
    case 'load':
      return usage.loadWh;
    case 'import':
    case 'export': {
      if (netting === 'none') return basis === 'import' ? usage.importWh : usage.exportWh;
      if (netting === 'cycle') return leftOf(basis, usage);
      const { split } = usage;
      if (split === null) return null;
      if (netting !== 'period') return flowOf(basis, split.netted[netting]);
      let total = 0;
      for (const part of split.periods) if (part) total += leftOf(basis, part);
      return total;
    }
  }
}

/** The Wh of a side in each period that the span has; null where they are not known. */
export function partsOf({ basis, netting }: Side, usage: CompiledUsage): ByPeriod<number> | null {
  const { split } = usage;
  if (split === null) return null;
  switch (basis) {
    case 'production':
      return split.periods.map((part) => part?.productionWh ?? null);
    case 'load':
      return split.periods.map((part) => part?.loadWh ?? null);
    case 'import':
    case 'export': {
      if (netting === 'hour' || netting === '15min') {
        return split.netted[netting].periods.map((part) => part && flowOf(basis, part));
      }
      const read = netting === 'period' ? leftOf : flowOf;
      return split.periods.map((part) => part && read(basis, part));
    }
  }
}

function flowOf(basis: 'import' | 'export', flow: Flow): number {
  return basis === 'import' ? flow.importWh : flow.exportWh;
}

function leftOf(basis: 'import' | 'export', { importWh, exportWh }: Flow): number {
  const net = importWh - exportWh;
  return Math.max(basis === 'import' ? net : -net, 0);
}
