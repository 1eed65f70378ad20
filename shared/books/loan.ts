import type { LoanFacts, LoanPayment, Refinance } from '../facts/finance.ts';
import { sayDate } from '../ledger/say.ts';
import { cents, negateCents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { UnplacedEntry } from './book.ts';
import { stated } from './inputs.ts';
import { loanBook, payoffOf } from './loan-book.ts';
import { stepsMade } from './loan-state.ts';
import type { LoanRow, LoanStep } from './loan-step.ts';
import {
  extraWorking,
  levelWorking,
  recordedWorking,
  refinanceCostsWorking,
  refinanceWorking,
  restWorking,
} from './loan-workings.ts';
import { type PaperName, sourceOfPaper } from './paper-source.ts';

export { levelPayment } from './interest.ts';
export { loanPayoff } from './loan-payoff.ts';
export { type LoanState, loanClearedOn, loanStateOn, type PaymentsOfTheDay } from './loan-state.ts';
export type { LoanRow } from './loan-step.ts';

/** The loan's months, recorded payments in place of scheduled ones; see `loanBook`. */
export function loanSchedule(loan: LoanFacts): LoanRow[] {
  return loanBook(loan).rows;
}

/**
 * Cash entries of the loan through a day: `payment` for the regular part, `extraPrincipal` for what was paid beyond it, `refinance` for what a new loan left
 * to pay or paid out, `refinanceCosts`. `papers` gives a paper its name.
 */
export function loanEntries(loan: LoanFacts, through: Day, papers: readonly PaperName[] = []): UnplacedEntry[] {
  const { steps } = loanBook(loan);
  const made = steps.slice(0, stepsMade(steps, through, 'through'));
  return made.flatMap((step) => {
    if (step.kind === 'paidOff' && step.refinance !== null) return refinanceEntries(step, step.refinance, papers);
    if (step.kind !== 'payment') return [];
    return step.record === null ? [scheduledEntry(step)] : recordedEntries(step, step.record, papers);
  });
}

function scheduledEntry(step: LoanStep): UnplacedEntry {
  return {
    ...common(step, `loan-${prefixOf(step)}${step.number}`, 'payment'),
    label: `${numberedLabel(step)}, as scheduled`,
    amountCents: negateCents(step.regularCents),
    working: step.level === null ? restWorking(step, '-') : levelWorking(step.level, '-'),
  };
}

function recordedEntries(step: LoanStep, record: LoanPayment, papers: readonly PaperName[]): UnplacedEntry[] {
  const typed = stated(`Loan payment of ${sayDate(step.on)}, as entered`);
  const source = sourceOfPaper(record.documentId, papers, typed);
  const entries: UnplacedEntry[] = [];
  if (step.regularCents !== 0) {
    entries.push({
      ...common(step, `loan-${record.id}`, 'payment'),
      label: numberedLabel(step),
      amountCents: negateCents(step.regularCents),
      working: recordedWorking({ ...step, amountCents: record.amountCents }, source, '-'),
    });
  }
  if (step.extraPrincipalCents !== 0) {
    entries.push({
      ...common(step, `loan-${record.id}-extra`, 'extraPrincipal'),
      label: 'Extra principal',
      amountCents: negateCents(step.extraPrincipalCents),
      working: extraWorking(step.extraPrincipalCents, source, '-'),
    });
  }
  return entries;
}

function refinanceEntries(closing: LoanStep, refinance: Refinance, papers: readonly PaperName[]): UnplacedEntry[] {
  const source = sourceOfPaper(refinance.documentId, papers, stated('Refinance as entered'));
  const payoff = payoffOf(closing);
  const over = refinance.principalCents - payoff;
  const entries: UnplacedEntry[] = [];
  if (over !== 0) {
    entries.push({
      ...common(closing, `loan-${refinance.id}-cash`, 'refinance'),
      label: over < 0 ? 'Paid beside the new loan' : 'Paid out by the new loan',
      amountCents: cents(over),
      working: refinanceWorking(refinance.principalCents, payoff, sayDate(closing.on), source),
    });
  }
  if (refinance.costsCents !== 0) {
    entries.push({
      ...common(closing, `loan-${refinance.id}-costs`, 'refinanceCosts'),
      label: 'Costs of the refinance',
      amountCents: negateCents(refinance.costsCents),
      working: refinanceCostsWorking(refinance.costsCents, source),
    });
  }
  return entries;
}

function common(step: LoanStep, id: string, kind: string) {
  return { id, date: step.on, book: 'loan', kind, basis: 'cash', estimated: false } as const;
}

function prefixOf({ segment }: LoanStep): string {
  return segment.index === 0 ? '' : `r${segment.index}-`;
}

function numberedLabel({ segment, number }: LoanStep): string {
  const whose = segment.index === 0 ? '' : ' of the refinanced loan';
  if (number === 0) return `Loan payment before the first${whose}`;
  return `Loan payment ${number} of ${segment.termMonths}${whose}`;
}
