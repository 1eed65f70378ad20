import type { WorkingInput } from '../working.ts';
import type { Cycle } from './cycle-flows.ts';
import { type EnergyItem, mustPrice, type Share } from './energy-share.ts';
import type { Part } from './parts.ts';
import type { Piece } from './piece.ts';
import { compare, exactText, greater, lesser, minus, plus, type Qty, roundToWhole, times } from './quantity.ts';
import type { Limits } from './rates-in-force.ts';
import { refuse } from './refused.ts';

/**
 * The tiers of a part: upper bounds in thousandths of kWh over `scale`. `scale` is 1 save for exact limits per cycle in a split cycle, where it is
 * the cycle's days so that nothing is divided before the price.
 */
export type Bounds = { upper: readonly Qty[]; texts: readonly Qty[]; label: string; scale: number; limits: Limits };

/**
 * Runs an item's kWh of a part through its tiers, a piece for each tier also at zero. Limits per day go by the part's days, limits per cycle by
 * its share of the cycle's days. Priced by period too, the tiers run over the kWh of all periods, and each period has its share of every tier.
 */
export function tierPieces(
  cycle: Cycle,
  item: EnergyItem,
  part: Part,
  split: boolean,
  shares: readonly Share[],
  limits: Limits,
): Piece[] {
  const first = shares[0];
  if (!first) return [];
  if (shares.some((share) => compare(share.d, first.d) !== 0 || share.bottom !== first.bottom)) {
    refuse(
      `${item.label} has tiers over periods that do not all have the same days: how they share a tier is not said.`,
    );
  }
  const bounds = boundsOf(cycle, part, limits);
  const total = times(
    shares.reduce<Qty>((sum, share) => plus(sum, share.n), 0),
    bounds.scale,
  );
  const pieces: Piece[] = [];
  for (const share of shares) {
    for (let tier = 1; tier <= bounds.upper.length + 1; tier += 1) {
      const price = mustPrice(item, item.label, part, share.period, tier);
      const inTier = kWhInTier(total, bounds, tier, first.d);
      const said = sayTier(cycle, part, shares, share, bounds, tier);
      const { n, d } = shareOfTier(shares, share, inTier, total, bounds.scale);
      const idle = compare(total, 0) === 0;
      pieces.push({
        part,
        split,
        period: share.period,
        tier,
        n: idle ? 0 : n,
        d: idle ? 1 : d,
        unit: 'kWh',
        price,
        formula: idle ? `0 * ${price.formula}` : `${said.top} * ${price.formula}${said.bottom}`,
        inputs: [...said.inputs, ...price.inputs],
      });
    }
  }
  return pieces;
}

/** The tiers of a part, from the limits in force. */
export function boundsOf(cycle: Cycle, part: Part, limits: Limits): Bounds {
  const whole = cycle.prepared.plan.rounding.limits === 'whole';
  if (limits.per === 'day') {
    const scaled = limits.limits.map((limit) => times(limit, part.days));
    const upper = whole ? scaled.map((limit) => roundToWhole(limit, 1)) : scaled;
    return { upper, texts: upper, label: `Tier limit, ${part.days} days`, scale: 1, limits };
  }
  if (part.days === cycle.days)
    return { upper: limits.limits, texts: limits.limits, label: 'Tier limit', scale: 1, limits };
  const scaled = limits.limits.map((limit) => times(limit, part.days));
  if (!whole)
    return { upper: scaled, texts: limits.limits, label: 'Tier limit of a whole cycle', scale: cycle.days, limits };
  const upper = scaled.map((limit) => roundToWhole(limit, cycle.days));
  return { upper, texts: upper, label: `Tier limit, ${part.days} of ${cycle.days} days`, scale: 1, limits };
}

/** The kWh of a tier over the shares' divisor and the bounds' scale. What is below the first limit may be negative, as a misread register is. */
export function kWhInTier(total: Qty, bounds: Bounds, tier: number, d: Qty): Qty {
  const upper = bounds.upper[tier - 1];
  const lower = bounds.upper[tier - 2];
  const reached = upper === undefined ? total : lesser(total, times(upper, d));
  return lower === undefined ? reached : greater(minus(reached, times(lower, d)), 0);
}

function shareOfTier(
  shares: readonly Share[],
  share: Share,
  inTier: Qty,
  total: Qty,
  scale: number,
): { n: Qty; d: Qty } {
  const d = times(share.d, scale);
  if (shares.length === 1) return { n: inTier, d };
  const n = times(times(inTier, share.n), scale);
  const all = times(d, total);
  return compare(all, 0) < 0 ? { n: times(n, -1), d: times(all, -1) } : { n, d: all };
}

function sayTier(
  cycle: Cycle,
  part: Part,
  shares: readonly Share[],
  share: Share,
  bounds: Bounds,
  tier: number,
): { top: string; bottom: string; inputs: WorkingInput[] } {
  const inputs: WorkingInput[] = [...share.inputs];
  const limit = (name: string, value: Qty): string => {
    inputs.push({ name, label: bounds.label, value: exactText(value), unit: 'kWh', source: bounds.limits.source });
    const over = share.bottom === '' ? '' : ` * ${share.bottom.replaceAll(' / ', ' * ')}`;
    return bounds.scale === 1 ? `${name}${over}` : `${name} * partDays${over}`;
  };
  if (bounds.scale !== 1) {
    const source = { kind: 'figure', name: 'days' } as const;
    inputs.push({ name: 'partDays', label: 'Days of this part', value: String(part.days), unit: 'days', source });
    inputs.push({ name: 'cycleDays', label: 'Days of the cycle', value: String(cycle.days), unit: 'days', source });
  }
  const all = shares.length === 1 ? share.top : totalOf(shares, inputs);
  const scaled = bounds.scale === 1 ? all : `${all} * cycleDays`;
  const upper = bounds.texts[tier - 1];
  const lower = bounds.texts[tier - 2];
  const reached = upper === undefined ? scaled : `min(${scaled}, ${limit('upper', upper)})`;
  const top = lower === undefined ? reached : `max(${reached} - ${limit('lower', lower)}, 0)`;
  const bottom = `${share.bottom === '' ? '' : ` / ${share.bottom}`}${bounds.scale === 1 ? '' : ' / cycleDays'}`;
  if (shares.length === 1) return { top, bottom, inputs };
  return { top: `${top} * (${share.top})`, bottom: `${bottom} / (${all})`, inputs };
}

/** The kWh of all periods, in the working of one of them: its inputs again under numbered names. */
function totalOf(shares: readonly Share[], inputs: WorkingInput[]): string {
  const tops = shares.map((share, index) => {
    let top = share.top;
    for (const input of share.inputs) {
      if (input.name === 'days' || input.name === 'allDays') continue;
      const name = `${input.name}${index + 1}`;
      inputs.push({ ...input, name });
      top = top.replaceAll(new RegExp(`\\b${input.name}\\b`, 'g'), name);
    }
    return top;
  });
  return `(${tops.join(' + ')})`;
}
