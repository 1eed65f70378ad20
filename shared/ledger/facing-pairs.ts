import type { PrintedLine } from '../facts/papers.ts';
import { input, ownFigure } from '../metering/source.ts';
import { matchParts, partKey } from '../reconcile/match-parts.ts';
import { LINE_TOLERANCE_CENTS } from '../reconcile/tolerance.ts';
import type { PriceOf } from '../settlement/price.ts';
import type { SettledLine } from '../settlement/settlement.ts';
import { type Cents, dollarsText, subtractCents, sumCents } from '../units/cents.ts';
import { Exact, exact } from '../units/rate.ts';
import type { FacingLine } from './cycle.ts';
import type { SettledCycle } from './settle-cycle.ts';

/** Billed lines and ours that face each other, of one of the component's prices (`part`); either side may be empty. */
export type Pair = { component: string | null; part: PriceOf | null; billed: PrintedLine[]; ours: SettledLine[] };

/**
 * Pairs the printed lines with ours by component, and by period and tier where its lines can be told apart, in the order printed; ours that are
 * not printed follow, where they come to anything. Where both sides have as many parts (a price that changed inside the cycle) each faces its
 * own; else the parts stand together.
 */
export function pairUp(printed: readonly PrintedLine[], settled: SettledCycle): Pair[] {
  const ours = settled.ours?.settlement.lines ?? [];
  const plan = settled.plan?.plan ?? null;
  const parts = plan === null ? [] : matchParts(printed, settled.components, plan, ours);
  const apart = new Set(settled.components.filter((_, at) => (parts[at] ?? null) !== null));
  const sides = new Map<string, Pair>();
  const billedSide = (line: PrintedLine, at: number): Pair | null => {
    const component = settled.components[at] ?? null;
    return component === null ? null : sideOf(sides, component, line.kind, parts[at] ?? null);
  };
  const ourSide = ({ component, kind, period, tier }: SettledLine): Pair =>
    sideOf(sides, component, kind, apart.has(component) ? { period, tier } : null);
  printed.forEach((line, at) => {
    billedSide(line, at)?.billed.push(line);
  });
  for (const line of ours) ourSide(line).ours.push(line);

  const pairs: Pair[] = [];
  printed.forEach((line, at) => {
    const all = billedSide(line, at);
    if (all === null) {
      pairs.push({ component: null, part: null, billed: [line], ours: [] });
    } else if (all.billed.length !== all.ours.length) {
      if (all.billed[0] === line) pairs.push(all);
    } else if (all.billed.length === 1) {
      pairs.push(all);
    } else {
      const own = all.ours[all.billed.indexOf(line)];
      pairs.push({ ...all, billed: [line], ours: own ? [own] : [] });
    }
  });
  for (const line of ours) {
    const side = ourSide(line);
    if (line.amountCents === 0 || side.billed.length > 0) continue;
    pairs.push({ ...side, ours: [line] });
  }
  return pairs;
}

/** Both sides of a component's price so far; its true-up stands apart from it. */
function sideOf(sides: Map<string, Pair>, component: string, kind: string, part: PriceOf | null): Pair {
  const own = partKey(component, part);
  const key = kind === 'trueup' ? `${own} trueup` : own;
  let found = sides.get(key);
  if (!found) {
    found = { component, part, billed: [], ours: [] };
    sides.set(key, found);
  }
  return found;
}

/** One line of the facing pages; null for a pair with neither side. `judged` is false where nothing may be said of a difference. */
export function facingLine(pair: Pair, at: number, judged: boolean): FacingLine | null {
  const [billed] = pair.billed;
  const [ours] = pair.ours;
  const label = billed?.label ?? ours?.label;
  if (label === undefined) return null;
  const billedCents = billed ? sumCents(pair.billed.map((line) => line.amountCents)) : null;
  const oursCents = ours ? sumCents(pair.ours.map((line) => line.amountCents)) : null;
  const differenceCents = billedCents !== null && oursCents !== null ? subtractCents(billedCents, oursCents) : null;
  return {
    key: pair.component === null ? `printed:${at}` : `line:${partKey(pair.component, pair.part)}:${at}`,
    label,
    unit: billed?.unit ?? ours?.unit ?? null,
    billed:
      billed && billedCents !== null
        ? {
            quantity: totalQuantity(pair.billed),
            rate: oneRate(pair.billed),
            amountCents: billedCents,
            inDue: billed.inDue,
          }
        : null,
    ours:
      ours && oursCents !== null
        ? {
            quantity: totalQuantity(pair.ours),
            rate: oneRate(pair.ours),
            amountCents: oursCents,
            inDue: ours.inDue,
            working: pair.ours.length === 1 ? ours.working : addedWorking(pair.ours),
          }
        : null,
    differenceCents,
    verdict: verdictOf(pair, differenceCents, judged),
  };
}

function verdictOf(pair: Pair, differenceCents: Cents | null, judged: boolean): FacingLine['verdict'] {
  if (!judged) return 'nothing-to-compare';
  if (differenceCents !== null) {
    const tolerance = LINE_TOLERANCE_CENTS * Math.max(pair.billed.length, pair.ours.length);
    return Math.abs(differenceCents) <= tolerance ? 'agrees' : 'differs';
  }
  // A line only one side has changes the bill where it is due; a memorandum of a credit put by does not.
  const only = pair.billed[0] ?? pair.ours[0];
  return only?.inDue && only.amountCents !== 0 ? 'differs' : 'nothing-to-compare';
}

function addedWorking(lines: readonly SettledLine[]): SettledLine['working'] {
  return {
    words: `${lines.length} lines added: ${lines.map((line) => line.working.words).join('; ')}`,
    formula: 'sum(parts)',
    inputs: [
      input(
        'parts',
        lines.map((line) => line.label).join(', '),
        lines.map((line) => dollarsText(line.amountCents)),
        'USD',
        ownFigure('the settled lines'),
      ),
    ],
    unit: 'USD',
    basis: 'computed',
  };
}

function totalQuantity(lines: readonly { quantity: string | null }[]): string | null {
  const [first, ...more] = lines;
  if (!first || more.length === 0) return first?.quantity ?? null;
  let sum = new Exact(0);
  for (const line of lines) {
    if (line.quantity === null) return null;
    sum = sum.plus(exact(line.quantity));
  }
  return sum.toString();
}

function oneRate(lines: readonly { rate: string | null }[]): string | null {
  const rate = lines[0]?.rate ?? null;
  return lines.every((line) => line.rate === rate) ? rate : null;
}
