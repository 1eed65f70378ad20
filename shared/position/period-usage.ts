import { type AtHours, splitEnergy } from '../metering/energy-split.ts';
import { hoursBetween, periodHours, weighHours } from '../metering/period-hours.ts';
import type { CompiledUsage } from '../settlement/compile-usage.ts';
import { keptAt } from '../settlement/place.ts';
import type { RatePlan } from '../settlement/plan.ts';
import type { Period, PeriodEnergy } from './periods.ts';
import type { SourcedShares } from './year-shares.ts';

/** A month to come and the plan it is settled by. */
type Month = { period: Period; plan: RatePlan };

/** A month's energy with the roof. `shared`: how it falls on the periods and clock hours of the plan, where that asks for them. */
export function usageWithRoof(energy: PeriodEnergy, shared: SourcedShares | null, month: Month): CompiledUsage {
  const { importWh, exportWh, productionWh, useWh } = energy;
  const usage = { importWh, exportWh, productionWh, loadWh: useWh };
  if (shared === null) return { ...usage, split: null };
  const { shares } = shared;
  const split = splitEnergy(energy, shares, atHoursOf(energy, month));
  const inCells = <T>(make: (at: number) => T): (T | null)[] =>
    shares.present.map((isThere, at) => (isThere ? make(at) : null));
  const netted = (block: 'hour' | '15min') => {
    const { total, parts } = split.netted[block];
    return { ...total, periods: inCells((at) => keptAt(parts, at)) };
  };
  return {
    ...usage,
    split: {
      periods: inCells((at) => ({
        importWh: Number(split.importWh[at]),
        exportWh: Number(split.exportWh[at]),
        productionWh: Number(split.productionWh[at]),
        loadWh: Number(split.useWh[at]),
      })),
      netted: { hour: netted('hour'), '15min': netted('15min') },
    },
  };
}

/** Without a roof everything used is bought, when it is used. */
export function usageWithoutRoof(energy: PeriodEnergy, shared: SourcedShares | null, month: Month): CompiledUsage {
  const { loadWh, split } = usageWithRoof(energy, shared, month);
  const bought = { importWh: loadWh, exportWh: 0 };
  if (split === null) return { ...bought, productionWh: 0, loadWh, split };
  const flows = split.periods.map((own) => own && { importWh: own.loadWh, exportWh: 0 });
  const netted = { ...bought, periods: flows };
  return {
    ...bought,
    productionWh: 0,
    loadWh,
    split: {
      periods: split.periods.map(
        (own) => own && { importWh: own.loadWh, exportWh: 0, productionWh: 0, loadWh: own.loadWh },
      ),
      netted: { hour: netted, '15min': netted },
    },
  };
}

function atHoursOf({ atHours }: PeriodEnergy, month: Month): AtHours | null {
  const hours = atHours && periodHours(month.plan.calendar, month.period.from, month.period.to);
  if (!atHours || !hours) return null;
  const { importWh, selfWh, fromHour, toHour } = atHours;
  return { importWh, selfWh, weights: weighHours(hours, hoursBetween(fromHour, toHour)) };
}
