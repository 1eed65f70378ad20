import { accountLines, totalToleranceCents } from '../ledger/facing.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import { type Cents, cents, sumCents } from '../units/cents.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareCents, nothingToCompare } from './make-check.ts';

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
  return compareCents('linesAddUp', '', statement.amountDueCents, found, cents(totalToleranceCents(parts.length)), {
    title,
    cause: `The lines come to ${sayMoney(found)}; the statement asks for ${sayMoney(statement.amountDueCents)}.`,
    advice: 'Look for a line that was read wrong or left out. If every line is as printed, ask the utility.',
  });
}

/** The previous balance is what the last statement asked for; on the first, what the opening states (net-metering.md §4 "balance"). */
export function balanceChainCheck({ paper, openingBalanceCents }: CheckContext): Check {
  const title = 'Previous balance carries over';
  const stated = previousBalance(paper);
  const last = paper.previous;
  if (stated !== null && last === null && openingBalanceCents !== null) {
    return compareCents('balanceChain', '', stated, openingBalanceCents, cents(0), {
      title,
      cause: `The set-up states a balance of ${sayMoney(openingBalanceCents)} before the first cycle; the statement brings in ${sayMoney(stated)}.`,
      advice: 'Correct the opening balance in the set-up, or ask the utility.',
    });
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
  return compareCents('balanceChain', '', stated, last.amountDueCents, cents(0), {
    title,
    cause: `The statement of ${sayDate(last.statementOn ?? last.to)} asked for ${sayMoney(last.amountDueCents)}; this one brings in ${sayMoney(stated)}.`,
    advice: 'Look for a correction or a fee between the two statements, or ask the utility.',
  });
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
  return compareCents('amountDue', '', facing.billedDueCents, facing.oursDueCents, cents(totalToleranceCents(lines)), {
    title,
    cause: dueCause(context, others),
    advice: 'Write to the utility about it, or accept the difference with a note.',
  });
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
