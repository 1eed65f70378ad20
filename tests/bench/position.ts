import { performance } from 'node:perf_hooks';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import { computeLedger, postLedger } from '#shared/ledger/compute-ledger.ts';
import { assembleCycles } from '#shared/ledger/cycles.ts';
import { projectFrom } from '#shared/position/project.ts';
import { rangeOf } from '#shared/position/range.ts';
import { addMonths, day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';

/** One line of the benchmark: the measured value, and its ratio to a floor measured beside it. */
export type BenchLine = { name: string; value: number; unit: string; ratio: number; aim: string };

const CYCLES = 300;
const RUNS = 25;
const WARM_UP = 15;

/**
 * A household of 300 cycles (no interval days), computed from its facts: first the whole ledger with every cycle settled and checked, then its
 * books and position alone (entries, fold, figures, projection of 300 months). Medians of 25 warmed runs, as ratios to `JSON.stringify` of the results.
 */
export async function benchPosition(): Promise<BenchLine[]> {
  const start = day('2001-06-14');
  const facts = longHousehold();
  const today = addMonths(start, CYCLES);
  const ledger = computeLedger(facts, { today });
  if (ledger.cycles.some((cycle) => cycle.settlement === null) || ledger.position.projection === null) {
    throw new Error('the household of the benchmark is not settled whole');
  }
  const assembled = assembleCycles(facts);
  const { cycles: _, ...posted } = ledger;
  return [
    line(
      `whole ledger of ${CYCLES} cycles`,
      () => computeLedger(facts, { today }),
      () => JSON.stringify(ledger),
    ),
    line(
      `books and position of ${CYCLES} cycles`,
      () => postLedger(facts, assembled, today),
      () => JSON.stringify(posted),
    ),
    ...benchProjection(),
  ];
}

const MONTHS = 300;
const RESAMPLES = 200;

/** What the projection and its range cost: the base as one step, then with 200 resampled futures, as ratios to a loop that only prices and adds the same months. */
function benchProjection(): BenchLine[] {
  const start = day('2024-06-14');
  const facts = buildHousehold({ cycles: 26, start });
  const { plans } = longHousehold();
  const { basis } = computeLedger({ ...facts, plans }, { today: addMonths(start, 26) });
  if (basis === null || basis.facts.assumptions.horizonMonths !== MONTHS) throw new Error('there is no projection');
  // A basis of its own each time: the parts of a basis are kept.
  const step = medianOf(() => projectFrom({ ...basis }));
  const range = medianOf(() => {
    const made = rangeOf({ ...basis });
    if (!made.ok || made.range.resamples !== RESAMPLES) throw new Error('the range is not whole');
    return made.range;
  });
  return [
    {
      name: `one projection of ${MONTHS} months`,
      value: step,
      unit: 'ms',
      ratio: step / medianOf(() => bareMonths(1)),
      aim: 'at most 50 ms',
    },
    {
      name: `range of ${MONTHS} months, ${RESAMPLES} resamples`,
      value: range,
      unit: 'ms',
      ratio: range / medianOf(() => bareMonths(RESAMPLES)),
      aim: 'at most 400 ms',
    },
  ];
}

/** The floor: both bills of as many months in whole numbers, with a bank carried on. */
function bareMonths(futures: number): number {
  let total = 0;
  for (let future = 0; future < futures; future += 1) {
    let bank = 0;
    for (let month = 0; month < MONTHS; month += 1) {
      const bought = 400_000 + ((month * 37 + future * 11) % 211) * 1000;
      const sent = 200_000 + ((month * 53 + future * 7) % 409) * 1000;
      const energy = Math.round((bought * 1684) / 100_000);
      const used = Math.min(bank, energy);
      bank += Math.round((sent * 950) / 100_000) - used;
      const tax = Math.round((energy + 1450) * 0.031);
      total += Math.round(((bought + sent) * 1684) / 100_000) - (energy + 1450 + tax - used);
    }
  }
  return total;
}

function line(name: string, compute: () => unknown, print: () => string): BenchLine {
  const value = medianOf(compute);
  return { name, value, unit: 'ms', ratio: value / medianOf(print), aim: 'at most 60 ×, 25 ms' };
}

function longHousehold(): HouseholdFacts {
  const facts = buildHousehold({ cycles: CYCLES, start: day('2001-06-14') });
  const [inForce] = facts.plans;
  if (!inForce) throw new Error('the built household has no plan');
  const from = day('2001-01-01');
  const dated = <T extends { rates: { from: string }[] | null }>(item: T): T => ({
    ...item,
    rates: item.rates?.map((rate) => ({ ...rate, from })) ?? null,
  });
  const { plan } = inForce;
  return {
    ...facts,
    plans: [
      { ...inForce, from, plan: { ...plan, charges: plan.charges.map(dated), credits: plan.credits.map(dated) } },
    ],
  };
}

function medianOf(run: () => unknown): number {
  let kept: unknown = null;
  for (let at = 0; at < WARM_UP; at += 1) kept = run();
  const times: number[] = [];
  for (let at = 0; at < RUNS; at += 1) {
    const began = performance.now();
    kept = run();
    times.push(performance.now() - began);
  }
  if (kept === null) throw new Error('nothing was measured');
  times.sort((a, b) => a - b);
  return times[Math.floor(times.length / 2)] ?? 0;
}
