import type { PrintedLine } from '../facts/papers.ts';
import { input, ownFigure, paperSourceOf } from '../metering/source.ts';
import { isCarried } from '../reconcile/electric-lines.ts';
import type { SettledLine } from '../settlement/settlement.ts';
import { type Cents, dollarsText, subtractCents, sumCents } from '../units/cents.ts';
import { Exact, exact } from '../units/rate.ts';
import type { FacingLine } from './cycle.ts';
import type { CyclePaper } from './cycle-papers.ts';
import type { SettledCycle } from './settle-cycle.ts';

/** The facing pages and what they come to. */
export type Facing = { lines: FacingLine[]; billedDueCents: Cents; oursDueCents: Cents | null };

/** Each line may be a cent off, since both sides round it once (ledger.md §4). */
export const LINE_TOLERANCE_CENTS = 1;

/** Half a cent for each line added (net-metering.md §5), and never less than the cent of a single line. */
export function totalToleranceCents(lines: number): number {
  return Math.max(LINE_TOLERANCE_CENTS, Math.floor(lines / 2));
}

type Pair = { component: string | null; billed: PrintedLine[]; ours: SettledLine[] };

/**
 * Billed lines facing ours, in the order printed; ours that are not printed follow, where they come to anything; last `Due`. What no rate plan
 * can say (the balance, payments, other services, adjustments) stands on our side as billed, so that both sides add up. In a cycle split at
 * switch-on nothing is judged: its billed lines are shares by days.
 */
export function facingLines(paper: CyclePaper, settled: SettledCycle): Facing {
  const judged = settled.ours !== null && paper.split === null;
  const pairs = pairUp(paper.lines, settled);
  const lines: FacingLine[] = [];
  const carried: Cents[] = [];
  pairs.forEach((pair, at) => {
    const [first] = pair.billed;
    if (first && isCarried(first, pair.component)) {
      lines.push(carriedLine(paper, first, `carried:${at}`, settled.ours !== null));
      if (first.inDue) carried.push(first.amountCents);
      return;
    }
    const line = facingLine(pair, at, judged);
    if (line) lines.push(line);
  });
  for (const account of openAccountLines(paper)) {
    lines.push(carriedLine(paper, account, `carried:${account.kind}`, settled.ours !== null));
    carried.push(account.amountCents);
  }
  const due = dueLine(paper, settled, carried, judged, lines.length);
  lines.push(due.line);
  return { lines, billedDueCents: due.billedDueCents, oursDueCents: due.oursDueCents };
}

/** The previous balance and payments printed in the statement's head, where they are no lines of their own. */
export function accountLines(paper: CyclePaper): PrintedLine[] {
  if (paper.split !== null) return [];
  const { statement } = paper;
  const made: PrintedLine[] = [];
  const add = (kind: 'previousBalance' | 'payment', label: string, amountCents: Cents | null) => {
    if (amountCents === null || amountCents === 0 || paper.lines.some((line) => line.kind === kind)) return;
    made.push({
      component: null,
      kind,
      label,
      quantity: null,
      unit: null,
      rate: null,
      amountCents,
      inDue: true,
      row: null,
    });
  };
  add('previousBalance', 'Previous balance', statement.previousBalanceCents);
  add('payment', 'Payments', statement.paymentsCents);
  return made;
}

/** The same, left out where the payments have settled the balance: then they change nothing on this page. */
function openAccountLines(paper: CyclePaper): PrintedLine[] {
  const made = accountLines(paper);
  return sumCents(made.map((line) => line.amountCents)) === 0 ? [] : made;
}

