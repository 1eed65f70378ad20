import { eligibleDays, incentiveFor } from '../books/incentive.ts';
import { type IncentiveMatch, matchIncentive } from '../books/incentive-match.ts';
import type { IncentiveFacts } from '../facts/finance.ts';
import type { CyclePaper } from '../ledger/cycle-papers.ts';
import { isComplete, type MeteredCycle } from '../metering/cycle-energy.ts';
import { type IntervalIndex, intervalEnergy } from '../metering/interval-index.ts';
import { type Cents, sumCents, ZERO_CENTS } from '../units/cents.ts';
import { addDays, type Day, earliestDay, latestDay } from '../units/day.ts';
import { sumWh, type Wh, wh, ZERO_WH } from '../units/energy.ts';
import { Exact } from '../units/rate.ts';

/** A cycle as the incentive's checks see it. */
export type ProgrammeCycle = {
  from: Day;
  to: Day;
  days: number;
  eligible: number;
  productionWh: Wh | null;
  /** Null where the production is not known. */
  earnedCents: Cents | null;
};

/** What the incentive earned in every cycle, and which receipt pays which. */
export type Programme = {
  terms: IncentiveFacts;
  cycles: ProgrammeCycle[];
  match: IncentiveMatch;
  /** The latest day the record speaks of; ages are counted from it, since the ledger's checks read no clock. */
  through: Day;
};

/** A programme's whole record, once for a household; null without an incentive or a cycle. */
export function programmeOf(
  terms: IncentiveFacts | null,
  papers: readonly CyclePaper[],
  meters: readonly MeteredCycle[],
): Programme | null {
  const last = papers.at(-1);
  if (terms === null || last === undefined) return null;
  const cycles = papers.map(({ from, to, days }, at): ProgrammeCycle => {
    const production = meters[at]?.energy.production ?? null;
    const productionWh = isComplete(production) ? production.wh : null;
    const eligible = eligibleDays(terms, from, to);
    const earnedCents = productionWh === null ? null : incentiveFor(terms, productionWh, eligible, days);
    return { from, to, days, eligible, productionWh, earnedCents };
  });
  const earned = cycles.map(({ from, to, earnedCents }) => ({ from, to, earnedCents: earnedCents ?? ZERO_CENTS }));
  const received = terms.paidAs === 'separate' ? terms.received : [];
  const through = latestDay(last.to, ...received.map(({ on }) => on));
  return { terms, cycles, match: matchIncentive(earned, received), through };
}

/** What was made and earned over the days a payment covers. */
export type Span = {
  /** Places of the cycles it is made of; empty where it is read from the file instead. */
  cycles: number[];
  /** kWh within the term, and of the whole span. */
  eligibleWh: Wh;
  productionWh: Wh;
  earnedCents: Cents;
};

/**
 * The span `[from, to)` as the sum of its cycles where it begins and ends with one; else from a production file without a gap. A text says why neither is
 * possible.
 */
export function spanOf({ terms, cycles }: Programme, index: IntervalIndex, from: Day, to: Day): Span | string {
  const first = cycles[0];
  const within = cycles.flatMap((cycle, at) => (cycle.from >= from && cycle.to <= to ? [{ ...cycle, at }] : []));
  const begins = within[0]?.from;
  const whole =
    within.at(-1)?.to === to &&
    (begins === from || (first !== undefined && begins === first.from && from < first.from)) &&
    within.every((cycle, at) => at === 0 || within[at - 1]?.to === cycle.from);
  const made = within.flatMap(({ productionWh }) => productionWh ?? []);
  if (whole && made.length === within.length) {
    return {
      cycles: within.map(({ at }) => at),
      eligibleWh: sumWh(within.map(({ productionWh, eligible, days }) => shareOf(productionWh, eligible, days))),
      productionWh: sumWh(made),
      earnedCents: sumCents(within.flatMap(({ earnedCents }) => earnedCents ?? [])),
    };
  }
  const file = intervalEnergy(index, 'production', from, to);
  if (file?.complete) {
    const begin = latestDay(from, terms.firstDay);
    const end = earliestDay(to, addDays(terms.lastDay, 1));
    const eligible = intervalEnergy(index, 'production', begin, end)?.figure.wh ?? ZERO_WH;
    return {
      cycles: [],
      eligibleWh: eligible,
      productionWh: file.figure.wh,
      earnedCents: incentiveFor(terms, eligible, 1, 1),
    };
  }
  return whole
    ? 'The production of these days is not completely known.'
    : 'It begins or ends inside a cycle, and no production file covers its days without a gap.';
}

/** The kWh of a cycle that lie within the term, by days. */
export function shareOf(production: Wh | null, eligible: number, days: number): Wh {
  if (production === null) return ZERO_WH;
  if (eligible === days) return production;
  return wh(new Exact(production).times(eligible).div(days).toDecimalPlaces(0, Exact.ROUND_HALF_UP).toNumber());
}

/** The cycle a cover ends in; null while no statement reaches its end. */
export function cycleOfEnd({ cycles }: Programme, to: Day): number | null {
  const at = cycles.findIndex((cycle) => cycle.from < to && to <= cycle.to);
  return at === -1 ? null : at;
}
