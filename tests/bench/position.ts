import { performance } from 'node:perf_hooks';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import type { Ledger } from '#shared/ledger/ledger.ts';
import { addMonths, day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';

export type BenchLine = { name: string; value: number; unit: string; ratio: number; aim: string };

const CYCLES = 300;
const RUNS = 25;
const WARM_UP = 15;

/**
 * The whole ledger of a household of 300 cycles (no interval days), position and projection included, recomputed from its facts; median of 25 warmed
 * runs, and its ratio to `JSON.stringify` of the result.
 */
export async function benchPosition(): Promise<BenchLine[]> {
  const start = day('2001-06-14');
  const facts = buildHousehold({ cycles: CYCLES, start });
  const plans = facts.plans.map((one) => ({
    ...one,
    from: day('2001-01-01'),
    plan: datedFrom(one.plan, '2001-01-01'),
  }));
  const household = { ...facts, plans };
  const today = addMonths(start, CYCLES);
  let ledger: Ledger = computeLedger(household, { today });
  const last = ledger.cycles.at(-1);
  if (ledger.cycles.length !== CYCLES || last?.settlement == null || ledger.position.projection === null) {
    throw new Error('the household of the benchmark is not settled whole');
  }
  const compute = medianOf(() => {
    ledger = computeLedger(household, { today });
  });
  let size = 0;
  const print = medianOf(() => {
    size += JSON.stringify(ledger.position).length;
  });
  let whole = 0;
  const printWhole = medianOf(() => {
    whole += JSON.stringify(ledger).length;
  });
  if (size === 0 || whole === 0) throw new Error('nothing was printed');
  return [
    {
      name: 'ledger of 300 cycles, to the whole ledger',
      value: rounded(compute),
      unit: 'ms',
      ratio: rounded(compute / printWhole),
      aim: '≤ 60×, ≤ 25 ms',
    },
    {
      name: 'ledger of 300 cycles, to its position',
      value: rounded(compute),
      unit: 'ms',
      ratio: rounded(compute / print),
      aim: 'for information',
    },
  ];
}

function datedFrom<T>(value: T, from: string): T {
  return JSON.parse(JSON.stringify(value).replaceAll('"from":"2025-01-01"', `"from":"${from}"`)) as T;
}

function medianOf(run: () => void): number {
  for (let at = 0; at < WARM_UP; at += 1) run();
  const times: number[] = [];
  for (let at = 0; at < RUNS; at += 1) {
    const began = performance.now();
    run();
    times.push(performance.now() - began);
  }
  times.sort((a, b) => a - b);
  return times[Math.floor(times.length / 2)] ?? 0;
}

function rounded(value: number): number {
  return Math.round(value * 100) / 100;
}
