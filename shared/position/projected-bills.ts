import { dcWattsOf } from '../facts/dc-rating.ts';
import type { HouseholdFacts, PlanInForce } from '../facts/household.ts';
import type { RatePlan } from '../settlement/plan.ts';
import { planFor } from '../settlement/plan-in-force.ts';
import { type SettledAmounts, settleAmounts } from '../settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING, type Opening } from '../settlement/settlement.ts';
import { planWithoutRoof } from '../settlement/without-roof.ts';
import { type Cents, cents } from '../units/cents.ts';
import { type Day, daysBetween, monthOf } from '../units/day.ts';
import { type Wh, wh, ZERO_WH } from '../units/energy.ts';
import { Exact, exact } from '../units/rate.ts';
import { escalatePlan } from './escalate.ts';
import { energyOf, type MonthlyEnergy } from './monthly-energy.ts';

/** A month to come: within one calendar month; `index` 0 is the one after the last close. */
export type Period = { index: number; from: Day; to: Day };

export type PeriodEnergy = { productionWh: Wh; exportWh: Wh; importWh: Wh; useWh: Wh };

const NONE = new Exact(0);

/**
 * Energy of a month to come. The record stands at the age of its last year, so the first twelve months are one year older. What the house uses
 * from its own roof never exceeds its use; the rest is sent out.
 */
export function energyOfPeriods(
  periods: readonly Period[],
  energy: MonthlyEnergy,
  degradation: string,
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
    const productionWh = energyOf(energy.productionPerDay[month] ?? NONE, days, factor);
    const useKey = month * 31 + days;
    const useWh = uses.get(useKey) ?? energyOf(energy.usePerDay[month] ?? NONE, days, one);
    uses.set(useKey, useWh);
    const share = energy.exportShare[month] ?? NONE;
    const sent = share.times(productionWh).toDecimalPlaces(0, Exact.ROUND_HALF_UP).toNumber();
    const selfUse = Math.min(productionWh - sent, useWh);
    return { productionWh, exportWh: wh(productionWh - selfUse), importWh: wh(useWh - selfUse), useWh };
  });
}

export type BillFacts = Pick<HouseholdFacts, 'house' | 'plans' | 'incentive' | 'assumptions'>;

/** What a month's two bills come to, and what the utility holds after it. */
export type ProjectedBill = { avoidedCents: Cents; plan: RatePlan; closing: Opening };

export type ProjectedBills = { ok: true; bills: ProjectedBill[] } | { ok: false; why: string };

/** A plan in a year to come: with the roof and without it. */
type YearPlans = { withRoof: RatePlan; withoutRoof: RatePlan };

/** Settles every month with the roof and without it, under the plan in force with its prices raised by whole years; both carry their own banks. */
export function projectBills(
  facts: BillFacts,
  periods: readonly Period[],
  energies: readonly PeriodEnergy[],
  opening: Opening,
): ProjectedBills {
  const planOf = planYears(facts);
  const kW = powerOf(facts.house);
  let withRoof: Opening = { ...opening, balanceCents: null };
  let without: Opening = EMPTY_OPENING;
  const bills: ProjectedBill[] = [];
  for (const [at, period] of periods.entries()) {
    const energy = energies[at];
    const inForce = planFor(facts.plans, period.from);
    if (!inForce || !energy) return { ok: false, why: 'There is no rate plan for the months to come.' };
    const plans = planOf(inForce, Math.floor(period.index / 12));
    const usage: CycleUsage = {
      from: period.from,
      to: period.to,
      importWh: energy.importWh,
      exportWh: energy.exportWh,
      productionWh: energy.productionWh,
      loadWh: energy.useWh,
      byPeriod: null,
      netted: {},
      kW,
      payments: [],
      finalBill: false,
      intervals: null,
    };
    const roof = settleAmounts(plans.withRoof, withRoof, usage);
    const plain = settleAmounts(plans.withoutRoof, without, {
      ...usage,
      importWh: energy.useWh,
      exportWh: ZERO_WH,
      productionWh: ZERO_WH,
    });
    if (!roof.ok || !plain.ok) {
      const refused = !roof.ok ? roof.problem : !plain.ok ? plain.problem : null;
      const said = refused?.faults[0]?.message ?? refused?.detail ?? '';
      return { ok: false, why: `The rate plan cannot be settled on monthly figures. ${said}`.trim() };
    }
    withRoof = roof.value.closing;
    without = plain.value.closing;
    const asItWas = electricDue(roof.value.settlement, facts.incentive !== null);
    const avoided = electricDue(plain.value.settlement, false) - asItWas;
    bills.push({ avoidedCents: cents(avoided), plan: plans.withRoof, closing: withRoof });
  }
  return { ok: true, bills };
}

/** Current charges in due less what is paid out beside the bill; the incentive apart where it has a book of its own. */
function electricDue(settlement: SettledAmounts['settlement'], incentiveApart: boolean): number {
  let due = 0;
  for (const line of settlement.lines) {
    if (line.inDue && !(incentiveApart && line.kind === 'incentive')) due += line.amountCents;
  }
  for (const payout of settlement.payouts) {
    if (!(incentiveApart && payout.kind === 'incentive')) due -= payout.amountCents;
  }
  return due;
}

function planYears(facts: BillFacts): (inForce: PlanInForce, years: number) => YearPlans {
  const made = new Map<PlanInForce, YearPlans[]>();
  const rise = facts.assumptions.priceRise;
  return (inForce, years) => {
    let ofPlan = made.get(inForce);
    if (!ofPlan) {
      ofPlan = [];
      made.set(inForce, ofPlan);
    }
    const known = ofPlan[years];
    if (known) return known;
    const first = ofPlan[0]?.withoutRoof ?? planWithoutRoof(inForce);
    const plans = {
      withRoof: escalatePlan(inForce.plan, rise, years),
      withoutRoof: escalatePlan(first, rise, years),
    };
    ofPlan[years] = plans;
    return plans;
  };
}

function powerOf(house: HouseholdFacts['house']): CycleUsage['kW'] {
  const watts = dcWattsOf(house.arrays);
  return {
    dc: new Exact(watts).div(1000).toString(),
    ...(house.inverterAcWatts === null ? {} : { ac: new Exact(house.inverterAcWatts).div(1000).toString() }),
  };
}
