import type { PrintedLine } from '../facts/papers.ts';
import { input, ownFigure, paperSourceOf } from '../metering/source.ts';
import { isCarried } from '../reconcile/electric-lines.ts';
import { totalToleranceCents } from '../reconcile/tolerance.ts';
import { type Cents, dollarsText, subtractCents, sumCents } from '../units/cents.ts';
import type { FacingLine } from './cycle.ts';
import type { CyclePaper } from './cycle-papers.ts';
import { facingLine, pairUp } from './facing-pairs.ts';
import type { SettledCycle } from './settle-cycle.ts';

/** The facing pages and what they come to. */
export type Facing = { lines: FacingLine[]; billedDueCents: Cents; oursDueCents: Cents | null };

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
