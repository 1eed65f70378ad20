import { dcWattsOf } from '../facts/dc-rating.ts';
import type { PlanInForce } from '../facts/household.ts';
import { asksForIntervals } from '../metering/cycle-intervals.ts';
import type { CompiledUsage } from '../settlement/compile-usage.ts';
import { keptAt } from '../settlement/place.ts';
import type { RatePlan } from '../settlement/plan.ts';
import { planByDays } from '../settlement/plan-by-days.ts';
import { planFor } from '../settlement/plan-in-force.ts';
import { type CycleUsage, EMPTY_OPENING, type Opening } from '../settlement/settlement.ts';
import { planWithoutRoof } from '../settlement/without-roof.ts';
import { type Cents, cents } from '../units/cents.ts';
import { Exact } from '../units/rate.ts';
import type { BasisFacts, EnergyCycle, ProjectionBasis } from './basis.ts';
import { type BillSide, billSide, settleSide } from './bill-side.ts';
import type { Changes } from './changes.ts';
import { escalatePlan } from './escalate.ts';
import { usageWithoutRoof, usageWithRoof } from './period-usage.ts';
import type { Period, PeriodEnergy } from './periods.ts';
import { type SharedMonths, sharedMonths } from './shared-months.ts';
import { shareBook } from './year-shares.ts';

/** What a month's two bills leave, and what the utility's banks are worth after it. */
export type ProjectedBill = { avoidedCents: Cents; bankCents: Cents };

export type ProjectedBills = { ok: true; bills: ProjectedBill[] } | { ok: false; why: string };

/** A plan in a year to come: with the roof and without it. */
type YearPlans = { withRoof: RatePlan; withoutRoof: RatePlan };

/**
 * Both sides of the bills to come: what is settled again for every resample. Months on or after the day the house is sold are left out. The usage of a month
 * is `drawn` as one cycle was, or as the record's months are in the mean.
 */
export type BillSides = {
  roof: BillSide;
  plain: BillSide;
  usageWith: (at: number, energy: PeriodEnergy, drawn: EnergyCycle | null) => CompiledUsage;
  usageWithout: (at: number, energy: PeriodEnergy, drawn: EnergyCycle | null) => CompiledUsage;
  /** Where the parts of the months by period and clock hour come from; null where the plans ask for none. */
  shared: SharedMonths | null;
};

/** Makes both sides ready: the plan in force in each month, its prices raised by whole years. Null where no plan is. */
export function billSides(
  basis: ProjectionBasis,
  facts: BasisFacts,
  changes: Pick<Changes, 'plan' | 'endsOn'>,
  periods: readonly Period[],
): BillSides | null {
  const planOf = planYears(facts);
  const roof: { period: Period; plan: RatePlan }[] = [];
  const plain: { period: Period; plan: RatePlan }[] = [];
  for (const period of periods) {
    if (changes.endsOn !== null && period.from >= changes.endsOn) break;
    const inForce = planFor(facts.plans, period.from);
    if (!inForce) return null;
    const plans = planOf(inForce, Math.floor(period.index / 12));
    roof.push({ period, plan: changes.plan ? changes.plan(plans.withRoof, period) : plans.withRoof });
    plain.push({ period, plan: plans.withoutRoof });
  }
  const kW = powerOf(facts.house);
  const book = shareBook(basis);
  const sharesAt = (months: BillSide['months'], at: number, drawn: EnergyCycle | null) => {
    const { plan, period } = keptAt(months, at);
    return asksForIntervals(plan) ? book.at(plan.calendar, period.from, period.to, drawn) : null;
  };
  const usage = (months: BillSide['months'], make: typeof usageWithRoof): BillSides['usageWith'] => {
    return (at, energy, drawn) => make(energy, sharesAt(months, at, drawn), keptAt(months, at));
  };
  return {
    roof: billSide(roof, kW, facts.incentive !== null),
    plain: billSide(plain, kW, false),
    usageWith: usage(roof, usageWithRoof),
    usageWithout: usage(plain, usageWithoutRoof),
    shared: sharedMonths(roof, (at) => sharesAt(roof, at, null)),
  };
}

/** Settles every month with the roof and without it; both carry their own banks. A house that is sold has no bill, and its banks are lost. */
export function projectBills(sides: BillSides, energies: readonly PeriodEnergy[], opening: Opening): ProjectedBills {
  const roof = settleSide(sides.roof, { ...opening, balanceCents: null }, (at) =>
    sides.usageWith(at, keptAt(energies, at), null),
  );
  if (!roof.ok) return refused(roof.why);
  const plain = settleSide(sides.plain, EMPTY_OPENING, (at) => sides.usageWithout(at, keptAt(energies, at), null));
  if (!plain.ok) return refused(plain.why);
  return {
    ok: true,
    bills: energies.map((_, at) => ({
      avoidedCents: cents((plain.value.dueCents[at] ?? 0) - (roof.value.dueCents[at] ?? 0)),
      bankCents: cents(roof.value.bankCents[at] ?? 0),
    })),
  };
}

function refused(why: string): ProjectedBills {
  return { ok: false, why: `The rate plan cannot be settled on monthly figures. ${why}`.trim() };
}

function planYears(facts: BasisFacts): (inForce: PlanInForce, years: number) => YearPlans {
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
    const first = ofPlan[0]?.withoutRoof ?? planByDays(planWithoutRoof(inForce));
    const plans = {
      withRoof: escalatePlan(ofPlan[0]?.withRoof ?? planByDays(inForce.plan), rise, years),
      withoutRoof: escalatePlan(first, rise, years),
    };
    ofPlan[years] = plans;
    return plans;
  };
}

function powerOf(house: BasisFacts['house']): CycleUsage['kW'] {
  const watts = dcWattsOf(house.arrays);
  return {
    dc: new Exact(watts).div(1000).toString(),
    ...(house.inverterAcWatts === null ? {} : { ac: new Exact(house.inverterAcWatts).div(1000).toString() }),
  };
}
