import { daysBetween, monthOf } from '../units/day.ts';
import { Exact, exact } from '../units/rate.ts';
import type { EnergyCycle, ProjectionBasis } from './basis.ts';
import { segmentsOf } from './month-heaps.ts';
import { energyFrom, type Period, type PeriodEnergy } from './periods.ts';

/** A cycle as a calendar month may draw it. */
type Candidate = {
  /** How many of the month's recorded days it holds, and how many the ones before it hold together. */
  days: number;
  before: number;
  cycleDays: number;
  productionWh: number;
  exportWh: number;
  /** Whole years the cycle lies behind the last close. */
  age: number;
  /** Its use against the mean of the month's candidates, in millionths. */
  use: number;
  /** The cycle itself: how its energy fell on periods goes with the draw. */
  cycle: EnergyCycle;
};

/** What a month to come can draw: the candidates of its calendar month, and over how many recorded days a draw runs. */
type Urn = { days: number; candidates: Candidate[] };

/** Twelve urns, January first; and what a year's ageing leaves of production, in millionths, by years. */
export type Urns = { months: Urn[]; kept: number[] };

const MILLION = 1_000_000;
const DAYS_PER_YEAR = 365;

type Complete = { cycle: EnergyCycle } & Record<'importWh' | 'exportWh' | 'productionWh', number>;

/** The cycles a range may be drawn from: production, import and export measured whole, and not provisional. */
export function completeCycles(basis: ProjectionBasis): Complete[] {
  return basis.cycles.flatMap((cycle) => {
    const { importWh, exportWh, productionWh, provisional } = cycle;
    return provisional || importWh === null || exportWh === null || productionWh === null
      ? []
      : [{ cycle, importWh, exportWh, productionWh }];
  });
}

/**
 * The urns of a record. A calendar month draws one of its recorded days, and the whole month is as that day's cycle was: so a cycle's weight is the days it has
 * in the month, and production comes out in the mean as the base projection has it. Its use is kept as a share of the month's mean.
 */
export function urnsOf(basis: ProjectionBasis): Urns {
  const months: Urn[] = Array.from({ length: 12 }, () => ({ days: 0, candidates: [] }));
  const uses: number[][] = months.map(() => []);
  for (const { cycle, importWh, exportWh, productionWh } of completeCycles(basis)) {
    const cycleDays = daysBetween(cycle.from, cycle.to);
    const age = Math.max(0, Math.floor(daysBetween(cycle.to, basis.close.on) / DAYS_PER_YEAR));
    for (const { month, days } of segmentsOf(cycle.from, cycle.to)) {
      const urn = months[month];
      if (!urn) continue;
      urn.candidates.push({
        days,
        before: urn.days,
        cycleDays,
        productionWh: Math.max(0, productionWh),
        exportWh: Math.max(0, exportWh),
        age,
        use: MILLION,
        cycle,
      });
      uses[month]?.push(Math.max(0, importWh + productionWh - exportWh));
      urn.days += days;
    }
  }
  for (const [month, urn] of months.entries()) weighUses(urn, uses[month] ?? []);
  return { months, kept: keptOf(basis) };
}

/** Each candidate's use per day against the days' mean, so that a draw keeps the level of the last twelve months. */
function weighUses(urn: Urn, uses: readonly number[]): void {
  let total = new Exact(0);
  for (const [index, { days, cycleDays }] of urn.candidates.entries()) {
    total = total.plus(new Exact(uses[index] ?? 0).times(days).div(cycleDays));
  }
  if (total.isZero()) return;
  for (const [index, candidate] of urn.candidates.entries()) {
    candidate.use = new Exact(uses[index] ?? 0)
      .div(candidate.cycleDays)
      .times(urn.days)
      .div(total)
      .times(MILLION)
      .toDecimalPlaces(0)
      .toNumber();
  }
}

function keptOf(basis: ProjectionBasis): number[] {
  const { degradation, horizonMonths } = basis.facts.assumptions;
  const kept = new Exact(1).minus(exact(degradation));
  const oldest = Math.ceil(basis.cycles.length / 12) + Math.ceil(horizonMonths / 12) + 2;
  const made: number[] = [];
  let factor = new Exact(MILLION);
  for (let years = 0; years <= oldest; years += 1) {
    made.push(factor.toDecimalPlaces(0).toNumber());
    factor = factor.times(kept);
  }
  return made;
}

/** How many candidates a period has; none where the record holds no such month, and the base stands. */
export function candidatesOf(urns: Urns, period: Period): Urn {
  return urns.months[monthOf(period.from) - 1] ?? { days: 0, candidates: [] };
}

/** Which candidate a recorded day belongs to. */
export function candidateAt(urn: Urn, day: number): number {
  let at = 0;
  while ((urn.candidates[at + 1]?.before ?? Number.POSITIVE_INFINITY) <= day) at += 1;
  return at;
}

/** A period's energy as a candidate has it, brought to the period's age and length; `base` is the projection's own for the period. */
export function drawnEnergy(urns: Urns, period: Period, candidate: Candidate, base: PeriodEnergy): PeriodEnergy {
  const days = daysBetween(period.from, period.to);
  const kept = urns.kept[candidate.age + Math.floor(period.index / 12) + 1] ?? 0;
  const { productionWh: made, exportWh: sent } = candidate;
  const productionWh = Math.round((made * days * kept) / (candidate.cycleDays * MILLION));
  const useWh = Math.round((base.useWh * candidate.use) / MILLION);
  const sentWh = made === 0 ? 0 : Math.min(productionWh, Math.round((productionWh * sent) / made));
  return energyFrom(productionWh, useWh, sentWh);
}
