import { keptAt } from '../settlement/place.ts';
import { type Day, dayOf, daysBetween, monthOf, yearOf } from '../units/day.ts';
import { type Wh, wh } from '../units/energy.ts';
import { Exact, exact } from '../units/rate.ts';
import type { DecimalText } from '../units/rate-text.ts';
import { energyOf, type MonthlyEnergy } from './monthly-energy.ts';

/** A month to come: within one calendar month; `index` 0 is the one after the last close. */
export type Period = { index: number; from: Day; to: Day };

export type PeriodEnergy = {
  productionWh: Wh;
  exportWh: Wh;
  importWh: Wh;
  useWh: Wh;
  /** The part of the use that falls on stated hours of the day, such as a car's charging: what of it is bought and what the roof meets. */
  atHours?: { importWh: number; selfWh: number; fromHour: number; toHour: number };
};

/** Calendar months from the last close; the first is what is left of its month. */
export function periodsAfter(lastTo: Day, count: number): Period[] {
  const periods: Period[] = [];
  let from = lastTo;
  for (let index = 0; index < count; index += 1) {
    const to = dayOf(yearOf(from), monthOf(from) + 1, 1);
    periods.push({ index, from, to });
    from = to;
  }
  return periods;
}

/**
 * Energy of a month to come. The record stands at the age of its last year, so the first twelve months are one year older. What the house uses
 * from its own roof never exceeds its use; the rest is sent out.
 */
export function energyOfPeriods(
  periods: readonly Period[],
  energy: MonthlyEnergy,
  degradation: DecimalText,
): PeriodEnergy[] {
  const kept = new Exact(1).minus(exact(degradation));
  const one = new Exact(1);
  let factor = one;
  // The use of a month is the same every year: worked out once for each length of it.
  const uses = new Map<number, Wh>();
  return periods.map((period) => {
    if (period.index % 12 === 0) factor = factor.times(kept);
    const month = monthOf(period.from) - 1;
    const days = daysBetween(period.from, period.to);
    const productionWh = energyOf(keptAt(energy.productionPerDay, month), days, factor);
    const useKey = month * 31 + days;
    const useWh = uses.get(useKey) ?? energyOf(keptAt(energy.usePerDay, month), days, one);
    uses.set(useKey, useWh);
    const share = keptAt(energy.exportShare, month);
    const sent = share.times(productionWh).toDecimalPlaces(0, Exact.ROUND_HALF_UP).toNumber();
    return energyFrom(productionWh, useWh, sent);
  });
}

/** A month's four energies from what is made, used and, as far as the use lets the roof keep it, sent out. */
export function energyFrom(productionWh: number, useWh: number, sentWh: number): PeriodEnergy {
  const selfUse = Math.min(productionWh - sentWh, useWh);
  return {
    productionWh: wh(productionWh),
    exportWh: wh(productionWh - selfUse),
    importWh: wh(useWh - selfUse),
    useWh: wh(useWh),
  };
}