function pairUp(printed: readonly PrintedLine[], settled: SettledCycle): Pair[] {
  const ours = settled.ours?.settlement.lines ?? [];
  const pairs: Pair[] = [];
  const done = new Set<string>();
  printed.forEach((line, at) => {
    const component = settled.components[at] ?? null;
    if (component === null) {
      pairs.push({ component, billed: [line], ours: [] });
      return;
    }
    const same = printed.filter((_, i) => settled.components[i] === component);
    const facing = ours.filter((one) => one.component === component && !isOther(one, line));
    if (same.length === facing.length) {
      // As many parts on both sides: the parts stand in the same order, by date, so each faces its own.
      const part = facing[same.indexOf(line)];
      pairs.push({ component, billed: [line], ours: part ? [part] : [] });
    } else if (!done.has(component)) {
      pairs.push({ component, billed: same, ours: facing });
    }
    done.add(component);
  });
  for (const line of ours) {
    if (!done.has(line.component) && line.amountCents !== 0)
      pairs.push({ component: line.component, billed: [], ours: [line] });
  }
  return pairs;
}

/** A bank gives both a credit and, at a true-up, a line of its own kind. */
function isOther(settled: SettledLine, printed: PrintedLine): boolean {
  return (settled.kind === 'trueup') !== (printed.kind === 'trueup');
}

function facingLine(pair: Pair, at: number, judged: boolean): FacingLine | null {
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

function carriedLine(paper: CyclePaper, line: PrintedLine, key: string, withOurs: boolean): FacingLine {
  const side = { quantity: line.quantity, rate: line.rate, amountCents: line.amountCents, inDue: line.inDue };
  return {
    key,
    label: line.label,
    unit: line.unit,
    billed: side,
    ours: withOurs
      ? {
          ...side,
          working: {
            words: 'As billed: no meter or rate plan says it',
            formula: 'billed',
            inputs: [
              input(
                'billed',
                line.label,
                dollarsText(line.amountCents),
                'USD',
                paperSourceOf(paper.statement.source, line.row),
              ),
            ],
            unit: 'USD',
            basis: 'billed',
          },
        }
      : null,
    differenceCents: withOurs ? subtractCents(line.amountCents, line.amountCents) : null,
    verdict: 'nothing-to-compare',
  };
}

function dueLine(
  paper: CyclePaper,
  settled: SettledCycle,
  carried: readonly Cents[],
  judged: boolean,
  count: number,
): { line: FacingLine; billedDueCents: Cents; oursDueCents: Cents | null } {
  const billedDueCents =
    paper.split === null
      ? paper.statement.amountDueCents
      : sumCents(paper.lines.filter((line) => line.inDue).map((line) => line.amountCents));
  const due = settled.ours?.settlement.lines.filter((line) => line.inDue) ?? [];
  const oursDueCents = settled.ours === null ? null : sumCents([...due.map((line) => line.amountCents), ...carried]);
  const differenceCents = oursDueCents === null ? null : subtractCents(billedDueCents, oursDueCents);
  const within = differenceCents !== null && Math.abs(differenceCents) <= totalToleranceCents(count);
  return {
    billedDueCents,
    oursDueCents,
    line: {
      key: 'due',
      label: 'Due',
      unit: null,
      billed: { quantity: null, rate: null, amountCents: billedDueCents, inDue: true },
      ours:
        oursDueCents === null
          ? null
          : {
              quantity: null,
              rate: null,
              amountCents: oursDueCents,
              inDue: true,
              working: {
                words: carried.length > 0 ? 'Our lines, and what is taken as billed, added' : 'Our lines added',
                formula: carried.length > 0 ? 'sum(lines) + sum(carried)' : 'sum(lines)',
                inputs: [
                  input(
                    'lines',
                    due.map((line) => line.label).join(', '),
                    due.map((line) => dollarsText(line.amountCents)),
                    'USD',
                    ownFigure('the settled lines'),
                  ),
                  ...(carried.length > 0
                    ? [
                        input(
                          'carried',
                          'Taken as billed',
                          carried.map(dollarsText),
                          'USD',
                          paperSourceOf(paper.statement.source, null),
                        ),
                      ]
                    : []),
                ],
                unit: 'USD',
                basis: 'computed',
              },
            },
      differenceCents,
      verdict: !judged || differenceCents === null ? 'nothing-to-compare' : within ? 'agrees' : 'differs',
    },
  };
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
