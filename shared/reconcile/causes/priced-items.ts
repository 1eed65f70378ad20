import type { Charge, RatePlan, RateRow, RatesOf, TierRow, TrueUp } from '../../settlement/plan.ts';
import { type PreparedPlan, preparePlan } from '../../settlement/prepare.ts';
import type { Pricing } from '../../settlement/rates-in-force.ts';
import { withBank, withCharges, withCredits } from './plan-edit.ts';

/** Prices of an item, or to put in place of its own: rows, or a share of other charges' rates and no rows. */
export type Prices = { rates: RateRow[]; ratesOf: RatesOf | null; tiers: TierRow[] };

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

/** What a rider charges is read from the bill itself, and so is no price to be wrong (ledger.md §3). */
export function pricedItems(plan: RatePlan): PricedItem[] {
  const prepared = preparePlan(plan);
  return [
    ...plan.charges.filter((charge) => !charge.learned).map(chargeItem),
    ...creditItems(prepared),
    ...trueUpItems(prepared),
  ];
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
      withCharges(plan, [id], (charge) => ({ ...charge, rates: prices.rates, tiers: prices.tiers })),
  };
}

function creditItems({ credits }: PreparedPlan): PricedItem[] {
  return credits.map(({ credit: { id, label, rates, ratesOf }, pricing }) => ({
    id,
    label,
    credits: true,
    rates: rates ?? [],
    ratesOf,
    tiers: [],
    derived: ratesOf === null ? null : pricing,
    put: (plan, prices) => withCredits(plan, [id], (credit) => ({ ...credit, ...pricesOf(prices) })),
  }));
}

function pricesOf({ rates, ratesOf }: Prices): Pick<TrueUp, 'rates' | 'ratesOf'> {
  return ratesOf === null ? { rates, ratesOf } : { rates: null, ratesOf };
}

function trueUpItems({ banks }: PreparedPlan): PricedItem[] {
  return banks.flatMap(({ bank: { id, label }, trueUps }) =>
    trueUps.flatMap(({ trueUp: { rates, ratesOf }, pricing }, index): PricedItem[] => {
      if (rates === null && ratesOf === null) return [];
      const derived = ratesOf === null ? null : pricing;
      const put: PricedItem['put'] = (plan, prices) =>
        withBank(plan, id, (bank) => ({
          ...bank,
          trueUps: bank.trueUps.map((one, at) => (at === index ? { ...one, ...pricesOf(prices) } : one)),
        }));
      return [{ id, label, credits: true, rates: rates ?? [], ratesOf, tiers: [], derived, put }];
    }),
  );
}
