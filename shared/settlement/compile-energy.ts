import { addDays, type Day } from '../units/day.ts';
import type { Cycle } from './cycle-flows.ts';
import { canUseIntervals } from './energy-figures.ts';
import { daysHeld } from './energy-pieces.ts';
import type { EnergyItem } from './energy-share.ts';
import { type Part, splitCycle } from './parts.ts';
import { keptAt } from './place.ts';
import { minus, priced, type Qty, type Rate, roundToWhole, times } from './quantity.ts';
import { limitsAt, priceAt } from './rates-in-force.ts';
import { refuse } from './refused.ts';
import { daysInBoth } from './term-pieces.ts';
import { type Bounds, boundsOf, kWhInTier } from './tier-pieces.ts';

type Term = { firstDay: Day; lastDay: Day };

/** A part of a cycle with its price looked up: its share of the kWh is `days` of `allDays`. */
type PricedPart = {
  days: number;
  /** The rate of each tier; one where the item has no tiers. */
  rates: readonly Rate[];
  bounds: Bounds | null;
  /** In the calendar's order; empty where the item is not priced by period. */
  periods: readonly PricedPeriod[];
  /** Days within the credit's term; null where it has none or the part lies in it whole. */
  termDays: number | null;
};

/** A period's price in a part, null where it has none; and the days its kWh are shared over, null where the part has none of its hours. */
type PricedPeriod = { rate: Rate | null; held: number | null };

/** An item priced by the kWh, compiled for one cycle. */
export type CompiledEnergy = {
  label: string;
  byPeriod: boolean;
  parts: readonly PricedPart[];
  /** The one rate of an item that is neither split, tiered nor in a term. */
  flat: Rate | null;
  allDays: number;
  wholeKwh: boolean;
  rounding: Cycle['prepared']['plan']['rounding']['money'];
};

/**
 * Looks up every price an item can have in a cycle, so that pricing a quantity is arithmetic alone. Null where the item needs what only a full
 * settlement can tell: tiers over periods, a change by intervals, a rate that is missing or too long for whole numbers.
 */
export function compileEnergy(cycle: Cycle, item: EnergyItem, term: Term | null): CompiledEnergy | null {
  const { pricing } = item;
  const { plan } = cycle.prepared;
  const parts = splitCycle(cycle, pricing, canUseIntervals(cycle, item));
  const compiled: PricedPart[] = [];
  for (const part of parts) {
    if (!part.group.whole) return null;
    const made = compilePart(cycle, item, part, parts, term);
    if (made === null) return null;
    compiled.push(made);
  }
  const [only] = compiled;
  const isFlat = only && compiled.length === 1 && only.bounds === null && only.termDays === null && !pricing.byPeriod;
  return {
    label: item.label,
    parts: compiled,
    byPeriod: pricing.byPeriod,
    flat: isFlat ? keptAt(only.rates, 0) : null,
    allDays: cycle.days,
    wholeKwh: plan.rounding.kWh === 'whole',
    rounding: plan.rounding.money,
  };
}

function compilePart(
  cycle: Cycle,
  item: EnergyItem,
  part: Part,
  parts: readonly Part[],
  term: Term | null,
): PricedPart | null {
  const days = term ? daysInTerm(cycle, part, term) : part.days;
  const termDays = days === part.days ? null : days;
  if (item.pricing.byPeriod) {
    if (item.pricing.tiers.length > 0) return null;
    const periods: PricedPeriod[] = [];
    for (const period of cycle.prepared.period.keys()) {
      const rate = priceAt(item.pricing, part.rateDay, part.season, period, null)?.rate ?? null;
      if (rate?.int === null) return null;
      periods.push({ rate, held: parts.length === 1 ? part.days : daysHeld(cycle, period, part, parts) });
    }
    return { days: part.days, rates: [], bounds: null, periods, termDays };
  }
  const limits = item.pricing.tiers.length > 0 ? limitsAt(item.pricing, part.rateDay, part.season) : null;
  const bounds = limits ? boundsOf(cycle, part, limits) : null;
  const rates: Rate[] = [];
  for (let tier = 1; tier <= (bounds?.upper.length ?? 0) + 1; tier += 1) {
    const price = priceAt(item.pricing, part.rateDay, part.season, null, bounds ? tier : null);
    if (price === null || price.rate.int === null) return null;
    rates.push(price.rate);
  }
  return { days: part.days, rates, bounds, periods: [], termDays };
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
    const top = bounds === null ? share : kWhInTier(total, bounds, tier, d);
    const bottom = bounds === null ? d : times(d, bounds.scale);
    const amount = amountOf(item, part, top, bottom, rate);
    each?.(amount);
    sum += amount;
    tier += 1;
  }
  return sum;
}

/** A quantity `top / bottom` at a rate, less what lies outside the credit's term. */
function amountOf(item: CompiledEnergy, part: PricedPart, top: Qty, bottom: Qty, rate: Rate): number {
  if (part.termDays === null) return priced(top, bottom, rate, item.rounding);
  const inTerm = times(top, part.termDays);
  const over = times(bottom, part.days);
  return item.wholeKwh
    ? priced(roundToWhole(inTerm, over), 1, rate, item.rounding)
    : priced(inTerm, over, rate, item.rounding);
}

/**
 * What an item priced by period comes to in cents, in each part its periods in the calendar's order; null for a period the cycle has no hours of. Refused where one has
 * no price.
 */
export function periodCents(
  item: CompiledEnergy,
  amounts: readonly (number | null)[],
  each: ((amount: number) => void) | null,
): number {
  const given = amounts.map((): { days: number; whole: Qty } => ({ days: 0, whole: 0 }));
  let sum = 0;
  for (const part of item.parts) {
    for (const [at, { rate, held }] of part.periods.entries()) {
      const n = keptAt(amounts, at);
      if (n === null || held === null) continue;
      let top: Qty = n;
      let bottom = 1;
      if (held !== part.days && item.wholeKwh) {
        const before = keptAt(given, at);
        const days = before.days + part.days;
        const whole = roundToWhole(times(n, days), held);
        given[at] = { days, whole };
        top = minus(whole, before.whole);
      } else if (held !== part.days) {
        top = times(n, part.days);
        bottom = held;
      }
      const price = rate ?? refuse(`${item.label} has no rate in force for one of its periods.`);
      const amount = amountOf(item, part, top, bottom, price);
      each?.(amount);
      sum += amount;
    }
  }
  return sum;
}
