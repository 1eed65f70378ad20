import type { BookId } from '../books/book.ts';
import { costFlows } from '../books/costs.ts';
import { creditExpected } from '../books/credit-expected.ts';
import { leaseFlows } from '../books/lease.ts';
import { loanBook } from '../books/loan-book.ts';
import { insuranceEntries } from '../books/mortgage-insurance.ts';
import { keptAt } from '../settlement/place.ts';
import { cents } from '../units/cents.ts';
import { addDays, type Day, daysBetween, daysInMonth, monthOf, yearOf } from '../units/day.ts';
import type { BasisFacts, Flow, ProjectionBasis } from './basis.ts';
import type { Changes } from './changes.ts';
import { loansOf, owedOn } from './loans.ts';
import type { Period } from './periods.ts';
import { roundedMean } from './sums.ts';

/**
 * The one place where money to come joins the projection: what is known or set to move on days from the last close on, in order. Bills and the
 * incentive are worked out by the month instead. A further stream is one more `add` here.
 */
export function flowsAfter(
  basis: ProjectionBasis,
  facts: BasisFacts,
  changes: Changes,
  periods: readonly Period[],
): Flow[] {
  const { today, close, since } = basis;
  const horizon = keptAt(periods, periods.length - 1).to;
  const end = changes.endsOn !== null && changes.endsOn < horizon ? changes.endsOn : horizon;
  const flows: Flow[] = [];
  const addUntil = (last: Day, on: Day, book: BookId, amount: number) => {
    if (on >= close.on && on < last && amount !== 0) flows.push({ on, book, amountCents: cents(amount) });
  };
  const add = (on: Day, book: BookId, amount: number) => addUntil(end, on, book, amount);

  let owed: number = close.incentiveOwedCents;
  for (const { on, book, amountCents } of since) {
    add(on, book, amountCents);
    if (book === 'incentive') owed -= amountCents;
  }
  // What is owed for production so far is collected next; an overpayment is left to whoever finds it.
  const isLate = today < close.on;
  if (owed > 0) addUntil(horizon, addDays(isLate ? close.on : today, 1), 'incentive', owed);
  const loans = loansOf(facts);
  for (const loan of loans) {
    for (const step of loanBook(loan).steps) add(step.on, 'loan', step.cashCents);
  }
  if (end < horizon) addUntil(horizon, end, 'loan', -owedOn(loans, end, 'before').payoffCents);
  if (facts.mortgage) {
    for (const entry of insuranceEntries(facts.mortgage, end)) add(entry.date, 'insurance', entry.amountCents);
  }
  if (facts.credit) {
    for (const part of creditExpected(facts.credit, today)) addUntil(horizon, part.on, 'credit', part.amountCents);
  }
  for (const flow of costFlows(facts.costs, addDays(today, 1), end)) add(flow.on, flow.book, flow.amountCents);
  if (facts.lease) {
    for (const flow of leaseFlows(facts.lease, close.on, end)) add(flow.on, flow.book, flow.amountCents);
  }
  const { upkeepYearlyCents } = facts.assumptions;
  const upkeep = upkeepYearlyCents === 0 ? [] : upkeepOf(upkeepYearlyCents, periods);
  for (const part of upkeep) add(part.on, 'upkeep', -part.amount);
  for (const flow of changes.flows) addUntil(horizon, flow.on, flow.book, flow.amountCents);
  return flows.sort((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : 0));
}

/** A twelfth of the year's upkeep on each month's first day, the first by its days; cents carried so that twelve months make the year. */
function upkeepOf(yearlyCents: number, periods: readonly Period[]): { on: Day; amount: number }[] {
  const first = keptAt(periods, 0);
  const monthDays = daysInMonth(yearOf(first.from), monthOf(first.from));
  const firstDays = daysBetween(first.from, first.to);
  let given = 0;
  return periods.map((period) => {
    const due = roundedMean(cents(yearlyCents * (firstDays + period.index * monthDays)), 12 * monthDays);
    const part = due - given;
    given = due;
    return { on: period.from, amount: part };
  });
}
