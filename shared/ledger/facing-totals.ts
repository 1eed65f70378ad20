import type { PrintedLine } from '../facts/papers.ts';
import { input, ownFigure, paperSourceOf } from '../metering/source.ts';
import { totalToleranceCents } from '../reconcile/tolerance.ts';
import { type Cents, dollarsText, subtractCents, sumCents } from '../units/cents.ts';
import type { Working } from '../working.ts';
import type { FacingLine } from './cycle.ts';
import type { CyclePaper } from './cycle-papers.ts';

/** What our side of a total is made of: lines as settled, and amounts taken as billed. */
export type Side = { settled: { label: string; amountCents: Cents }[]; carried: readonly Cents[] };

/** A line that stands on our side as billed. */
export function carriedLine(paper: CyclePaper, line: PrintedLine, key: string, withOurs: boolean): FacingLine {
  const side = { quantity: line.quantity, rate: line.rate, amountCents: line.amountCents, inDue: line.inDue };
  const source = paperSourceOf(paper.statement.source, line.row);
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
            inputs: [input('billed', line.label, dollarsText(line.amountCents), 'USD', source)],
            unit: 'USD',
            basis: 'billed',
          },
        }
      : null,
    differenceCents: withOurs ? subtractCents(line.amountCents, line.amountCents) : null,
    verdict: 'nothing-to-compare',
  };
}

/** A total of the facing pages; `ours` is null where the cycle is not settled, `lines` counts what was added. */
export function totalLine(
  paper: CyclePaper,
  total: { key: string; label: string; billedCents: Cents; ours: Side | null; judged: boolean; lines: number },
): FacingLine {
  const { key, label, billedCents, ours, judged, lines } = total;
  const oursCents = ours === null ? null : addedUp(ours);
  const differenceCents = oursCents === null ? null : subtractCents(billedCents, oursCents);
  const within = differenceCents !== null && Math.abs(differenceCents) <= totalToleranceCents(lines);
  const amount = { quantity: null, rate: null, inDue: true };
  return {
    key,
    label,
    unit: null,
    billed: { ...amount, amountCents: billedCents },
    ours:
      ours === null || oursCents === null
        ? null
        : { ...amount, amountCents: oursCents, working: totalWorking(paper, ours) },
    differenceCents,
    verdict: !judged || differenceCents === null ? 'nothing-to-compare' : within ? 'agrees' : 'differs',
  };
}

function addedUp({ settled, carried }: Side): Cents {
  return sumCents([...settled.map((line) => line.amountCents), ...carried]);
}

function totalWorking(paper: CyclePaper, { settled, carried }: Side): Working {
  const source = paperSourceOf(paper.statement.source, null);
  const lines = input(
    'lines',
    settled.map((line) => line.label).join(', '),
    settled.map((line) => dollarsText(line.amountCents)),
    'USD',
    ownFigure('the settled lines'),
  );
  const taken = input('carried', 'Taken as billed', carried.map(dollarsText), 'USD', source);
  const common = { unit: 'USD' as const, basis: 'computed' as const };
  if (carried.length === 0) return { ...common, words: 'Our lines added', formula: 'sum(lines)', inputs: [lines] };
  if (settled.length === 0)
    return { ...common, words: 'What is taken as billed, added', formula: 'sum(carried)', inputs: [taken] };
  return {
    ...common,
    words: 'Our lines, and what is taken as billed, added',
    formula: 'sum(lines) + sum(carried)',
    inputs: [lines, taken],
  };
}
