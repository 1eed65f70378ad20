import type { Charge, RatePlan, RateRow, RatesOf, TierRow } from '../../settlement/plan.ts';
import { type PreparedPlan, preparePlan } from '../../settlement/prepare.ts';
import type { Pricing } from '../../settlement/rates-in-force.ts';
import { withBank, withCharges, withCredits } from './plan-edit.ts';

/** Prices to put in place of an item's own. */
export type Prices = { rates: RateRow[] | null; ratesOf: RatesOf | null; tiers: TierRow[] };

/** Something a plan puts a price on: a charge, a credit, or what a bank pays at its true-up. */
export type PricedItem = Prices & {
  /** The component of its lines: a bank's id for its true-up. */
  id: string;
  label: string;
  /** Whether it pays the customer: what may be halved. */
  credits: boolean;
  /** Its prices made ready, where they are taken from other charges. */
  derived: Pricing | null;
  put: (plan: RatePlan, prices: Prices) => RatePlan;
};

export function pricedItems(plan: RatePlan): PricedItem[] {
  const prepared = preparePlan(plan);
  return [...plan.charges.map(chargeItem), ...creditItems(prepared), ...trueUpItems(prepared)];
}

function chargeItem({ id, label, rates, tiers }: Charge): PricedItem {
  return {
    id,
    label,
    credits: false,
    rates,
    ratesOf: null,
    tiers,
    derived: null,
    put: (plan, prices) =>
      withCharges(plan, [id], (charge) => ({ ...charge, rates: prices.rates ?? rates, tiers: prices.tiers })),
  };
}

function creditItems({ credits }: PreparedPlan): PricedItem[] {
  return credits.map(({ credit: { id, label, rates, ratesOf }, pricing }) => ({
    id,
    label,
    credits: true,
    rates,
    ratesOf,
    tiers: [],
    derived: ratesOf === null ? null : pricing,
    put: (plan, prices) =>
      withCredits(plan, [id], (credit) => ({ ...credit, rates: prices.rates, ratesOf: prices.ratesOf })),
  }));
}

function trueUpItems({ banks }: PreparedPlan): PricedItem[] {
  return banks.flatMap(({ bank: { id, label }, trueUps }) =>
    trueUps.flatMap(({ trueUp: { rates, ratesOf }, pricing }, index): PricedItem[] => {
      if (pricing === null) return [];
      const derived = ratesOf === null ? null : pricing;
      const put: PricedItem['put'] = (plan, prices) =>
        withBank(plan, id, (bank) => ({
          ...bank,
          trueUps: bank.trueUps.map((one, at) =>
            at === index ? { ...one, rates: prices.rates, ratesOf: prices.ratesOf } : one,
          ),
        }));
      return [{ id, label, credits: true, rates, ratesOf, tiers: [], derived, put }];
    }),
  );
}
