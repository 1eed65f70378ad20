import type { Charge, Credit, Netting, Period, PlanBank, RatePlan, TrueUp } from './plan.ts';
import { planFaults } from './plan-faults.ts';
import { isLate } from './plan-kinds.ts';
import { type Qty, qtyOfText } from './quantity.ts';
import { derivedPricing, ownPricing, type Pricing } from './rates-in-force.ts';
import { refuse } from './refused.ts';

export type PreparedCharge = { charge: Charge; pricing: Pricing; netting: Netting; unit: ChargeUnit };
export type PreparedCredit = { credit: Credit; pricing: Pricing; netting: Netting };
export type PreparedTrueUp = { trueUp: TrueUp; pricing: Pricing; atLeast: Qty; fee: Qty; keep: Qty };
export type PreparedBank = {
  bank: PlanBank;
  netting: Netting;
  ratio: Qty;
  trueUps: readonly PreparedTrueUp[];
  /** The ids of its `offsets`. */
  pays: ReadonlySet<string>;
  /** USD: the floor it must leave whole. */
  floor: PreparedCharge | null;
  averages: TrueUp['keep'];
};
export type ChargeUnit = 'kWh' | 'cycle' | 'day' | 'kW' | 'USD';

/** A plan with everything looked up once: settling a cycle only reads it. */
export type PreparedPlan = {
  plan: RatePlan;
  name: string;
  charges: readonly PreparedCharge[];
  /** Charges worked out before credits, and floors and percents after them. */
  early: readonly PreparedCharge[];
  late: readonly PreparedCharge[];
  credits: readonly PreparedCredit[];
  banks: readonly PreparedBank[];
  charge: ReadonlyMap<string, PreparedCharge>;
  period: ReadonlyMap<string, Period>;
  /** Ids of charges whose kWh a kWh bank lowers. */
  banked: ReadonlySet<string>;
  /** Ids of charges a USD or kWh bank takes whole (a yearly ledger): their lines are not in due. */
  taken: ReadonlySet<string>;
  round: 'roundCents' | 'roundCentsEven';
};

const prepared = new WeakMap<RatePlan, PreparedPlan>();

/** The plan made ready, once per plan object; a plan is plain data and never changed in place. */
export function preparePlan(plan: RatePlan): PreparedPlan {
  const known = prepared.get(plan);
  if (known) return known;
  const made = prepare(plan);
  prepared.set(plan, made);
  return made;
}

export function chargeUnit(charge: Charge): ChargeUnit {
  switch (charge.basis) {
    case 'cycle':
    case 'day':
    case 'kW':
      return charge.basis;
    case 'percent':
    case 'floor':
      return 'USD';
    default:
      return 'kWh';
  }
}

function prepare(plan: RatePlan): PreparedPlan {
  const [fault] = planFaults(plan);
  if (fault) refuse(fault.message);
  const name = plan.name || 'Rate plan';
  const charges = plan.charges.map((charge): PreparedCharge => {
    const unit = chargeUnit(charge);
    const rateUnit = charge.basis === 'percent' ? 'fraction' : unit === 'USD' ? `USD/${charge.per}` : `USD/${unit}`;
    const pricing = ownPricing(charge.rates, charge.tiers, name, rateUnit);
    return { charge, unit, pricing, netting: charge.netting ?? plan.netting };
  });
  const charge = new Map(charges.map((item) => [item.charge.id, item]));
  const pricingOf = (item: { rates: Credit['rates']; ratesOf: Credit['ratesOf'] }): Pricing => {
    if (item.ratesOf) {
      const parts = item.ratesOf.charges.flatMap((id) => charges.filter((part) => part.charge.id === id));
      return derivedPricing(
        item.ratesOf,
        parts.map((part) => ({ label: part.charge.label, pricing: part.pricing })),
      );
    }
    return ownPricing(item.rates ?? [], [], name, 'USD/kWh');
  };
  const banks = plan.banks.map((bank): PreparedBank => {
    const trueUps = bank.trueUps.map(
      (trueUp): PreparedTrueUp => ({
        trueUp,
        pricing: pricingOf(trueUp),
        atLeast: qtyOfText(trueUp.atLeast),
        fee: qtyOfText(trueUp.fee),
        keep: trueUp.keep && 'amount' in trueUp.keep ? qtyOfText(trueUp.keep.amount) : 0,
      }),
    );
    return {
      bank,
      netting: bank.netting ?? plan.netting,
      ratio: qtyOfText(bank.ratio),
      trueUps,
      pays: new Set(bank.offsets),
      floor: charges.find((item) => item.charge.id === bank.keepMinimum) ?? null,
      averages: trueUps.map(({ trueUp }) => trueUp.keep).find((keep) => keep && 'averageCycles' in keep) ?? null,
    };
  });
  return {
    plan,
    name,
    charges,
    early: charges.filter((item) => !isLate(item.charge)),
    late: charges.filter((item) => isLate(item.charge)),
    credits: plan.credits.map((credit) => ({
      credit,
      netting: credit.netting ?? plan.netting,
      pricing: pricingOf(credit),
    })),
    banks,
    charge,
    period: new Map(plan.calendar.periods.map((period) => [period.id, period])),
    banked: new Set(banks.filter(({ bank }) => bank.unit === 'kWh').flatMap(({ bank }) => bank.offsets)),
    taken: new Set(banks.filter(({ bank }) => bank.belowZero).flatMap(({ bank }) => bank.offsets)),
    round: plan.rounding.money === 'halfEven' ? 'roundCentsEven' : 'roundCents',
  };
}
