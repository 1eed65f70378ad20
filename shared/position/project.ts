import type { Entry } from '../books/book.ts';
import { eligibleDays, incentiveFor } from '../books/incentive.ts';
import { purchaseOfPeriod } from '../books/lease.ts';
import { creditEarnedBy } from '../books/tax-credit.ts';
import type { HouseholdFacts } from '../facts/household.ts';
import type { HourlyProfile } from '../metering/hourly-profile.ts';
import { keptAt } from '../settlement/place.ts';
import type { Opening } from '../settlement/settlement.ts';
import { type Cents, cents } from '../units/cents.ts';
import { type Day, daysBetween } from '../units/day.ts';
import type { Wh } from '../units/energy.ts';
import { assumptionsOf } from './assumptions.ts';
import type { BasisFacts, EnergyCycle, ProjectionBasis } from './basis.ts';
import { asByBook, noSums, totalOf } from './books-sum.ts';
import { type Changes, NO_CHANGES } from './changes.ts';
import { lastingCrossing } from './even.ts';
import { flowsAfter } from './flows-after.ts';
import { loansOf, owedOn } from './loans.ts';
import { basisOf } from './make-basis.ts';
import { type MonthlyEnergy, monthlyEnergy } from './monthly-energy.ts';
import { energyOfPeriods, type Period, type PeriodEnergy, periodsAfter } from './periods.ts';
import type { PositionPoint, ProjectedMonth, Projection } from './position.ts';
import { type BillSides, billSides, type ProjectedBill, projectBills } from './projected-bills.ts';

export type ProjectionFacts = Pick<
  HouseholdFacts,
  | 'house'
  | 'plans'
  | 'loan'
  | 'otherLoans'
  | 'lease'
  | 'mortgage'
  | 'credit'
  | 'incentive'
  | 'costs'
  | 'usageBefore'
  | 'assumptions'
>;

/** A closed cycle; nothing is said of its periods where it has no split. */
export type StatedCycle = Omit<EnergyCycle, 'split'> & Partial<Pick<EnergyCycle, 'split'>>;

export type ProjectionInput = {
  facts: ProjectionFacts;
  today: Day;
  /** Closed cycles with their energies, in order. */
  cycles: readonly StatedCycle[];
  /** The shape of a mean day, where the readings give one. */
  hourly?: HourlyProfile | null;
  /** What the utility's books hold after the last cycle. */
  opening: Opening;
  /** The position's points (`foldPosition`). */
  points: readonly PositionPoint[];
  /** Entries already known since the last cycle. */
  since: readonly Entry[];
};

export type Projected = { ok: true; projection: Projection } | { ok: false; why: string };

/** A projection with the parts it was made of, month by month: what resampling starts from. */
export type ProjectionParts = {
  ok: true;
  facts: BasisFacts;
  energy: MonthlyEnergy;
  periods: Period[];
  energies: PeriodEnergy[];
  sides: BillSides;
  bills: ProjectedBill[];
  /** What each month's production brings and costs beside the bill. */
  made: MadeMoney[];
  months: ProjectedMonth[];
};

/** The base projection of a household's record. */
export function projectBase(input: ProjectionInput): Projected {
  const made = basisOf(input);
  return made.ok ? projectFrom(made.basis) : made;
}

/**
 * A projection: month by month from the last closed cycle, the plan's own rules settled again each month with the roof and without it, the
 * other books by their own dates, each ending when it ends. Pure: the same basis and changes give the same months. No range is worked out here.
 */
export function projectFrom(basis: ProjectionBasis, changes: Changes = NO_CHANGES): Projected {
  const parts = projectParts(basis, changes);
  if (!parts.ok) return parts;
  const { months, facts, energy } = parts;
  return {
    ok: true,
    projection: {
      months,
      evenOn: evenOn(
        basis.evenSince,
        months.map((month) => month.on),
        months.map((month) => month.settledTodayCents),
      ),
      assumptions: assumptionsOf(facts, energy, parts.sides.shared, basis.today),
    },
  };
}

type MadeParts = ProjectionParts | { ok: false; why: string };

/** The base projection's parts, once per basis: range, handbook figures and carbon all start from them. */
const baseParts = new WeakMap<ProjectionBasis, MadeParts>();

/** A projection in its parts (`projectFrom`); what it gives must not be changed in place. */
export function projectParts(basis: ProjectionBasis, changes: Changes = NO_CHANGES): MadeParts {
  if (changes !== NO_CHANGES) return makeParts(basis, changes);
  const known = baseParts.get(basis);
  if (known) return known;
  const made = makeParts(basis, changes);
  baseParts.set(basis, made);
  return made;
}

