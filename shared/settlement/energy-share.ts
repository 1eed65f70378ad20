import type { WorkingInput } from '../working.ts';
import type { Basis, LessBank } from './energy-figures.ts';
import type { Part } from './parts.ts';
import type { Netting } from './plan.ts';
import type { Qty } from './quantity.ts';
import { type Price, type Pricing, priceAt } from './rates-in-force.ts';
import { refuse } from './refused.ts';

/** What is priced by the kWh: a charge, or the kWh of a credit. */
export type EnergyItem = { label: string; basis: Basis; netting: Netting; pricing: Pricing; lessBank: LessBank | null };

/** A share of kWh in a part before it is tiered and priced: `n / d` thousandths of kWh, and the formula that says so (`top / bottom`). */
export type Share = { period: string | null; n: Qty; d: Qty; top: string; bottom: string; inputs: WorkingInput[] };

/** The price of an item in a part; refused when there is none. */
export function mustPrice(
  item: { pricing: Pricing },
  label: string,
  part: Part,
  period: string | null,
  tier: number | null,
): Price {
  const price = priceAt(item.pricing, part.rateDay, part.season, period, tier);
  if (price) return price;
  const of = [part.season, period, tier === null ? null : `tier ${tier}`].filter((name) => name !== null).join(', ');
  return refuse(`${label} has no rate in force on ${part.rateDay}${of === '' ? '' : ` for ${of}`}.`);
}

/** The inputs `days` and `allDays` of what is shared by days. */
export function dayInputs(days: number, allDays: number): WorkingInput[] {
  const source = { kind: 'figure', name: 'days' } as const;
  return [
    { name: 'days', label: 'Days of this part', value: String(days), unit: 'days', source },
    { name: 'allDays', label: 'Days shared over', value: String(allDays), unit: 'days', source },
  ];
}
