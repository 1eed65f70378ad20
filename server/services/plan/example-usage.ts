import { dcWattsOf } from '#shared/facts/dc-rating.ts';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import type { CycleUsage, Flow } from '#shared/settlement/settlement.ts';
import { addMonths, type Day, dayOf, monthOf, yearOf } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';

/** A made-up month for a house without a cycle yet: 600 kWh bought, 400 sent out, 700 made. */
export function inventedUsage(facts: HouseholdFacts, today: Day): CycleUsage {
  const from = dayOf(yearOf(today), monthOf(today), 1);
  const dcWatts = dcWattsOf(facts.house.arrays);
  return {
    from,
    to: addMonths(from, 1),
    importWh: wh(600_000),
    exportWh: wh(400_000),
    productionWh: wh(700_000),
    loadWh: wh(900_000),
    byPeriod: null,
    netted: {},
    kW: {
      dc: kilowatts(dcWatts === 0 ? 7_000 : dcWatts),
      ac: kilowatts(facts.house.inverterAcWatts ?? 6_000),
      demand: '5',
    },
    payments: [],
    finalBill: false,
    intervals: null,
  };
}

function kilowatts(watts: number): string {
  const rest = String(watts % 1000)
    .padStart(3, '0')
    .replace(/0+$/, '');
  return `${Math.floor(watts / 1000)}${rest === '' ? '' : `.${rest}`}`;
}

/**
 * The same kWh shared evenly over the plan's periods, and taken as they are where hours would be netted: only an example may do this, and it
 * says so.
 */
export function sharedEvenly(usage: CycleUsage, plan: RatePlan): CycleUsage {
  const { periods } = plan.calendar;
  const byPeriod: Record<string, Flow> = {};
  periods.forEach(({ id }, at) => {
    byPeriod[id] = {
      importWh: part(usage.importWh, at, periods.length),
      exportWh: part(usage.exportWh, at, periods.length),
    };
  });
  const shared = periods.length === 0 ? null : byPeriod;
  const whole = { importWh: usage.importWh, exportWh: usage.exportWh, byPeriod: shared };
  return { ...usage, byPeriod: shared, netted: { hour: whole, '15min': whole }, intervals: null };
}

/** The part at a place when a whole is cut into so many, the odd watt-hours going to the first. */
function part(whole: number, at: number, count: number) {
  return wh(Math.floor(whole / count) + (at < whole % count ? 1 : 0));
}
