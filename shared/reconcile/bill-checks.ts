import { accountLines } from '../ledger/facing.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import { type Cents, cents, sumCents, ZERO_CENTS } from '../units/cents.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareCents, nothingToCompare } from './make-check.ts';
import { totalToleranceCents } from './tolerance.ts';

/** The printed lines in the amount due, the previous balance and the payments add up to it, to half a cent a line. */
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
  const parts = [...statement.lines.filter((line) => line.inDue), ...accountLines({ ...paper, split: null })];
  const found = sumCents(parts.map((line) => line.amountCents));
  const sides = { stated: statement.amountDueCents, found, tolerance: cents(totalToleranceCents(parts.length)) };
  return compareCents('linesAddUp', '', title, sides, () => ({
    cause: `The lines come to ${sayMoney(found)}; the statement asks for ${sayMoney(statement.amountDueCents)}.`,
    advice: 'Look for a line that was read wrong or left out. If every line is as printed, ask the utility.',
  }));
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

/** The amount due against ours on the metered energy. Its cause is the first other check that differs, or the lines that do. */
export function amountDueCheck(context: CheckContext, others: readonly Check[]): Check {
  const { paper, settled, facing } = context;
  const title = 'Amount due, billed against metered';
  if (facing.oursDueCents === null || paper.split !== null) {
    return nothingToCompare('amountDue', '', 'USD', {
      title,
      cause:
        paper.split === null
          ? settled.why
          : 'The statement began before switch-on; its lines are shared by days and not compared.',
    });
  }
  const lines = facing.lines.length - 1;
  const sides = {
    stated: facing.billedDueCents,
    found: facing.oursDueCents,
    tolerance: cents(totalToleranceCents(lines)),
  };
  return compareCents('amountDue', '', title, sides, () => ({
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
    .filter((line) => line.verdict === 'differs' && line.key !== 'due')
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
