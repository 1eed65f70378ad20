import type { RatePlan, RateRow } from '../settlement/plan.ts';
import { Exact, exact } from '../units/rate.ts';
import type { DecimalText } from '../units/rate-text.ts';

/** Decimals a projected price is rounded to: a ten-thousandth of a cent, finer than any printed rate. */
const PRICE_DECIMALS = 6;

/** A rate after whole years of a yearly rise: rate × (1 + rise)^years, rounded half-up to `decimals`. */
export function escalateRate(
  rate: DecimalText,
  rise: DecimalText,
  years: number,
  decimals: number = PRICE_DECIMALS,
): DecimalText {
  return exact(rate)
    .times(new Exact(1).plus(exact(rise)).pow(years))
    .toDecimalPlaces(decimals, Exact.ROUND_HALF_UP)
    .toString();
}

/** Plans kept per plan: settling makes each ready once, so the same object must come back. */
const MADE_AT_MOST = 120;
const made = new WeakMap<RatePlan, Map<string, RatePlan>>();

/**
 * The plan with every price raised: energy, fixed, per-day and per-kW charges, minimums, export credits and the prices a true-up pays. Percentages
 * (taxes), tier limits, caps, and an incentive's contracted rate stay.
 */
export function escalatePlan(plan: RatePlan, rise: DecimalText, years: number): RatePlan {
  if (years === 0 || exact(rise).isZero()) return plan;
  let ofPlan = made.get(plan);
  if (!ofPlan) {
    ofPlan = new Map();
    made.set(plan, ofPlan);
  }
  const key = `${rise} ${years}`;
  const known = ofPlan.get(key);
  if (known) return known;
  const raised = raisedPlan(plan, rise, years);
  // Sliders try many rises; only the latest few are worth keeping.
  if (ofPlan.size >= MADE_AT_MOST) ofPlan.clear();
  ofPlan.set(key, raised);
  return raised;
}

function raisedPlan(plan: RatePlan, rise: DecimalText, years: number): RatePlan {
  const raised = (rows: RateRow[]): RateRow[] =>
    rows.map((row) => ({ ...row, rate: escalateRate(row.rate, rise, years) }));
  return {
    ...plan,
    charges: plan.charges.map((charge) =>
      charge.basis === 'percent' ? charge : { ...charge, rates: raised(charge.rates) },
    ),
    credits: plan.credits.map((credit) =>
      credit.kind === 'incentive' || credit.rates === null ? credit : { ...credit, rates: raised(credit.rates) },
    ),
    banks: plan.banks.map((bank) => ({
      ...bank,
      trueUps: bank.trueUps.map((trueUp) =>
        trueUp.rates === null ? trueUp : { ...trueUp, rates: raised(trueUp.rates) },
      ),
    })),
  };
}
