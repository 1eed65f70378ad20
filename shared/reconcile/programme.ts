import { eligibleDays, incentiveFor } from '../books/incentive.ts';
import { type Matched, type MatchedReceipt, matchIncentive } from '../books/incentive-match.ts';
import type { IncentiveFacts } from '../facts/finance.ts';
import type { CyclePaper } from '../ledger/cycle-papers.ts';
import { isComplete, type MeteredCycle } from '../metering/cycle-energy.ts';
import { type IntervalIndex, intervalEnergy } from '../metering/interval-index.ts';
import { type Cents, sumCents, ZERO_CENTS } from '../units/cents.ts';
import { addDays, type Day, earliestDay, latestDay } from '../units/day.ts';
import { sumWh, type Wh, wh, ZERO_WH } from '../units/energy.ts';
import { Exact } from '../units/rate.ts';

/** What was made, what of it within the term, and what that earned. */
export type Made = { productionWh: Wh; eligibleWh: Wh; earnedCents: Cents };

/** A cycle as the incentive's checks see it, with the receipts that pay it; `made` is null where the production is not known. */
export type ProgrammeCycle = Matched<{
  index: number;
  from: Day;
  to: Day;
  days: number;
  eligible: number;
  made: Made | null;
  earnedCents: Cents;
}>;

/** What the incentive earned in every cycle, and which receipt pays which. */
export type Programme = {
  terms: IncentiveFacts;
  cycles: ProgrammeCycle[];
  receipts: MatchedReceipt[];
  /** The latest day the record speaks of; ages are counted from it, since checks read no clock. */
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
  const cycles = meters.flatMap(({ energy: { production } }, at) =>
    papers.slice(at, at + 1).map(({ index, from, to, days }) => {
      const eligible = eligibleDays(terms, from, to);
      const made = isComplete(production) ? madeOf(terms, production.wh, eligible, days) : null;
      return { index, from, to, days, eligible, made, earnedCents: made?.earnedCents ?? ZERO_CENTS };
    }),
  );
  const received = terms.paidAs === 'separate' ? terms.received : [];
  const match = matchIncentive(cycles, received);
  const through = latestDay(last.to, ...received.map(({ on }) => on));
  return { terms, cycles: match.cycles, receipts: match.receipts, through };
}

function madeOf(terms: IncentiveFacts, productionWh: Wh, eligible: number, days: number): Made {
  return {
    productionWh,
    eligibleWh: shareOf(productionWh, eligible, days),
    earnedCents: incentiveFor(terms, productionWh, eligible, days),
  };
}

/** The kWh of a cycle that lie within the term, by days. */
function shareOf(production: Wh, eligible: number, days: number): Wh {
  return wh(new Exact(production).times(eligible).div(days).toDecimalPlaces(0, Exact.ROUND_HALF_UP).toNumber());
}

/** What was made over the days a payment covers, and the places of the cycles they are; none where it is read from the file instead. */
export type Span = Made & { cycles: number[] };

/**
 * The span `[from, to)` as the sum of its cycles where it begins and ends with one; else from a production file without a gap. A text says why neither is
 * possible.
 */
export function spanOf({ terms, cycles }: Programme, index: IntervalIndex, from: Day, to: Day): Span | string {
  const within = cycles.filter((cycle) => cycle.from >= from && cycle.to <= to);
  const made = within.flatMap((cycle) => cycle.made ?? []);
  const whole = isWhole(within, from, to);
  if (whole && made.length === within.length) {
    return {
      cycles: within.map((cycle) => cycle.index),
      productionWh: sumWh(made.map((one) => one.productionWh)),
      eligibleWh: sumWh(made.map((one) => one.eligibleWh)),
      earnedCents: sumCents(made.map((one) => one.earnedCents)),
    };
  }
  const file = intervalEnergy(index, 'production', from, to);
  if (file?.complete) {
    const begin = latestDay(from, terms.firstDay);
    const end = earliestDay(to, addDays(terms.lastDay, 1));
    const eligibleWh = intervalEnergy(index, 'production', begin, end)?.figure.wh ?? ZERO_WH;
    const earnedCents = incentiveFor(terms, eligibleWh, 1, 1);
    return { cycles: [], productionWh: file.figure.wh, eligibleWh, earnedCents };
  }
  return whole
    ? 'The production of these days is not completely known.'
    : 'It begins or ends inside a cycle, and no production file covers its days without a gap.';
}

/** Whether cycles follow one another from the first of some days (or from where the record begins) to the last. */
function isWhole(within: readonly ProgrammeCycle[], from: Day, to: Day): boolean {
  let reached: Day | null = null;
  for (const cycle of within) {
    const begins = reached ?? (cycle.index === 0 ? cycle.from : from);
    if (cycle.from !== begins) return false;
    reached = cycle.to;
  }
  return reached === to;
}

/** The cycle some days end in; null while no statement reaches their end. */
export function cycleOfEnd({ cycles }: Programme, to: Day): ProgrammeCycle | null {
  return cycles.find((cycle) => cycle.from < to && to <= cycle.to) ?? null;
}
