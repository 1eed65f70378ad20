import type { RatePlan } from '../settlement/plan.ts';
import type { Day } from '../units/day.ts';
import type { BasisFacts, Flow } from './basis.ts';
import type { Period, PeriodEnergy } from './periods.ts';

/** What is different from the record in a projection that tries something. Each part is left alone by `NO_CHANGES`. */
export type Changes = {
  /** Facts that stand in the place of the record's: another loan, other plans, other assumptions. */
  facts: Partial<BasisFacts>;
  /** Money beside what the facts bring: a replacement, a prepayment's cost, the price of a roof sold. */
  flows: readonly Flow[];
  /** Changes a month's energy, such as more use from a day on. */
  energy: ((energy: PeriodEnergy, period: Period) => PeriodEnergy) | null;
  /**
   * Changes the plan a month is settled by, after its prices were raised. A settlement is made ready once per plan object: give the same object back for
   * the same plan.
   */
  plan: ((plan: RatePlan, period: Period) => RatePlan) | null;
  /** The house is sold: bills, incentive, insurance and upkeep end before this day and the loans are paid off on it. */
  endsOn: Day | null;
};

export const NO_CHANGES: Changes = { facts: {}, flows: [], energy: null, plan: null, endsOn: null };
