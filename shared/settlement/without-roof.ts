import type { PlanInForce } from '../facts/household.ts';
import type { Charge, RatePlan } from './plan.ts';

const made = new WeakMap<PlanInForce, RatePlan>();

/**
 * The plan the house would have without a roof: its own, where one is stated; else the same utility's plan without credits, banks, netting and
 * what is charged only because of the roof (`solarOnly`, and by their nature charges on export, production or the roof's kW). A charge on the
 * house's use is one on import, since without a roof they are the same.
 */
export function planWithoutRoof(inForce: PlanInForce): RatePlan {
  if (inForce.withoutRoof) return inForce.withoutRoof;
  const known = made.get(inForce);
  if (known) return known;
  const plan = dropRoof(inForce.plan);
  made.set(inForce, plan);
  return plan;
}

function dropRoof(plan: RatePlan): RatePlan {
  const kept = new Set<string>();
  const charges: Charge[] = [];
  for (const charge of plan.charges) {
    if (isForRoof(charge)) continue;
    const on = charge.on.filter((id) => kept.has(id));
    if (charge.on.length > 0 && on.length === 0) continue;
    kept.add(charge.id);
    charges.push({ ...charge, on, netting: null, basis: charge.basis === 'load' ? 'import' : charge.basis });
  }
  return { ...plan, netting: 'none', load: 'none', charges, credits: [], banks: [] };
}

function isForRoof(charge: Charge): boolean {
  if (charge.solarOnly || charge.basis === 'export' || charge.basis === 'production') return true;
  return charge.basis === 'kW' && charge.kWOf !== 'demand';
}
