import { performance } from 'node:perf_hooks';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { settle } from '#shared/settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { addMonths, day, dayNumber, daysBetween } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import type { BenchLine } from './position.ts';

const CYCLES = 300;
/** Ten years of quarter-hours are 120 monthly cycles; 300 settlements go over them two and a half times. */
const DATA_MONTHS = 120;
const STEP_MINUTES = 15;
const START = day('2016-01-01');
const RUNS = 15;
const WARM_UP = 5;
const MB = 1024 * 1024;

/**
 * 300 cycles settled under hourly netting over ten years of quarter-hours, and under no interval netting, with every line and working; as ratios to
 * a bare loop that adds up the same numbers. Memory is what the process grew by in the first run, over the data alone; its ratio is to the data's size.
 */
export async function benchSettlement(): Promise<BenchLine[]> {
  const cycles = cyclesOf();
  const hourly = benchPlan('hour');
  const gross = benchPlan('none');
  const without = cycles.map((cycle): CycleUsage => ({ ...cycle, intervals: null }));

  // First of all, while nothing has grown the process yet.
  const grown = grownWhile(() => settleAll(hourly, cycles));
  const slow = medianOf(3, 1, () => settleAll(hourly, cycles));
  const loop = medianOf(RUNS, WARM_UP, () => bareHours(cycles));
  const fast = medianOf(RUNS, WARM_UP, () => settleAll(gross, without));
  const fastLoop = medianOf(RUNS, WARM_UP, () => bareTotals(without));
  return [
    {
      name: `${CYCLES} cycles with hourly netting over ten years of quarter-hours`,
      value: slow,
      unit: 'ms',
      ratio: slow / loop,
      aim: 'at most 1,500 ms',
    },
    {
      name: 'memory above the data while doing so',
      value: grown / MB,
      unit: 'MB',
      ratio: grown / bytesOf(cycles),
      aim: 'at most 150 MB',
    },
    {
      name: `${CYCLES} cycles without interval netting`,
      value: fast,
      unit: 'ms',
      ratio: fast / fastLoop,
      aim: 'at most 30 ms',
    },
  ];
}

function benchPlan(netting: string): RatePlan {
  const from = '2010-01-01';
  const read = parsePlan({
    timeZone: 'America/Denver',
    netting,
    charges: [
      { id: 'energy', label: 'Energy', kind: 'import', basis: 'import', rates: [{ from, rate: '0.1390' }] },
      { id: 'customer', label: 'Customer', kind: 'fixed', basis: 'cycle', rates: [{ from, rate: '11.00' }] },
      {
        id: 'tax',
        label: 'Tax',
        kind: 'tax',
        basis: 'percent',
        on: ['energy', 'customer'],
        afterCredits: true,
        rates: [{ from, rate: '0.05' }],
      },
    ],
    credits: [
      { id: 'sent', label: 'Export', kind: 'export', basis: 'export', to: 'bank', rates: [{ from, rate: '0.0611' }] },
    ],
    banks: [{ id: 'bank', label: 'Bank', unit: 'USD', sameCycle: true, offsets: ['energy'] }],
  });
  if (!read.ok) throw new Error(read.problem.detail ?? 'the plan of the benchmark is refused');
  return read.value;
}

/** Months of made-up quarter-hours: a night without sun, a day with some, not the same twice. */
function cyclesOf(): CycleUsage[] {
  const months = Array.from({ length: DATA_MONTHS }, (_, at) => monthOf(at));
  return Array.from({ length: CYCLES }, (_, at) => months[at % DATA_MONTHS]).flatMap((cycle) => cycle ?? []);
}

