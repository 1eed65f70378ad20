import type { PrintedBudget, PrintedLine } from '../facts/papers.ts';
import { isElectric } from '../reconcile/electric-lines.ts';
import { type Cents, sumCents } from '../units/cents.ts';
import type { CyclePaper } from './cycle-papers.ts';

/** The budget plan a cycle is billed on; null without one, and in a cycle split at switch-on, whose lines are shares by days. */
export function budgetOf(paper: CyclePaper): PrintedBudget | null {
  return paper.split === null ? paper.statement.budget : null;
}

/** The current charges and credits for electricity as printed: what the bill really was. */
export function electricLines(lines: readonly PrintedLine[]): PrintedLine[] {
  return lines.filter(isElectric);
}

export function electricCents(lines: readonly PrintedLine[]): Cents {
  return sumCents(electricLines(lines).map((line) => line.amountCents));
}

/** The previous balance and payments printed in the statement's head, where they are no lines of their own. */
export function accountLines(paper: CyclePaper): PrintedLine[] {
  if (paper.split !== null) return [];
  const { statement } = paper;
  const made: PrintedLine[] = [];
  const add = (kind: 'previousBalance' | 'payment', label: string, amountCents: Cents | null) => {
    if (amountCents === null || amountCents === 0 || paper.lines.some((line) => line.kind === kind)) return;
    made.push(headLine(kind, label, amountCents));
  };
  add('previousBalance', 'Previous balance', statement.previousBalanceCents);
  add('payment', 'Payments', statement.paymentsCents);
  return made;
}

/** The budget amount and its settlement, which stand in the amount due in place of the lines for electricity. */
export function budgetLines(paper: CyclePaper): PrintedLine[] {
  const budget = budgetOf(paper);
  if (budget === null) return [];
  const { instalmentCents, settledCents } = budget;
  const instalment = headLine('adjustment', 'Budget amount', instalmentCents);
  if (settledCents === null || settledCents === 0) return [instalment];
  return [instalment, headLine('adjustment', 'Settlement of the budget balance', settledCents)];
}

/** All that adds up to the amount due as printed: on a budget plan its amount takes the place of the lines for electricity. */
export function dueParts(paper: CyclePaper): PrintedLine[] {
  const inDue = paper.lines.filter((line) => line.inDue);
  const lines = budgetOf(paper) === null ? inDue : inDue.filter((line) => !isElectric(line));
  return [...lines, ...accountLines(paper), ...budgetLines(paper)];
}

function headLine(kind: PrintedLine['kind'], label: string, amountCents: Cents): PrintedLine {
  return { component: null, kind, label, quantity: null, unit: null, rate: null, amountCents, inDue: true, row: null };
}
