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
  const payments = new Map<string, LoanStep[]>();
  for (const step of steps) {
    if (step.kind !== 'payment') continue;
    const held = payments.get(keyOf(step.segment.index, step.number));
    if (held) held.push(step);
    else payments.set(keyOf(step.segment.index, step.number), [step]);
  }
  return rows.map((row) => {
    const own = row.refinanced ? [] : ofRow(payments.get(keyOf(row.segment, row.number)) ?? [], row);
    const [first] = own;
    if (first === undefined) return { row, level: null, working: null };
    if (own.length > 1 || first.record !== null) return { row, level: null, working: paidWorking(own) };
    if (first.level === null) return { row, level: null, working: restWorking(first) };
    return { row, level: levels.indexOf(first.level), working: null };
  });
}

/** Number 0 may take several months; the days tell them apart. */
function ofRow(steps: readonly LoanStep[], row: LoanRow): LoanStep[] {
  return steps.filter((step) => step.dueOn === row.dueOn);
}

function keyOf(segment: number, number: number): string {
  return `${segment} ${number}`;
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
