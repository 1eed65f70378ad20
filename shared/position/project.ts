import type { BookId, Entry } from '../books/book.ts';
import { creditExpected } from '../books/credit-expected.ts';
import { eligibleDays, incentiveFor } from '../books/incentive.ts';
import { loanStateOn } from '../books/loan.ts';
import { loanBook } from '../books/loan-book.ts';
import { insuranceEntries } from '../books/mortgage-insurance.ts';
import { creditEarnedBy } from '../books/tax-credit.ts';
import type { HouseholdFacts } from '../facts/household.ts';
import type { Opening } from '../settlement/settlement.ts';
import { cents, ZERO_CENTS } from '../units/cents.ts';
import { addDays, type Day, dayOf, daysBetween, daysInMonth, monthOf, yearOf } from '../units/day.ts';
import { assumptionsOf } from './assumptions.ts';
import { bankWorth } from './bank-worth.ts';
import { asByBook, counts, noSums, totalOf } from './books-sum.ts';
import { lastingCrossing } from './even.ts';
import { type EnergyCycle, monthlyEnergy } from './monthly-energy.ts';
import type { PositionPoint, ProjectedMonth, Projection } from './position.ts';
import { energyOfPeriods, type Period, type PeriodEnergy, projectBills } from './projected-bills.ts';
import { roundedMean } from './sums.ts';

export type ProjectionFacts = Pick<
  HouseholdFacts,
  'house' | 'plans' | 'loan' | 'mortgage' | 'credit' | 'incentive' | 'usageBefore' | 'assumptions'
>;

export type ProjectionInput = {
  facts: ProjectionFacts;
  today: Day;
  /** Closed cycles with their energies, in order. */
  cycles: readonly EnergyCycle[];
  /** What the utility's books hold after the last cycle. */
  opening: Opening;
  /** The position's points (`foldPosition`). */
  points: readonly PositionPoint[];
  /** Entries already known since the last cycle. */
  since: readonly Entry[];
};

export type Projected = { ok: true; projection: Projection } | { ok: false; why: string };

/** Money on a day to come. */
type Flow = { on: Day; book: BookId; cents: number };

/**
 * The base projection: month by month from the last closed cycle, the plan's own rules settled again each month with the roof and without it, the
 * other books by their own dates, each ending when it ends. No range is worked out here.
 */
export function projectBase(input: ProjectionInput): Projected {
  const { facts, points, today } = input;
  const close = points.filter((point) => point.cycle !== 'before' && point.cycle !== 'since').at(-1);
  if (close === undefined) return { ok: false, why: 'Post the first cycle to see a projection.' };
  if (facts.plans.length === 0) return { ok: false, why: 'Enter the rate plan to see a projection.' };
  const lastTo = close.on;
  const energy = monthlyEnergy({
    cycles: input.cycles,
    lastTo,
    expectedMonthlyWh: facts.house.expectedMonthlyWh,
    usageBefore: facts.usageBefore,
    degradation: facts.assumptions.degradation,
  });
  if (energy === null) {
    return { ok: false, why: 'Add production and the meter reads of one cycle to see a projection.' };
  }
  const periods = periodsAfter(lastTo, facts.assumptions.horizonMonths);
  const energies = energyOfPeriods(periods, energy, facts.assumptions.degradation);
  const settled = projectBills(facts, periods, energies, input.opening);
  if (!settled.ok) return settled;

  const flows = flowsAfter(input, periods, close);
  let next = 0;
  let cash: number = close.cashSoFarCents;
  let owed: number = close.incentiveOwedCents;
  let creditReceived = facts.credit ? creditEarnedBy(facts.credit, lastTo) - close.creditStillToComeCents : 0;
  const months: ProjectedMonth[] = [];
  for (const [at, period] of periods.entries()) {
    const bill = settled.bills[at];
    const made = energies[at];
    if (!bill || !made) throw new Error('a projected month was not settled');
    const books = noSums();
    for (let flow = flows[next]; flow !== undefined && flow.on < period.to; flow = flows[next]) {
      books[flow.book] += flow.cents;
      if (flow.book === 'incentive') owed -= flow.cents;
      if (flow.book === 'credit') creditReceived += flow.cents;
      next += 1;
    }
    books.billAvoided += bill.avoidedCents;
    books.incentive += incentiveOfPeriod(facts, period, made);
    const added = totalOf(books);
    cash += added;
    const loan = facts.loan ? loanStateOn(facts.loan, period.to, 'before') : null;
    const credit = facts.credit ? creditEarnedBy(facts.credit, period.to) - creditReceived : 0;
    const bank = bankWorth(bill.plan, bill.closing, period.from, period.to);
    months.push({
      on: period.to,
      books: asByBook(books),
      addedCents: cents(added),
      cashSoFarCents: cents(cash),
      settledTodayCents: cents(cash - (loan?.payoffCents ?? 0) + credit + owed + bank),
      loanBalanceCents: loan?.balanceCents ?? ZERO_CENTS,
    });
  }
  const projection = { months, evenOn: evenOn(points, months), assumptions: assumptionsOf(facts, energy, today) };
  return { ok: true, projection };
}

