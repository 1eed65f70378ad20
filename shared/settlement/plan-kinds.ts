import type { Charge, Credit, RatePlan, RatesOf } from './plan.ts';

/** One thing a plan may not say: where, and a sentence that says why. */
export type PlanFault = { path: (string | number)[]; message: string };

/** Whether a charge is worked out after credits (step 6). */
export function isLate(charge: Charge): boolean {
  return charge.basis === 'floor' || (charge.basis === 'percent' && charge.afterCredits);
}

const KWH_BASES: readonly Charge['basis'][] = ['import', 'export', 'production', 'load'];

/** Whether a charge is by the kWh. */
export function isEnergy(charge: Charge): boolean {
  return KWH_BASES.includes(charge.basis);
}

/** Whether a charge is priced by time-of-use period: one row that names one is enough. */
export function pricedByPeriod(charge: Charge): boolean {
  return charge.rates.some((row) => row.period !== undefined);
}

/** Whether a credit or a true-up is priced by period, by its own rows or by those of the charges it takes its rate from. */
export function creditByPeriod(plan: RatePlan, credit: { rates: Credit['rates']; ratesOf: RatesOf | null }): boolean {
  if (credit.rates) return credit.rates.some((row) => row.period !== undefined);
  return plan.charges.some((charge) => credit.ratesOf?.charges.includes(charge.id) && pricedByPeriod(charge));
}
