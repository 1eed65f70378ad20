import { keptAt } from '../settlement/place.ts';
import { daysBetween, monthOf } from '../units/day.ts';
import { Exact, exact } from '../units/rate.ts';
import type { EnergyCycle, ProjectionBasis } from './basis.ts';
import { segmentsOf } from './month-heaps.ts';
import { energyFrom, type Period, type PeriodEnergy } from './periods.ts';

/** A cycle's days within one calendar month, with the cycle's own energies. */
type Recorded = {
  days: number;
  cycleDays: number;
  productionWh: number;
  exportWh: number;
  useWh: number;
  /** Whole years the cycle lies behind the last close. */
  age: number;
  /** The cycle itself: how its energy fell on periods goes with the draw. */
  cycle: EnergyCycle;
};

/** A cycle as a calendar month may draw it. */
type Candidate = Recorded & {
  /** How many of the month's recorded days the candidates before it hold together. */
  before: number;
  /** Its use against the mean of the month's candidates, in millionths. */
  use: number;
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
  const months: Recorded[][] = Array.from({ length: 12 }, () => []);
  let oldest = 0;
  for (const { cycle, importWh, exportWh, productionWh } of completeCycles(basis)) {
    const age = Math.max(0, Math.floor(daysBetween(cycle.to, basis.close.on) / DAYS_PER_YEAR));
    oldest = Math.max(oldest, age);
    const whole = {
      cycleDays: daysBetween(cycle.from, cycle.to),
      productionWh: Math.max(0, productionWh),
      exportWh: Math.max(0, exportWh),
      useWh: Math.max(0, importWh + productionWh - exportWh),
      age,
      cycle,
    };
    for (const { month, days } of segmentsOf(cycle.from, cycle.to)) keptAt(months, month).push({ days, ...whole });
  }
  return { months: months.map(urnOf), kept: keptOf(basis, oldest) };
}

/** Each candidate's use per day stands against the days' mean, so that a draw keeps the level of the last twelve months. */
function urnOf(recorded: readonly Recorded[]): Urn {
  const days = recorded.reduce((sum, one) => sum + one.days, 0);
  const total = recorded.reduce((sum, one) => sum.plus(usePerDay(one).times(one.days)), new Exact(0));
  let before = 0;
  const candidates = recorded.map((one): Candidate => {
    const share = total.isZero() ? new Exact(1) : usePerDay(one).times(days).div(total);
    const candidate = { ...one, before, use: share.times(MILLION).toDecimalPlaces(0).toNumber() };
    before += one.days;
    return candidate;
  });
  return { days, candidates };
}

function usePerDay({ useWh, cycleDays }: Recorded): Exact {
  return new Exact(useWh).div(cycleDays);
}

function keptOf(basis: ProjectionBasis, oldestCycle: number): number[] {
  const { degradation, horizonMonths } = basis.facts.assumptions;
  const kept = new Exact(1).minus(exact(degradation));
  const oldest = oldestCycle + Math.ceil(horizonMonths / 12);
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
  return keptAt(urns.months, monthOf(period.from) - 1);
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
  const kept = keptAt(urns.kept, candidate.age + Math.floor(period.index / 12) + 1);
  const { productionWh: made, exportWh: sent } = candidate;
  const productionWh = Math.round((made * days * kept) / (candidate.cycleDays * MILLION));
  const useWh = Math.round((base.useWh * candidate.use) / MILLION);
  const sentWh = made === 0 ? 0 : Math.min(productionWh, Math.round((productionWh * sent) / made));
  return energyFrom(productionWh, useWh, sentWh);
}
