import { periodExists } from './calendar.ts';
import type { Cycle } from './cycle-flows.ts';
import { basisInput, canUseIntervals, type Figure, figuresOf } from './energy-figures.ts';
import { dayInputs, type EnergyItem, mustPrice, type Share } from './energy-share.ts';
import { type Part, splitCycle } from './parts.ts';
import { NO_INPUTS, type Piece } from './piece.ts';
import { plus, type Qty, roundToWhole, times } from './quantity.ts';
import { limitsAt, type Price } from './rates-in-force.ts';
import { tierPieces } from './tier-pieces.ts';

/** Kilowatt-hours as a statement prints them, to be priced in place of the cycle's own; `tier`: all of them at that tier's rate. */
export type BilledEnergy = { figure: Figure; tier: number | null };

/** What whole kWh have been given to the parts before, by group and period, so that the parts add up. */
type Given = Map<string, { days: number; whole: Qty }>;

/** What an item priced by the kWh comes to in a cycle: a piece for each part, period and tier, also at zero. */
export function energyPieces(cycle: Cycle, item: EnergyItem, billed: BilledEnergy | null = null): Piece[] {
  const parts = splitCycle(cycle, item.pricing, billed === null && canUseIntervals(cycle, item));
  const split = parts.length > 1;
  const given: Given | null = split ? new Map() : null;
  const tier = billed?.tier ?? null;
  const pieces: Piece[] = [];
  for (const part of parts) {
    const figures = billed ? [billed.figure] : figuresOf(cycle, item, part.group);
    const shares = given ? sharesOf(cycle, figures, part, parts, given) : figures;
    const tiered = item.pricing.tiers.length > 0 && tier === null;
    const limits = tiered ? limitsAt(item.pricing, part.rateDay, part.season) : null;
    if (limits) {
      pieces.push(...tierPieces(cycle, item, part, split, shares, limits));
      continue;
    }
    const priced = shares.map((share) => {
      const price = mustPrice(item, item.label, part, share.period, tier);
      return energyPiece(cycle, part, split, share, price);
    });
    if (!split) return priced;
    pieces.push(...priced);
  }
  return pieces;
}

function energyPiece(cycle: Cycle, part: Part, split: boolean, share: Share, price: Price): Piece {
  const { period, n, d, top, bottom } = share;
  return {
    part,
    split,
    period,
    tier: null,
    n,
    d,
    unit: 'kWh',
    price,
    formula: bottom === '' ? `${top} * ${price.formula}` : `${top} * ${price.formula} / ${bottom}`,
    inputs: cycle.says ? share.inputs.concat(price.inputs) : NO_INPUTS,
  };
}

function sharesOf(
  cycle: Cycle,
  figures: readonly Figure[],
  part: Part,
  parts: readonly Part[],
  given: Given,
): readonly Share[] {
  const shares: Share[] = [];
  for (const figure of figures) {
    const share = shareOf(cycle, figure, part, parts, given);
    if (share) shares.push(share);
  }
  return shares;
}

/**
 * The part's share of a figure by days: multiplied first, divided last. A period that has no hours in the season of some parts is shared among
 * the others. Whole kWh are rounded on the running sum, so that the parts add up to what is shared.
 */
function shareOf(cycle: Cycle, figure: Figure, part: Part, parts: readonly Part[], given: Given): Share | null {
  const { period } = figure;
  const days = daysHeld(cycle, period, part, parts);
  if (days === null) return null;
  if (days === part.days) return figure;

  const n = times(figure.n, part.days);
  const d = times(figure.d, days);
  if (cycle.prepared.plan.rounding.kWh === 'whole') {
    const key = `${part.group.from} ${period ?? ''}`;
    const before = given.get(key) ?? { days: 0, whole: 0 };
    const through = { days: before.days + part.days, whole: roundToWhole(times(figure.n, before.days + part.days), d) };
    given.set(key, through);
    const whole = plus(through.whole, times(before.whole, -1));
    const input = basisInput('kWh', `${figure.label}, ${part.days} of ${days} days, whole kWh`, whole, figure.basis);
    return { period, n: whole, d: 1, top: 'kWh', bottom: '', inputs: [input] };
  }
  return {
    period,
    n,
    d,
    top: `${figure.top} * days`,
    bottom: figure.bottom === '' ? 'allDays' : `${figure.bottom} / allDays`,
    inputs: [...figure.inputs, ...dayInputs(part.days, days)],
  };
}

/** The days a figure is shared over: of the parts in which its period has hours, or of all where none says so; null when this part has none. */
export function daysHeld(cycle: Cycle, period: string | null, part: Part, parts: readonly Part[]): number | null {
  const group = parts.filter((other) => other.group === part.group);
  const held = group.filter((other) => holds(cycle, period, other));
  if (held.length > 0 && !held.includes(part)) return null;
  return (held.length > 0 ? held : group).reduce((sum, other) => sum + other.days, 0);
}

function holds(cycle: Cycle, period: string | null, part: Part): boolean {
  if (period === null) return true;
  const found = cycle.prepared.period.get(period);
  return found !== undefined && periodExists(found, part.season);
}
