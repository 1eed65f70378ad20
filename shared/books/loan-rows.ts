import type { Cents } from '../units/cents.ts';
import { cents } from '../units/cents.ts';
import type { Working } from '../working.ts';
import { stated, usdListInput } from './inputs.ts';
import type { LoanBook } from './loan-book.ts';
import type { LoanRow, LoanStep } from './loan-step.ts';
import { restWorking } from './loan-workings.ts';

/** A row with what its payment was worked out from: `level` is the index of the level payment it is, else `working` says it; both null where nothing was paid. */
export type WorkedRow = { row: LoanRow; level: number | null; working: Working | null };

/** The rows of a loan's book, each with its payment's working. Levels are pointed at, since hundreds of rows share one. */
export function workedRows({ steps, rows, levels }: LoanBook): WorkedRow[] {
  const payments = steps.filter((step) => step.kind === 'payment');
  let next = 0;
  return rows.map((row) => {
    const from = next;
    while (isOf(payments[next], row)) next += 1;
    const own = payments.slice(from, next);
    const [first] = own;
    if (first === undefined) return { row, level: null, working: null };
    if (own.length > 1 || first.record !== null) return { row, level: null, working: paidWorking(own) };
    if (first.level === null) return { row, level: null, working: restWorking(first) };
    return { row, level: levels.indexOf(first.level), working: null };
  });
}

/** Rows and payments go by the same order. What a new loan paid off is a row of the same month, and no payment of the household's. */
function isOf(step: LoanStep | undefined, row: LoanRow): boolean {
  return !row.refinanced && step?.segment.index === row.segment && step.dueOn === row.dueOn;
}

function paidWorking(steps: readonly LoanStep[]): Working {
  const paid = steps.map((step): Cents => cents(step.regularCents + step.extraPrincipalCents));
  return {
    words: steps.length === 1 ? 'Paid, as entered' : `The ${steps.length} payments of the month added`,
    formula: 'sum(paid)',
    inputs: [usdListInput('paid', 'Paid', paid, stated('Loan payments as entered'))],
    unit: 'USD',
    basis: 'entered',
  };
}
