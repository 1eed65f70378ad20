import type { PrintedLine } from '../facts/papers.ts';
import { input, ownFigure } from '../metering/source.ts';
import { LINE_TOLERANCE_CENTS } from '../reconcile/tolerance.ts';
import type { SettledLine } from '../settlement/settlement.ts';
import { type Cents, dollarsText, subtractCents, sumCents } from '../units/cents.ts';
import { Exact, exact } from '../units/rate.ts';
import type { FacingLine } from './cycle.ts';
import type { SettledCycle } from './settle-cycle.ts';

/** Billed lines and ours that face each other; either side may be empty. */
export type Pair = { component: string | null; billed: PrintedLine[]; ours: SettledLine[] };

/**
 * Pairs the printed lines with ours by component, in the order printed; ours that are not printed follow, where they come to anything. Where both
 * sides have as many parts (a price that changed inside the cycle) each faces its own; else the parts of a component stand together.
 */
export function pairUp(printed: readonly PrintedLine[], settled: SettledCycle): Pair[] {
  const ours = settled.ours?.settlement.lines ?? [];
  const pairs: Pair[] = [];
  const done = new Set<string>();
  const keyOf = (component: string, kind: string) => (kind === 'trueup' ? `${component} trueup` : component);
  printed.forEach((line, at) => {
    const component = settled.components[at] ?? null;
    if (component === null) {
      pairs.push({ component, billed: [line], ours: [] });
      return;
    }
    const key = keyOf(component, line.kind);
    const same = printed.filter(
      (other, i) => settled.components[i] === component && keyOf(component, other.kind) === key,
    );
    const facing = ours.filter((one) => keyOf(one.component, one.kind) === key);
    if (same.length === facing.length) {
      const part = facing[same.indexOf(line)];
      pairs.push({ component, billed: [line], ours: part ? [part] : [] });
    } else if (!done.has(key)) {
      pairs.push({ component, billed: same, ours: facing });
    }
    done.add(key);
  });
  for (const line of ours) {
    if (done.has(keyOf(line.component, line.kind)) || line.amountCents === 0) continue;
    pairs.push({ component: line.component, billed: [], ours: [line] });
  }
  return pairs;
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
    key: pair.component === null ? `printed:${at}` : `line:${pair.component}:${at}`,
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