function monthOf(at: number): CycleUsage {
  const from = addMonths(START, at);
  const to = addMonths(START, at + 1);
  const startUtc = denverMidnight(from);
  const steps = (Date.parse(denverMidnight(to)) - Date.parse(startUtc)) / (STEP_MINUTES * 60_000);
  const importWh: number[] = [];
  const exportWh: number[] = [];
  for (let step = 0; step < steps; step += 1) {
    const hour = Math.floor(step / 4) % 24;
    const sun = hour >= 7 && hour < 19;
    importWh.push(sun && step % 3 !== 0 ? 0 : 150 + ((step * 37 + at) % 211));
    exportWh.push(sun ? 90 + ((step * 53 + at) % 409) : 0);
  }
  const sum = (values: number[]) => wh(values.reduce((total, value) => total + value, 0));
  return {
    from,
    to,
    importWh: sum(importWh),
    exportWh: sum(exportWh),
    productionWh: null,
    loadWh: null,
    byPeriod: null,
    netted: {},
    kW: {},
    payments: [],
    finalBill: false,
    intervals: { startUtc, minutes: STEP_MINUTES, importWh, exportWh, productionWh: [] },
  };
}

/** Midnight in Denver on the first of a month: UTC−7, or UTC−6 while daylight saving time holds (April to October begin in it, and November too). */
function denverMidnight(date: ReturnType<typeof day>): string {
  const month = Number(date.slice(5, 7));
  return `${date}T0${month >= 4 && month <= 11 ? 6 : 7}:00:00Z`;
}

/** The numbers of the intervals at eight bytes each, a month's counted once. */
function bytesOf(cycles: readonly CycleUsage[]): number {
  let numbers = 0;
  for (const { intervals } of new Set(cycles)) numbers += 2 * (intervals?.importWh.length ?? 0);
  return numbers * 8;
}

function settleAll(plan: RatePlan, cycles: readonly CycleUsage[]): number {
  const settled = settle(plan, EMPTY_OPENING, cycles);
  if (!settled.ok || settled.value.settlements.length !== CYCLES)
    throw new Error(settled.ok ? 'a cycle is missing' : (settled.problem.detail ?? 'refused'));
  return settled.value.settlements.reduce((sum, one) => sum + one.amountDueCents, 0);
}

/** The floor: each hour's import less export, added up on its side. */
function bareHours(cycles: readonly CycleUsage[]): number {
  let sum = 0;
  for (const { intervals } of cycles) {
    if (intervals === null) continue;
    const { importWh, exportWh } = intervals;
    for (let at = 0; at < importWh.length; at += 4) {
      let net = 0;
      for (let step = at; step < at + 4; step += 1) net += Number(importWh[step]) - Number(exportWh[step]);
      sum += net > 0 ? net * 139 : net * 61;
    }
  }
  return sum;
}

/** The floor without intervals: the same lines worked out on the totals, rounded, and kept as text as a settlement keeps them. */
function bareTotals(cycles: readonly CycleUsage[]): number {
  let bank = 0;
  let due = 0;
  const said: string[] = [];
  for (const { from, to, importWh, exportWh } of cycles) {
    const energy = Math.round((importWh * 1390) / 100_000);
    bank += Math.round((exportWh * 611) / 100_000);
    const used = Math.min(bank, energy);
    bank -= used;
    const tax = Math.round((energy + 1100 - used) * 0.05);
    due += energy + 1100 + tax - used;
    said.push(`${daysBetween(from, to)} ${dayNumber(from)} ${energy} ${used} ${tax}`);
  }
  return due + said.length;
}

function medianOf(runs: number, warmUp: number, run: () => number): number {
  let kept = 0;
  for (let at = 0; at < warmUp; at += 1) kept += run();
  const times: number[] = [];
  for (let at = 0; at < runs; at += 1) {
    const began = performance.now();
    kept += run();
    times.push(performance.now() - began);
  }
  if (!Number.isFinite(kept)) throw new Error('nothing was measured');
  times.sort((a, b) => a - b);
  return times[Math.floor(times.length / 2)] ?? 0;
}

/** How far the process grew over what it held before: resident memory after the run, its result still held and nothing collected in between. */
function grownWhile(run: () => number): number {
  globalThis.gc?.();
  const before = process.memoryUsage();
  const kept = run();
  const after = process.memoryUsage();
  if (!Number.isFinite(kept)) throw new Error('nothing was measured');
  return Math.max(after.rss - before.rss, after.heapUsed - before.heapUsed, 0);
}
