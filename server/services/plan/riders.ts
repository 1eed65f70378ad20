import type { TrialView } from '#shared/api/plan.ts';
import type { PlanInForce } from '#shared/facts/household.ts';
import { type LearnedRates, pricedAsLearned } from '#shared/ledger/learned-rates.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import type { Day } from '#shared/units/day.ts';

/** A rider of a plan on trial whose price is read from bills, and the house's own rider that stands for it; null where it has none. */
type Rider = { id: string; label: string; own: string | null };

/** The riders of a plan on trial: each is the house's rider of the same id, else of the same name. */
export function ridersOf(trial: RatePlan, plans: readonly PlanInForce[]): Rider[] {
  const known = plans.flatMap(({ plan }) => plan.charges.filter((charge) => charge.learned));
  return trial.charges
    .filter((charge) => charge.learned)
    .map(({ id, label }) => {
      const own = known.find((one) => one.id === id) ?? known.find((one) => sameName(one.label, label));
      return { id, label, own: own?.id ?? null };
    });
}

/** The plan on trial with its riders at the prices this cycle's bill taught, and which of them had one. */
export function withRiders(
  plan: RatePlan,
  riders: readonly Rider[],
  learned: LearnedRates,
  from: Day,
): { plan: RatePlan; asPrinted: string[] } {
  const rates: Record<string, string> = {};
  for (const { id, own } of riders) {
    const rate = own === null ? undefined : learned[own];
    if (rate !== undefined) rates[id] = rate;
  }
  return { plan: pricedAsLearned(plan, rates, from), asPrinted: Object.keys(rates) };
}

/** What to say of the riders: on how many of the cycles each was at the price the bills print. */
export function saidOf(riders: readonly Rider[], cycles: readonly (readonly string[])[]): TrialView['riders'] {
  return riders.map(({ id, label }) => ({
    label,
    asPrinted: cycles.filter((printed) => printed.includes(id)).length,
    cycles: cycles.length,
  }));
}

function sameName(one: string, other: string): boolean {
  return one.trim().toLowerCase() === other.trim().toLowerCase();
}
