import { creditEarnedBy } from '../books/tax-credit.ts';
import { keptAt } from '../settlement/place.ts';
import { cents, ZERO_CENTS } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { BasisFacts, ProjectionBasis } from './basis.ts';
import { counts } from './books-sum.ts';
import { lastingCrossing } from './even.ts';
import type { PositionPoint } from './position.ts';
import type { ProjectionInput } from './project.ts';

export type MadeBasis = { ok: true; basis: ProjectionBasis } | { ok: false; why: string };

/** The basis of a household's projection, or why there is none yet. */
export function basisOf(input: ProjectionInput): MadeBasis {
  const { facts, points, today } = input;
  const closes = points.filter(isClose);
  const close = closes.at(-1);
  if (close === undefined) return { ok: false, why: 'Post the first cycle to see a projection.' };
  if (facts.plans.length === 0) return { ok: false, why: 'Enter the rate plan to see a projection.' };
  const received = facts.credit ? creditEarnedBy(facts.credit, close.on) - close.creditStillToComeCents : ZERO_CENTS;
  return {
    ok: true,
    basis: {
      today,
      facts: factsOf(facts),
      cycles: input.cycles.map(({ from, to, importWh, exportWh, productionWh, provisional, split = null }) => ({
        from,
        to,
        importWh,
        exportWh,
        productionWh,
        provisional,
        split,
      })),
      hourly: input.hourly ?? null,
      opening: input.opening,
      close: {
        on: close.on,
        cashSoFarCents: close.cashSoFarCents,
        incentiveOwedCents: close.incentiveOwedCents,
        creditReceivedCents: cents(received),
      },
      evenSince: evenSince(closes),
      since: input.since
        .filter((entry) => counts(entry) && entry.book !== 'loan' && entry.book !== 'insurance')
        .map(({ date, book, amountCents }) => ({ on: date, book, amountCents })),
    },
  };
}

function factsOf(facts: ProjectionInput['facts']): BasisFacts {
  const { arrays, inverterAcWatts, expectedMonthlyWh } = facts.house;
  return {
    house: { arrays, inverterAcWatts, expectedMonthlyWh },
    plans: facts.plans,
    loan: facts.loan,
    otherLoans: facts.otherLoans,
    lease: facts.lease,
    mortgage: facts.mortgage,
    credit: facts.credit,
    incentive: facts.incentive,
    costs: facts.costs,
    usageBefore: facts.usageBefore,
    assumptions: facts.assumptions,
  };
}

function isClose(point: PositionPoint): boolean {
  return point.cycle !== 'before' && point.cycle !== 'since';
}

function evenSince(closes: readonly PositionPoint[]): Day | null {
  const firm = closes.filter((point) => !point.provisional);
  const index = lastingCrossing(firm.map((point) => point.settledTodayCents));
  return index === null ? null : keptAt(firm, index).on;
}
