import type { UsageBefore } from '../facts/house.ts';
import { keptAt } from '../settlement/place.ts';
import { type Day, daysBetween, daysInMonth } from '../units/day.ts';
import { type Wh, wh } from '../units/energy.ts';
import { Exact, exact } from '../units/rate.ts';
import type { DecimalText } from '../units/rate-text.ts';
import type { EnergyCycle } from './basis.ts';
import { gather, type Heap, type Heaps, MONTHS, monthOfAll, segmentsOf, wholeYear } from './month-heaps.ts';

export type MonthlyEnergyInput = {
  cycles: readonly Omit<EnergyCycle, 'split'>[];
  /** The last close: ages are counted from it. */
  lastTo: Day;
  expectedMonthlyWh: readonly Wh[] | null;
  usageBefore: readonly UsageBefore[];
  degradation: DecimalText;
};

/** Where a calendar month's figure comes from. */
export type MonthBasis = 'record' | 'installer' | 'before' | 'mean';

/** A house's own year: Wh per day by calendar month (January first), and the share of production sent out. */
export type MonthlyEnergy = {
  productionPerDay: Exact[];
  usePerDay: Exact[];
  exportShare: Exact[];
  productionBasis: MonthBasis[];
  useBasis: MonthBasis[];
};

const DAYS_PER_YEAR = 365;

/**
 * The year to repeat. Production of a calendar month: the mean Wh per day of the house's own record for it, each year brought to the last one's age
 * by the degradation; where the record has no such month, the installer's estimate scaled by record ÷ estimate, else the record's mean. Use:
 * the last twelve months' record, else any earlier year's, else that of the month before the roof, else the mean. Null without production and use.
 */
export function monthlyEnergy(input: MonthlyEnergyInput): MonthlyEnergy | null {
  const production: Heaps = new Map();
  const use: Heaps = new Map();
  const exported: Heaps = new Map();
  const producedWithExport: Heaps = new Map();
  for (const cycle of input.cycles) {
    const age = Math.max(0, Math.floor(daysBetween(cycle.to, input.lastTo) / DAYS_PER_YEAR));
    const { importWh, exportWh, productionWh } = cycle;
    if (productionWh === null) continue;
    const segments = segmentsOf(cycle.from, cycle.to);
    gather(production, age, segments, productionWh);
    if (exportWh === null) continue;
    gather(exported, age, segments, exportWh);
    gather(producedWithExport, age, segments, productionWh);
    if (importWh !== null) gather(use, age, segments, importWh + productionWh - exportWh);
  }
  const before: Heaps = new Map();
  for (const bill of input.usageBefore) gather(before, 0, segmentsOf(bill.from, bill.to), bill.importWh);

  const aged = agedMeans(production, input.degradation);
  const made = fillProduction(aged, input.expectedMonthlyWh);
  const used = fillUse(use, before);
  if (made === null || used === null) return null;
  const wholeShare = shareOf(wholeYear(exported), wholeYear(producedWithExport)) ?? new Exact(0);
  return {
    productionPerDay: made.perDay,
    productionBasis: made.basis,
    usePerDay: used.perDay,
    useBasis: used.basis,
    exportShare: MONTHS.map(
      (month) => shareOf(monthOfAll(exported, month), monthOfAll(producedWithExport, month)) ?? wholeShare,
    ),
  };
}

/** Mean Wh per day of each calendar month, every year brought to the last one's age; null for a month without a record. */
function agedMeans(heaps: Heaps, degradation: DecimalText): (Exact | null)[] {
  const kept = new Exact(1).minus(exact(degradation));
  const byAge = [...heaps].map(([age, months]) => ({ months, factor: kept.pow(age) }));
  return MONTHS.map((month) => {
    let energy = new Exact(0);
    let days = 0;
    for (const { months, factor } of byAge) {
      const heap = months[month];
      if (!heap || heap.days === 0) continue;
      energy = energy.plus(factor.times(heap.energy));
      days += heap.days;
    }
    return days === 0 ? null : energy.div(days);
  });
}

type Filled = { perDay: Exact[]; basis: MonthBasis[] };

function fillProduction(record: readonly (Exact | null)[], expected: readonly Wh[] | null): Filled | null {
  const mean = meanOf(record);
  if (mean === null) return null;
  const estimate = MONTHS.map((month) => new Exact(expected?.[month] ?? 0).div(daysInMonth(2023, month + 1)));
  let recorded = new Exact(0);
  let estimated = new Exact(0);
  for (const month of MONTHS) {
    const known = record[month];
    if (!known) continue;
    recorded = recorded.plus(known);
    estimated = estimated.plus(keptAt(estimate, month));
  }
  const ratio = estimated.isZero() ? null : recorded.div(estimated);
  return fill(record, (month) =>
    ratio === null ? [mean, 'mean'] : [keptAt(estimate, month).times(ratio), 'installer'],
  );
}

function fillUse(use: Heaps, before: Heaps): Filled | null {
  const lastYear = use.get(0);
  const record = MONTHS.map((month) => meanOfHeap(lastYear?.[month]) ?? meanOfHeap(monthOfAll(use, month)));
  const old = MONTHS.map((month) => meanOfHeap(monthOfAll(before, month)));
  const mean = meanOf(record) ?? meanOf(old);
  if (mean === null) return null;
  return fill(record, (month) => {
    const known = old[month];
    return known ? [known, 'before'] : [mean, 'mean'];
  });
}

function fill(record: readonly (Exact | null)[], other: (month: number) => [Exact, MonthBasis]): Filled {
  const filled = MONTHS.map((month): [Exact, MonthBasis] => {
    const known = record[month];
    return known ? [known, 'record'] : other(month);
  });
  return { perDay: filled.map(([value]) => value), basis: filled.map(([, basis]) => basis) };
}

function meanOf(values: readonly (Exact | null)[]): Exact | null {
  const known = values.filter((value) => value !== null);
  if (known.length === 0) return null;
  return known.reduce((sum, value) => sum.plus(value), new Exact(0)).div(known.length);
}

function meanOfHeap(heap: Heap | undefined): Exact | null {
  return heap === undefined || heap.days === 0 ? null : new Exact(heap.energy).div(heap.days);
}

/** Export ÷ production, between 0 and 1; null where nothing was produced. */
function shareOf(exported: Heap, produced: Heap): Exact | null {
  if (produced.energy <= 0) return null;
  return Exact.min(1, Exact.max(0, new Exact(exported.energy).div(produced.energy)));
}

/** Wh of a span within one calendar month. */
export function energyOf(perDay: Exact, days: number, factor: Exact): Wh {
  return wh(perDay.times(days).times(factor).toDecimalPlaces(0, Exact.ROUND_HALF_UP).toNumber());
}
