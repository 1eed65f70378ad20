import { dcWattsOf } from '../facts/dc-rating.ts';
import type { PlanInForce } from '../facts/household.ts';
import type { RatePlan } from '../settlement/plan.ts';
import { planFor } from '../settlement/plan-in-force.ts';
import { type SettledAmounts, settleAmounts } from '../settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING, type Opening } from '../settlement/settlement.ts';
import { planWithoutRoof } from '../settlement/without-roof.ts';
import { type Cents, cents } from '../units/cents.ts';
import { ZERO_WH } from '../units/energy.ts';
import { Exact } from '../units/rate.ts';
import { bankWorth } from './bank-worth.ts';
import type { BasisFacts } from './basis.ts';
import type { Changes } from './changes.ts';
import { escalatePlan } from './escalate.ts';
import type { Period, PeriodEnergy } from './periods.ts';

/** What a month's two bills leave, and what the utility's banks are worth after it. */
export type ProjectedBill = { avoidedCents: Cents; bankCents: Cents };

export type ProjectedBills = { ok: true; bills: ProjectedBill[] } | { ok: false; why: string };

/** A plan in a year to come: with the roof and without it. */
type YearPlans = { withRoof: RatePlan; withoutRoof: RatePlan };

/**
 * Settles every month with the roof and without it, under the plan in force with its prices raised by whole years; both carry their own banks. Months
 * that begin on or after the day the house is sold have no bill, and the banks are lost with the account.
 */
export function projectBills(
  facts: BasisFacts,
  changes: Pick<Changes, 'plan' | 'endsOn'>,
  periods: readonly Period[],
  energies: readonly PeriodEnergy[],
  opening: Opening,
): ProjectedBills {
  const planOf = planYears(facts);
  const kW = powerOf(facts.house);
  const incentiveApart = facts.incentive !== null;
  let withRoof: Opening = { ...opening, balanceCents: null };
  let without: Opening = EMPTY_OPENING;
  const bills: ProjectedBill[] = [];
  for (const [at, period] of periods.entries()) {
    if (changes.endsOn !== null && period.from >= changes.endsOn) {
      bills.push(NO_BILL);
      continue;
    }
    const energy = energies[at];
    const inForce = planFor(facts.plans, period.from);
    if (!inForce || !energy) return { ok: false, why: 'There is no rate plan for the months to come.' };
    const years = planOf(inForce, Math.floor(period.index / 12));
    const plan = changes.plan ? changes.plan(years.withRoof, period) : years.withRoof;
    const usage = usageOf(period, energy, kW);
    const roof = settleAmounts(plan, withRoof, usage);
    const plain = settleAmounts(years.withoutRoof, without, {
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
    const asItWas = electricDue(roof.value.settlement, incentiveApart);
    const avoided = electricDue(plain.value.settlement, false) - asItWas;
    const bank = bankWorth(plan, withRoof, period.from, period.to);
    bills.push({ avoidedCents: cents(avoided), bankCents: cents(bank) });
  }
  return { ok: true, bills };
}

const NO_BILL: ProjectedBill = { avoidedCents: cents(0), bankCents: cents(0) };

function usageOf(period: Period, energy: PeriodEnergy, kW: CycleUsage['kW']): CycleUsage {
  return {
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
    const first = ofPlan[0]?.withoutRoof ?? planWithoutRoof(inForce);
    const plans = {
      withRoof: escalatePlan(inForce.plan, rise, years),
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