/** Calendar months from the last close; the first is what is left of its month. */
function periodsAfter(lastTo: Day, count: number): Period[] {
  const periods: Period[] = [];
  let from = lastTo;
  for (let index = 0; index < count; index += 1) {
    const to = dayOf(yearOf(from), monthOf(from) + 1, 1);
    periods.push({ index, from, to });
    from = to;
  }
  return periods;
}

/** The first cycle or month from which settled today stays at or above zero; a provisional cycle does not move it. */
function evenOn(points: readonly PositionPoint[], months: readonly ProjectedMonth[]): Day | null {
  const closes = points.filter((point) => point.cycle !== 'before' && point.cycle !== 'since' && !point.provisional);
  const line = [...closes, ...months];
  const index = lastingCrossing(line.map((point) => point.settledTodayCents));
  return index === null ? null : (line[index]?.on ?? null);
}

/** What is known or set to move on days from the last close on, in order: bills and the incentive are worked out by the month instead. */
function flowsAfter(input: ProjectionInput, periods: readonly Period[], close: PositionPoint): Flow[] {
  const { facts, today } = input;
  const lastTo = close.on;
  const horizon = periods.at(-1)?.to ?? lastTo;
  const flows: Flow[] = [];
  let owed: number = close.incentiveOwedCents;
  const add = (on: Day, book: BookId, amount: number) => {
    if (on >= lastTo && on < horizon && amount !== 0) flows.push({ on, book, cents: amount });
  };
  for (const entry of input.since) {
    // Loan and insurance follow from their schedules below.
    const follows = entry.book === 'loan' || entry.book === 'insurance';
    if (counts(entry) && !follows) add(entry.date, entry.book, entry.amountCents);
    if (counts(entry) && entry.book === 'incentive') owed -= entry.amountCents;
  }
  // What is owed for production so far is collected next; an overpayment is left to whoever finds it.
  const isLate = today < lastTo;
  if (owed > 0) add(addDays(isLate ? lastTo : today, 1), 'incentive', owed);
  if (facts.loan) {
    for (const step of loanBook(facts.loan).steps)
      add(step.on, 'loan', -(step.regularCents + step.extraPrincipalCents));
  }
  if (facts.mortgage) {
    for (const entry of insuranceEntries(facts.mortgage, horizon)) add(entry.date, 'insurance', entry.amountCents);
  }
  if (facts.credit) {
    for (const part of creditExpected(facts.credit, today)) add(part.on, 'credit', part.amountCents);
  }
  const { upkeepYearlyCents } = facts.assumptions;
  const upkeep = upkeepYearlyCents === 0 ? [] : upkeepOf(upkeepYearlyCents, periods);
  for (const part of upkeep) add(part.on, 'upkeep', -part.cents);
  return flows.sort((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : 0));
}

/** A twelfth of the year's upkeep on each month's first day, the first by its days; cents carried so that twelve months make the year. */
function upkeepOf(yearlyCents: number, periods: readonly Period[]): { on: Day; cents: number }[] {
  const first = periods[0];
  if (first === undefined) return [];
  const monthDays = daysInMonth(yearOf(first.from), monthOf(first.from));
  const firstDays = daysBetween(first.from, first.to);
  let given = 0;
  return periods.map((period) => {
    const due = roundedMean(cents(yearlyCents * (firstDays + period.index * monthDays)), 12 * monthDays);
    const part = due - given;
    given = due;
    return { on: period.from, cents: part };
  });
}

/** What the month's production earns within the term, taken as paid in the month. */
function incentiveOfPeriod(facts: ProjectionFacts, period: Period, energy: PeriodEnergy): number {
  if (!facts.incentive) return 0;
  const eligible = eligibleDays(facts.incentive, period.from, period.to);
  if (eligible === 0) return 0;
  return incentiveFor(facts.incentive, energy.productionWh, eligible, daysBetween(period.from, period.to));
}
