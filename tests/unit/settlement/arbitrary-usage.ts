import fc from 'fast-check';
import type { RatePlan } from '#shared/settlement/plan.ts';
import type { CycleUsage } from '#shared/settlement/settlement.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, type Day, day, daysBetween } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { shapedPlans } from './arbitrary-plan.ts';

type Drawn = { days: number; peak: Part; off: Part; share: number };
type Part = { importWh: number; exportWh: number; cancels: number };

/** `cancels`: the percent of what import and export have in common that cancels inside clock hours. */
const part = (most: number) =>
  fc.record({ importWh: fc.nat(most), exportWh: fc.nat(most), cancels: fc.integer({ min: 0, max: 100 }) });

const cycle = (most: number) =>
  fc.record<Drawn>({
    days: fc.integer({ min: 1, max: most }),
    peak: part(300_000),
    off: part(600_000),
    share: fc.nat(400_000),
  });

/** A house: a plan, and cycles that chain from one day on, with all that the plan asks for. */
export const houses: fc.Arbitrary<{ plan: RatePlan; cycles: CycleUsage[] }> = shapedPlans.chain(({ is, plan }) =>
  is.steps
    ? fc
        .tuple(fc.array(cycle(2), { minLength: 2, maxLength: 3 }), fc.nat())
        .map(([cycles, seed]) => ({ plan, cycles: chained(cycles, '2026-05-31').map((one) => inSteps(one, seed)) }))
    : usages.map((cycles) => ({ plan, cycles })),
);

/** Cycles over changes of price, season and year, with their totals by period and after netting by clock blocks. */
export const usages: fc.Arbitrary<CycleUsage[]> = fc
  .array(cycle(65), { minLength: 2, maxLength: 4 })
  .map((cycles) => chained(cycles, '2025-12-16'));

function chained(cycles: readonly Drawn[], first: string): CycleUsage[] {
  let from: Day = day(first);
  return cycles.map(({ days, peak, off, share }, at): CycleUsage => {
    const to = addDays(from, days);
    const exportWh = peak.exportWh + off.exportWh;
    const made: CycleUsage = {
      from,
      to,
      importWh: wh(peak.importWh + off.importWh),
      exportWh: wh(exportWh),
      productionWh: wh(exportWh + share),
      loadWh: null,
      byPeriod: { peak: flow(peak, 0), off: flow(off, 0) },
      netted: { hour: netted(peak, off, 1), '15min': netted(peak, off, 0.5) },
      kW: { dc: '7.2', ac: '6', demand: '4.35' },
      payments: at === 1 ? [{ on: from, amountCents: PAID }] : [],
      finalBill: at === cycles.length - 1,
      intervals: null,
    };
    from = to;
    return made;
  });
}

const PAID = cents(-1250);

function flow({ importWh, exportWh, cancels }: Part, times: number) {
  const cancelled = Math.floor((Math.min(importWh, exportWh) * cancels * times) / 100);
  return { importWh: wh(importWh - cancelled), exportWh: wh(exportWh - cancelled) };
}

/** A coarser block cancels no less than a finer one: `times` is 1 for the hour, less for quarter-hours. */
function netted(peak: Part, off: Part, times: number) {
  const byPeriod = { peak: flow(peak, times), off: flow(off, times) };
  return {
    importWh: wh(byPeriod.peak.importWh + byPeriod.off.importWh),
    exportWh: wh(byPeriod.peak.exportWh + byPeriod.off.exportWh),
    byPeriod,
  };
}

/** Steps of a quarter-hour, of which a seed says how much came in, went out and was made; what is drawn by period is left out. */
function inSteps(one: CycleUsage, seed: number): CycleUsage {
  const count = daysBetween(one.from, one.to) * 96;
  const drawn = (from: number, most: number) =>
    Array.from({ length: count }, (_, at) => Math.imul(at + from + seed, 2_654_435_761) >>> 16).map(
      (value) => value % most,
    );
  const importWh = drawn(1, 900);
  const exportWh = drawn(7, 1300);
  const own = drawn(13, 500);
  const productionWh = exportWh.map((sent, at) => sent + (own[at] ?? 0));
  const total = (values: readonly number[]) => wh(values.reduce((sum, value) => sum + value, 0));
  return {
    ...one,
    importWh: total(importWh),
    exportWh: total(exportWh),
    productionWh: total(productionWh),
    byPeriod: null,
    netted: {},
    // Midnight in Denver, daylight saving time.
    intervals: { startUtc: `${one.from}T06:00:00Z`, minutes: 15, importWh, exportWh, productionWh },
  };
}
