import { type CostFacts, type CostKind, INCOME_KINDS } from '../facts/house.ts';
import { type Cents, cents, negateCents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { Working } from '../working.ts';
import type { BookId, UnplacedEntry } from './book.ts';
import { costDays } from './cost-days.ts';
import { stated, usdInput } from './inputs.ts';
import { type PaperName, sourceOfPaper } from './paper-source.ts';

/** What keeping the roof up costs, year after year; everything else is in the costs book. */
const UPKEEP_KINDS: readonly CostKind[] = ['upkeep', 'repair', 'insurance', 'propertyTax'];

/**
 * Cash entries of costs and incomes through a day: incomes positive, costs negative, a recurring one with an entry for each day it fell on
 * (`cost-<id>-<n>`, n from 1). `papers` gives a paper its name.
 */
export function costEntries(
  costs: readonly CostFacts[],
  through: Day,
  papers: readonly PaperName[] = [],
): UnplacedEntry[] {
  return costs.flatMap((cost) => {
    const working = workingOf(cost, papers);
    return costDays(cost, through).map(
      (on, index): UnplacedEntry => ({
        id: cost.every === null ? `cost-${cost.id}` : `cost-${cost.id}-${index + 1}`,
        date: on,
        book: bookOf(cost.kind),
        kind: cost.kind,
        label: cost.label,
        amountCents: signedAmount(cost),
        basis: 'cash',
        estimated: false,
        working,
      }),
    );
  });
}

/** Money of the costs and upkeep books on a day to come. */
export type CostFlow = { on: Day; book: BookId; amountCents: Cents };

/** What costs and incomes move on the days of `[from, to)`, by the same rule as their entries: for the projection, from the day after today. */
export function costFlows(costs: readonly CostFacts[], from: Day, to: Day): CostFlow[] {
  return costs.flatMap((cost) =>
    costDays(cost, to)
      .filter((on) => on >= from && on < to)
      .map((on) => ({ on, book: bookOf(cost.kind), amountCents: signedAmount(cost) })),
  );
}

/** What a sum has come to through a day: positive, as its amount is. */
export function costToDate(cost: CostFacts, through: Day): Cents {
  return cents(cost.amountCents * costDays(cost, through).length);
}

function bookOf(kind: CostKind): BookId {
  return UPKEEP_KINDS.includes(kind) ? 'upkeep' : 'costs';
}

function signedAmount(cost: CostFacts): Cents {
  return INCOME_KINDS.includes(cost.kind) ? cost.amountCents : negateCents(cost.amountCents);
}

function workingOf(cost: CostFacts, papers: readonly PaperName[]): Working {
  const income = INCOME_KINDS.includes(cost.kind);
  const often = cost.every === null ? '' : ` every ${cost.every}`;
  return {
    words: income ? `Received${often}, as entered; before income tax` : `Paid${often}, as entered`,
    formula: income ? 'amount' : '-amount',
    inputs: [
      usdInput(
        'amount',
        cost.label,
        cost.amountCents,
        sourceOfPaper(cost.documentId, papers, stated('Costs and incomes as entered')),
      ),
    ],
    unit: 'USD',
    basis: 'entered',
  };
}
