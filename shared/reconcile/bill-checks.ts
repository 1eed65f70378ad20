import { budgetOf, dueParts, electricCents } from '../ledger/due-parts.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import { type Cents, cents, sumCents, ZERO_CENTS } from '../units/cents.ts';
import { dueCauses, eitherOf } from './budget-causes.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareCents, nothingToCompare } from './make-check.ts';
import { totalToleranceCents } from './tolerance.ts';

/**
 * The printed lines in the amount due, the previous balance and the payments add up to it, to half a cent a line. On a budget plan its amount and
 * settlement take the place of the lines for electricity.
 */
export function linesAddUpCheck({ paper }: CheckContext): Check {
  const title = 'The printed lines add up';
  const { statement } = paper;
  if (statement.lines.length === 0) {
    return nothingToCompare('linesAddUp', '', 'USD', {
      title,
      cause: 'The statement’s lines are not entered.',
      advice: 'Add them to check the bill line by line.',
    });
  }
  // A statement split at switch-on is taken whole: its own lines are to add up.
  const whole = { ...paper, split: null, lines: statement.lines };
  const parts = dueParts(whole);
  const found = sumCents(parts.map((line) => line.amountCents));
  const sides = { stated: statement.amountDueCents, found, tolerance: cents(totalToleranceCents(parts.length)) };
  return compareCents('linesAddUp', '', title, sides, () => {
    const budget = budgetOf(whole);
    const said = `${budget === null ? 'The lines come' : 'With the budget amount it comes'} to ${sayMoney(found)}; the statement asks for ${sayMoney(statement.amountDueCents)}.`;
    const advice = 'Look for a line that was read wrong or left out. If every line is as printed, ask the utility.';
    if (budget === null) return { cause: said, advice };
    const figures = {
      instalment: budget.instalmentCents,
      settled: budget.settledCents ?? ZERO_CENTS,
      charges: electricCents(statement.lines),
      balance: budget.balanceCents,
    };
    const causes = dueCauses(figures, cents(statement.amountDueCents - found));
    return { cause: eitherOf(causes, said), advice };
  });
}

/** The previous balance is what the last statement asked for; on the first, what the opening states (net-metering.md §4 "balance"). */
export function balanceChainCheck({ paper, openingBalanceCents }: CheckContext): Check {
  const title = 'Previous balance carries over';
  const stated = previousBalance(paper);
  const last = paper.previous;
  if (stated !== null && last === null && openingBalanceCents !== null) {
    const sides = { stated, found: openingBalanceCents, tolerance: ZERO_CENTS };
    return compareCents('balanceChain', '', title, sides, () => ({
      cause: `The set-up states a balance of ${sayMoney(openingBalanceCents)} before the first cycle; the statement brings in ${sayMoney(stated)}.`,
      advice: 'Correct the opening balance in the set-up, or ask the utility.',
    }));
  }
  if (stated === null || last === null) {
    return nothingToCompare('balanceChain', '', 'USD', {
      title,
      cause:
        stated === null
          ? 'The statement prints no previous balance.'
          : 'There is no earlier statement to compare with.',
    });
  }
  const sides = { stated, found: last.amountDueCents, tolerance: ZERO_CENTS };
  return compareCents('balanceChain', '', title, sides, () => ({
    cause: `The statement of ${sayDate(last.statementOn ?? last.to)} asked for ${sayMoney(last.amountDueCents)}; this one brings in ${sayMoney(stated)}.`,
    advice: 'Look for a correction or a fee between the two statements, or ask the utility.',
  }));
}

/**
 * The amount due against ours on the metered energy. Its cause is the first other check that differs, or the lines that do. On a budget plan the
 * amount due does not hold the charges, so that these are a check of their own.
 */
export function amountDueChecks(context: CheckContext, others: readonly Check[]): Check[] {
  const { paper, facing } = context;
  const due = {
    about: '',
    title: 'Amount due, billed against metered',
    stated: facing.billedDueCents,
    found: facing.oursDueCents,
    lines: facing.count,
  };
  if (budgetOf(paper) === null) return [againstOurs(context, due, others)];
  const { electric } = facing;
  const charges = {
    about: 'electric',
    title: 'Electric charges, billed against metered',
    stated: electric.billedCents,
    found: electric.oursCents,
    lines: electric.lines,
  };
  const ofBudget = others.filter((check) => check.check === 'linesAddUp');
  return [
    againstOurs(
      context,
      charges,
      others.filter((check) => !ofBudget.includes(check)),
    ),
    againstOurs(context, { ...due, title: 'Amount due, with the budget amount' }, ofBudget),
  ];
}

type Total = { about: string; title: string; stated: Cents; found: Cents | null; lines: number };

function againstOurs(context: CheckContext, total: Total, others: readonly Check[]): Check {
  const { paper, settled } = context;
  const { about, title, stated, found } = total;
  if (found === null || paper.split !== null) {
    return nothingToCompare('amountDue', about, 'USD', {
      title,
      cause:
        paper.split === null
          ? settled.why
          : 'The statement began before switch-on; its lines are shared by days and not compared.',
    });
  }
  const sides = { stated, found, tolerance: cents(totalToleranceCents(total.lines)) };
  return compareCents('amountDue', about, title, sides, () => ({
    cause: dueCause(context, others),
    advice: 'Write to the utility about it, or accept the difference with a note.',
  }));
}

function dueCause({ facing, paper }: CheckContext, others: readonly Check[]): string {
  for (const id of CAUSES) {
    const named = others.find((check) => check.check === id && check.verdict === 'differs' && check.cause !== null);
    if (named?.cause) return named.cause;
  }
  if (paper.lines.length === 0) return 'The statement’s lines are not entered, so the cause cannot be found.';
  const lines = facing.lines
    .filter((line) => line.verdict === 'differs' && line.key !== 'due' && !line.key.startsWith('subtotal:'))
    .map((line) => line.label);
  return lines.length > 0
    ? `The difference lies in: ${lines.join(', ')}.`
    : 'The lines agree one by one; the total does not.';
}

/** Checks that explain a wrong amount, the likeliest first. */
const CAUSES: readonly Check['check'][] = [
  'exportAgainstIntervals',
  'importAgainstIntervals',
  'bankChain',
  'linePrice',
  'linesAddUp',
  'registersFollow',
];

function previousBalance(paper: CheckContext['paper']): Cents | null {
  const lines = paper.statement.lines.filter((line) => line.kind === 'previousBalance');
  if (lines.length > 0) return sumCents(lines.map((line) => line.amountCents));
  return paper.statement.previousBalanceCents;
}