function makeParts(basis: ProjectionBasis, changes: Changes): MadeParts {
  const facts: BasisFacts = { ...basis.facts, ...changes.facts };
  const { assumptions } = facts;
  const energy = monthlyEnergy({
    cycles: basis.cycles,
    lastTo: basis.close.on,
    expectedMonthlyWh: facts.house.expectedMonthlyWh,
    usageBefore: facts.usageBefore,
    degradation: assumptions.degradation,
  });
  if (energy === null) {
    return { ok: false, why: 'Add production and the meter reads of one cycle to see a projection.' };
  }
  const periods = periodsAfter(basis.close.on, assumptions.horizonMonths);
  const energies = energyOfPeriods(periods, energy, assumptions.degradation).map((made, at) => {
    return changes.energy ? changes.energy(made, keptAt(periods, at)) : made;
  });
  const sides = billSides(basis, facts, changes, periods);
  if (sides === null) return { ok: false, why: 'There is no rate plan for the months to come.' };
  const settled = projectBills(sides, energies, basis.opening);
  if (!settled.ok) return settled;
  const made = periods.map((period, at) =>
    moneyOfProduction(facts, changes.endsOn, period, keptAt(energies, at).productionWh),
  );
  const months = monthsOf(basis, facts, changes, periods, settled.bills, made);
  return { ok: true, facts, energy, periods, energies, sides, bills: settled.bills, made, months };
}

function monthsOf(
  basis: ProjectionBasis,
  facts: BasisFacts,
  changes: Changes,
  periods: readonly Period[],
  bills: readonly ProjectedBill[],
  made: readonly MadeMoney[],
): ProjectedMonth[] {
  const { close } = basis;
  const flows = flowsAfter(basis, facts, changes, periods);
  const loans = loansOf(facts);
  let next = 0;
  let cash: number = close.cashSoFarCents;
  let owed: number = close.incentiveOwedCents;
  let creditReceived: number = close.creditReceivedCents;
  return periods.map((period, at): ProjectedMonth => {
    const bill = keptAt(bills, at);
    const money = keptAt(made, at);
    const books = noSums();
    for (let flow = flows[next]; flow !== undefined && flow.on < period.to; flow = flows[next]) {
      books[flow.book] += flow.amountCents;
      if (flow.book === 'incentive') owed -= flow.amountCents;
      if (flow.book === 'credit') creditReceived += flow.amountCents;
      next += 1;
    }
    books.billAvoided += bill.avoidedCents;
    books.incentive += money.incentiveCents;
    books.loan += money.purchaseCents;
    const added = totalOf(books);
    cash += added;
    const isSold = changes.endsOn !== null && changes.endsOn < period.to;
    const { payoffCents, balanceCents } = isSold ? NOTHING_OWED : owedOn(loans, period.to, 'before');
    const credit = facts.credit ? creditEarnedBy(facts.credit, period.to) - creditReceived : 0;
    return {
      on: period.to,
      books: asByBook(books),
      addedCents: cents(added),
      cashSoFarCents: cents(cash),
      loanPayoffCents: cents(-payoffCents),
      creditStillToComeCents: cents(credit),
      incentiveOwedCents: cents(owed),
      utilityBankCents: bill.bankCents,
      settledTodayCents: cents(cash - payoffCents + credit + owed + bill.bankCents),
      loanBalanceCents: cents(balanceCents),
    };
  });
}

const NOTHING_OWED = { payoffCents: 0, balanceCents: 0 };

/**
 * The first day from which settled today stays at or above zero, through the record's last closes and the months to come; null when it does not
 * within the horizon.
 */
export function evenOn(evenSince: Day | null, days: readonly Day[], settledCents: ArrayLike<number>): Day | null {
  const index = lastingCrossing(settledCents);
  if (index === null) return null;
  return index === 0 && evenSince !== null ? evenSince : keptAt(days, index);
}

/** What production earns by the incentive and costs by a power-purchase agreement (negative). */
export type MadeMoney = { incentiveCents: Cents; purchaseCents: Cents };

const NOTHING_MADE: MadeMoney = { incentiveCents: cents(0), purchaseCents: cents(0) };

/** What a month's production brings and costs beside the bill, taken as paid in the month. Nothing once the house is sold. */
export function moneyOfProduction(
  facts: Pick<BasisFacts, 'incentive' | 'lease'>,
  endsOn: Day | null,
  period: Period,
  productionWh: Wh,
): MadeMoney {
  const { incentive, lease } = facts;
  if ((!incentive && !lease) || (endsOn !== null && period.from >= endsOn)) return NOTHING_MADE;
  const eligible = incentive ? eligibleDays(incentive, period.from, period.to) : 0;
  return {
    incentiveCents:
      incentive && eligible > 0
        ? incentiveFor(incentive, productionWh, eligible, daysBetween(period.from, period.to))
        : cents(0),
    purchaseCents: lease ? purchaseOfPeriod(lease, period.to, productionWh) : cents(0),
  };
}
