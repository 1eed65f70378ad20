import { addDays, type Day } from '../units/day.ts';
import type { Cycle } from './cycle-flows.ts';
import { canUseIntervals } from './energy-figures.ts';
import type { EnergyItem } from './energy-share.ts';
import { type Part, splitCycle } from './parts.ts';
import { keptAt } from './place.ts';
import { minus, priced, type Qty, type Rate, roundToWhole, times } from './quantity.ts';
import { limitsAt, priceAt } from './rates-in-force.ts';
import { daysInBoth } from './term-pieces.ts';
import { type Bounds, boundsOf, kWhInTier } from './tier-pieces.ts';

type Term = { firstDay: Day; lastDay: Day };

/** A part of a cycle with its price looked up: its share of the kWh is `days` of `allDays`. */
type PricedPart = {
  days: number;
  /** The rate of each tier; one where the item has no tiers. */
  rates: readonly Rate[];
  bounds: Bounds | null;
  /** Days within the credit's term; null where it has none or the part lies in it whole. */
  termDays: number | null;
};

/** An item priced by the kWh, compiled for one cycle. */
export type CompiledEnergy = {
  parts: readonly PricedPart[];
  /** The one rate of an item that is neither split, tiered nor in a term. */
  flat: Rate | null;
  allDays: number;
  wholeKwh: boolean;
  rounding: Cycle['prepared']['plan']['rounding']['money'];
};

/**
 * Looks up every price an item can have in a cycle, so that pricing a quantity is arithmetic alone. Null where the item needs what only a full
 * settlement can tell: prices by period, a change by intervals, a rate that is missing or too long for whole numbers.
 */
export function compileEnergy(cycle: Cycle, item: EnergyItem, term: Term | null): CompiledEnergy | null {
  const { pricing } = item;
  const { plan } = cycle.prepared;
  if (pricing.byPeriod) return null;
  const parts = splitCycle(cycle, pricing, canUseIntervals(cycle, item));
  const compiled: PricedPart[] = [];
  for (const part of parts) {
    if (!part.group.whole) return null;
    const made = compilePart(cycle, item, part, term);
    if (made === null) return null;
    compiled.push(made);
  }
  const [only] = compiled;
  const isFlat = only && compiled.length === 1 && only.bounds === null && only.termDays === null;
  return {
    parts: compiled,
    flat: isFlat ? keptAt(only.rates, 0) : null,
    allDays: cycle.days,
    wholeKwh: plan.rounding.kWh === 'whole',
    rounding: plan.rounding.money,
  };
}

function compilePart(cycle: Cycle, item: EnergyItem, part: Part, term: Term | null): PricedPart | null {
  const limits = item.pricing.tiers.length > 0 ? limitsAt(item.pricing, part.rateDay, part.season) : null;
  const bounds = limits ? boundsOf(cycle, part, limits) : null;
  const rates: Rate[] = [];
  for (let tier = 1; tier <= (bounds?.upper.length ?? 0) + 1; tier += 1) {
    const price = priceAt(item.pricing, part.rateDay, part.season, null, bounds ? tier : null);
    if (price === null || price.rate.int === null) return null;
    rates.push(price.rate);
  }
  const termDays = term ? daysInTerm(cycle, part, term) : part.days;
  return { days: part.days, rates, bounds, termDays: termDays === part.days ? null : termDays };
}

function daysInTerm(cycle: Cycle, part: Part, term: Term): number {
  if (cycle.prepared.plan.rateChangeBy === 'readDate') {
    return cycle.to >= term.firstDay && cycle.to <= term.lastDay ? part.days : 0;
  }
  return daysInBoth(part, { from: term.firstDay, to: addDays(term.lastDay, 1) });
}

/** What a quantity in Wh comes to in cents, each part and tier rounded as a line of its own; `each` is told the amount of each. */
export function energyCents(item: CompiledEnergy, n: Qty, each: ((amount: number) => void) | null = null): number {
  if (item.flat !== null) {
    const amount = priced(n, 1, item.flat, item.rounding);
    each?.(amount);
    return amount;
  }
  const { parts, allDays } = item;
  const isSplit = parts.length > 1;
  let sum = 0;
  let daysBefore = 0;
  let wholeBefore: Qty = 0;
  for (const part of parts) {
    let share: Qty = n;
    let d: Qty = 1;
    if (isSplit && item.wholeKwh) {
      daysBefore += part.days;
      const through = roundToWhole(times(n, daysBefore), allDays);
      share = minus(through, wholeBefore);
      wholeBefore = through;
    } else if (isSplit) {
      share = times(n, part.days);
      d = allDays;
    }
    sum += partCents(item, part, share, d, each);
  }
  return sum;
}

function partCents(
  item: CompiledEnergy,
  part: PricedPart,
  share: Qty,
  d: Qty,
  each: ((amount: number) => void) | null,
): number {
  const { bounds } = part;
  const total = bounds === null ? share : times(share, bounds.scale);
  let sum = 0;
  let tier = 1;
  for (const rate of part.rates) {
    let top = bounds === null ? share : kWhInTier(total, bounds, tier, d);
    let bottom = bounds === null ? d : times(d, bounds.scale);
    if (part.termDays !== null) {
      top = times(top, part.termDays);
      bottom = times(bottom, part.days);
      if (item.wholeKwh) {
        top = roundToWhole(top, bottom);
        bottom = 1;
      }
    }
    const amount = priced(top, bottom, rate, item.rounding);
    each?.(amount);
    sum += amount;
    tier += 1;
  }
  return sum;
}
