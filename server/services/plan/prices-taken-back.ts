import type { RatePlan, RateRow, TierRow } from '#shared/settlement/plan.ts';
import type { Day } from '#shared/units/day.ts';

/**
 * The plan with its first prices holding from `day`, so that a plan with prices of today can be tried on cycles before them. `moved` says
 * whether any were; a plan whose prices already reach back is handed back as it is.
 */
export function pricesTakenBack(plan: RatePlan, day: Day): { plan: RatePlan; moved: boolean } {
  let moved = false;
  const back = <T extends RateRow | TierRow>(rows: T[]): T[] => {
    const first = rows.map((row) => row.from).sort()[0];
    if (first === undefined || first <= day) return rows;
    moved = true;
    return rows.map((row) => (row.from === first ? { ...row, from: day } : row));
  };
  const taken: RatePlan = {
    ...plan,
    charges: plan.charges.map((charge) => ({ ...charge, rates: back(charge.rates), tiers: back(charge.tiers) })),
    credits: plan.credits.map((credit) => ({ ...credit, rates: credit.rates && back(credit.rates) })),
    banks: plan.banks.map((bank) => ({
      ...bank,
      trueUps: bank.trueUps.map((trueUp) => ({ ...trueUp, rates: trueUp.rates && back(trueUp.rates) })),
    })),
  };
  return moved ? { plan: taken, moved } : { plan, moved };
}
