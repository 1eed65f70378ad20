import type { Charge, Credit, PlanBank, RatePlan } from '../../settlement/plan.ts';

/** A plan with some of its charges changed; the plan itself is never changed in place. */
export function withCharges(plan: RatePlan, ids: readonly string[], change: (charge: Charge) => Charge): RatePlan {
  return { ...plan, charges: plan.charges.map((charge) => (ids.includes(charge.id) ? change(charge) : charge)) };
}

export function withCredits(plan: RatePlan, ids: readonly string[], change: (credit: Credit) => Credit): RatePlan {
  return { ...plan, credits: plan.credits.map((credit) => (ids.includes(credit.id) ? change(credit) : credit)) };
}

export function withBank(plan: RatePlan, id: string, change: (bank: PlanBank) => PlanBank): RatePlan {
  return { ...plan, banks: plan.banks.map((bank) => (bank.id === id ? change(bank) : bank)) };
}

/** A plan whose kWh banks no longer lower these charges. */
export function withoutKwhOffsets(plan: RatePlan, ids: readonly string[]): RatePlan {
  return {
    ...plan,
    banks: plan.banks.map((bank) =>
      bank.unit === 'kWh' ? { ...bank, offsets: bank.offsets.filter((id) => !ids.includes(id)) } : bank,
    ),
  };
}

/** Each item alone, and all together where there are several. */
export function eachAndAll<Item>(items: readonly Item[]): Item[][] {
  return [...items.map((item) => [item]), ...(items.length > 1 ? [[...items]] : [])];
}

/** Every choice of one or more of a few items, the smaller first. */
export function subsets<Item>(items: readonly Item[]): Item[][] {
  let made: Item[][] = [[]];
  for (const item of items) made = [...made, ...made.map((chosen) => [...chosen, item])];
  return made.filter((chosen) => chosen.length > 0).sort((a, b) => a.length - b.length);
}

/** "Energy", "Energy and Delivery", "Energy, Delivery and Supply". */
export function sayList(names: readonly string[]): string {
  const last = names.slice(-1).join('');
  return names.length < 2 ? last : `${names.slice(0, -1).join(', ')} and ${last}`;
}
