import type { CreditCost, CreditFacts } from '../facts/finance.ts';
import { type Cents, sumCents } from '../units/cents.ts';
import { type Day, yearOf } from '../units/day.ts';
import type { DecimalText } from '../units/rate-text.ts';
import { creditLaw, creditRate } from './credit-rate.ts';
import { countedShare, creditLine1, creditLine6b } from './form-5695.ts';

/**
 * What was completed in one year: the year's own rate holds for it (26 U.S.C. 25D(g)), and it enters the form of that year alone. `counts`: it makes
 * line 1 of its year. `noCredit`: the law gives its year none, whenever it was paid. `inCarriedIn`: a return before the record took it in already.
 */
export type CreditVintage = {
  year: number;
  state: 'counts' | 'noCredit' | 'inCarriedIn';
  rate: DecimalText;
  /** The law that sets the rate. */
  law: string;
  costs: CreditCost[];
  /** What qualifies before anything is taken off, and what is taken off. */
  grossCents: Cents;
  reductionCents: Cents;
  /** The share of the cost that counts, "1" from 80 % home use on. */
  share: DecimalText;
  /** In whole dollars; zero where there is no credit. */
  line1Cents: Cents;
  line6bCents: Cents;
};

/** The day a part of the cost was completed: its own, else the roof's; null until either is stated. */
export function completedOn(credit: Pick<CreditFacts, 'placedInServiceOn'>, cost: CreditCost): Day | null {
  return cost.placedInServiceOn ?? credit.placedInServiceOn;
}

/** Costs for which no day of completion is stated: they earn nothing until one is. */
export function undatedCosts(credit: CreditFacts): CreditCost[] {
  return credit.costs.filter((cost) => completedOn(credit, cost) === null);
}

/** The vintages in order of their years, of the costs completed by a day, or of all. */
export function creditVintages(credit: CreditFacts, by: Day | null = null): CreditVintage[] {
  const byYear = new Map<number, CreditCost[]>();
  // The roof's own year stands even before any cost is entered.
  const roof = credit.placedInServiceOn;
  if (roof !== null && (by === null || roof <= by)) byYear.set(yearOf(roof), []);
  for (const cost of credit.costs) {
    const on = completedOn(credit, cost);
    if (on === null || (by !== null && on > by)) continue;
    byYear.set(yearOf(on), [...(byYear.get(yearOf(on)) ?? []), cost]);
  }
  return [...byYear].sort(([a], [b]) => a - b).map(([year, costs]) => vintageOf(credit, year, costs));
}

function vintageOf(credit: CreditFacts, year: number, costs: CreditCost[]): CreditVintage {
  const rate = creditRate(year);
  const before = credit.carriedIn !== null && year <= credit.carriedIn.taxYear;
  const state = rate === '0' ? 'noCredit' : before ? 'inCarriedIn' : 'counts';
  const line1Cents = creditLine1(state === 'noCredit' ? [] : costs, credit.homeShare);
  const sumOf = (treatment: CreditCost['treatment']) =>
    sumCents(costs.filter((cost) => cost.treatment === treatment).map((cost) => cost.amountCents));
  return {
    year,
    state,
    rate,
    law: creditLaw(year),
    costs,
    grossCents: sumOf('qualified'),
    reductionCents: sumOf('reduction'),
    share: countedShare(credit.homeShare).toString(),
    line1Cents,
    line6bCents: creditLine6b(line1Cents, rate, year),
  };
}
