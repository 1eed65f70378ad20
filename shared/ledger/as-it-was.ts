import type { IncentiveFacts } from '../facts/finance.ts';
import { input, paperSourceOf } from '../metering/source.ts';
import { isElectric, isIncentiveInBill } from '../reconcile/electric-lines.ts';
import { addCents, cents, dollarsText, subtractCents, sumCents, ZERO_CENTS } from '../units/cents.ts';
import type { Cycle } from './cycle.ts';
import type { CyclePaper } from './cycle-papers.ts';

/**
 * The bill as it was: current electric charges in the amount due, after bank credits, without previous balance, payments, late fees, deposits,
 * instalments and other services (ledger.md §5.1). A production incentive paid inside the bill is added back, since it counts in its own book.
 * A statement without lines is taken at its amount due less balance and payments.
 */
export function billAsItWas(paper: CyclePaper, incentive: IncentiveFacts | null): Cycle['asItWas'] {
  const { statement, split } = paper;
  const estimated = split !== null;
  const basis = estimated ? 'estimated' : 'billed';
  const source = paperSourceOf(statement.source, null);
  if (paper.lines.length === 0 && !estimated) {
    const previous = statement.previousBalanceCents ?? ZERO_CENTS;
    const payments = statement.paymentsCents ?? ZERO_CENTS;
    return {
      amountCents: subtractCents(subtractCents(statement.amountDueCents, previous), payments),
      working: {
        words: 'Amount due without the previous balance and payments; the statement’s lines are not entered',
        formula: 'due - previous - payments',
        inputs: [
          input('due', 'Amount due', dollarsText(statement.amountDueCents), 'USD', source),
          input('previous', 'Previous balance', dollarsText(previous), 'USD', source),
          input('payments', 'Payments', dollarsText(payments), 'USD', source),
        ],
        unit: 'USD',
        basis,
      },
    };
  }
  const electric = paper.lines.filter(isElectric);
  const inBill = electric.filter((line) => isIncentiveInBill(line, incentive));
  const total = sumCents(electric.map((line) => line.amountCents));
  const addedBack = cents(-sumCents(inBill.map((line) => line.amountCents)));
  const lines = input(
    'lines',
    electric.map((line) => line.label).join(', '),
    electric.map((line) => dollarsText(line.amountCents)),
    'USD',
    source,
  );
  const share = split === null ? '' : `, each shared by days (${split.days} of ${split.of})`;
  if (inBill.length === 0) {
    return {
      amountCents: total,
      working: {
        words: `The billed lines for electricity added${share}`,
        formula: 'sum(lines)',
        inputs: [lines],
        unit: 'USD',
        basis,
      },
    };
  }
  return {
    amountCents: addCents(total, addedBack),
    working: {
      words: `The billed lines for electricity added${share}, and the incentive paid inside the bill added back`,
      formula: 'sum(lines) + incentive',
      inputs: [lines, input('incentive', 'Incentive paid inside the bill', dollarsText(addedBack), 'USD', source)],
      unit: 'USD',
      basis,
    },
  };
}
