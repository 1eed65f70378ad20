import { dayOf } from '../units/day.ts';
import { exact } from '../units/rate.ts';
import { periodExists, seasonChanges, seasonOf } from './calendar.ts';
import type { Charge, RatePlan, RateRow, RatesOf, TierRow } from './plan.ts';
import { isEnergy, type PlanFault } from './plan-kinds.ts';

/** Any leap year shows every yearly day. */
const LEAP_YEAR = 2024;

/** Rows that name what the plan does not have, and combinations of season, period and tier for which no row ever holds. */
export function rateFaults(
  plan: RatePlan,
  path: (string | number)[],
  label: string,
  rows: readonly RateRow[],
  tiers: readonly TierRow[],
  field: string,
): PlanFault[] {
  const at = [...path, field];
  if (rows.length === 0) return [{ path: at, message: `${label} has no rate.` }];
  const unknown = unknownNames(plan, rows, label).map((message) => ({ path: at, message }));
  if (unknown.length > 0) return unknown;

  const most = tiersIn(tiers);
  const stray = rows.find((row) => row.tier !== undefined && row.tier > most);
  if (stray)
    return [{ path: at, message: `${label} has a rate for tier ${stray.tier}, and its tiers say no such tier.` }];

  const byPeriod = rows.some((row) => row.period !== undefined);
  const faults: PlanFault[] = [];
  for (const season of seasonsOfYear(plan)) {
    const periods = byPeriod
      ? plan.calendar.periods.filter((period) => periodExists(period, season)).map((period) => period.id)
      : [null];
    const count = tiersIn(tiers.filter((row) => row.season === undefined || row.season === season));
    const tierNumbers: (number | null)[] =
      count === 0 ? [null] : Array.from({ length: count }, (_, index) => index + 1);
    for (const period of periods) {
      for (const tier of tierNumbers) {
        if (rows.some((row) => holds(row, season, period, tier))) continue;
        const of = [season, period, tier === null ? null : `tier ${tier}`].filter((name) => name !== null).join(', ');
        faults.push({ path: at, message: `${label} has days without a rate${of === '' ? '' : ` (${of})`}.` });
      }
    }
  }
  return faults;
}

function tiersIn(tiers: readonly TierRow[]): number {
  return tiers.reduce((most, row) => Math.max(most, row.limits.length + 1), 0);
}

function unknownNames(plan: RatePlan, rows: readonly (RateRow | TierRow)[], label: string): string[] {
  const seasons = new Set(plan.calendar.seasons.map((season) => season.id));
  const periods = new Set(plan.calendar.periods.map((period) => period.id));
  return rows.flatMap((row) => [
    ...(row.season !== undefined && !seasons.has(row.season)
      ? [`${label} names the season ${row.season}, which the calendar does not have.`]
      : []),
    ...('period' in row && row.period !== undefined && !periods.has(row.period)
      ? [`${label} names the period ${row.period}, which the calendar does not have.`]
      : []),
  ]);
}

/** The seasons that days of a year fall in; null stands for days outside every season. Seasons change only where one begins or ends. */
function seasonsOfYear(plan: RatePlan): (string | null)[] {
  const found = new Set([seasonOf(plan.calendar, dayOf(LEAP_YEAR, 1, 1))]);
  for (const change of seasonChanges(plan.calendar, dayOf(LEAP_YEAR, 1, 1), dayOf(LEAP_YEAR + 1, 1, 1))) {
    found.add(seasonOf(plan.calendar, change));
  }
  return [...found];
}

function holds(row: RateRow, season: string | null, period: string | null, tier: number | null): boolean {
  return (
    (row.season === undefined || row.season === season) &&
    (row.period === undefined || row.period === period) &&
    (row.tier === undefined || row.tier === tier)
  );
}

/** Tiers belong to charges by the kWh, and their limits rise. */
export function tierFaults(plan: RatePlan, path: (string | number)[], charge: Charge): PlanFault[] {
  const at = [...path, 'tiers'];
  if (charge.tiers.length === 0) return [];
  if (!isEnergy(charge))
    return [{ path: at, message: `${charge.label} is not charged by the kWh and cannot have tiers.` }];
  const unknown = unknownNames(plan, charge.tiers, charge.label).map((message) => ({ path: at, message }));
  const falling = charge.tiers.some((row) =>
    row.limits.some((limit, index) => exact(limit).lte(exact(row.limits[index - 1] ?? '0'))),
  );
  return falling ? [...unknown, { path: at, message: `The tier limits of ${charge.label} must rise.` }] : unknown;
}

/** `ratesOf` must name charges by the kWh that have the tier. */
export function ratesOfFaults(
  plan: RatePlan,
  path: (string | number)[],
  label: string,
  ratesOf: RatesOf | null,
): PlanFault[] {
  if (!ratesOf) return [];
  const at = [...path, 'ratesOf'];
  if (ratesOf.charges.length === 0)
    return [{ path: at, message: `${label} must name the charges whose rates it takes.` }];
  return ratesOf.charges.flatMap((id): PlanFault[] => {
    const charge = plan.charges.find((other) => other.id === id);
    if (!charge) return [{ path: at, message: `${label} takes the rate of ${id}, which is no charge of the plan.` }];
    if (!isEnergy(charge))
      return [{ path: at, message: `${label} takes the rate of ${charge.label}, which is not charged by the kWh.` }];
    if (charge.rates.every((row) => row.tier !== undefined && row.tier !== ratesOf.tier)) {
      return [
        { path: at, message: `${label} takes the rate of tier ${ratesOf.tier} of ${charge.label}, which has none.` },
      ];
    }
    return [];
  });
}
