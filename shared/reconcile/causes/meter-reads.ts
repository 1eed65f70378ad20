import type { CycleUsage } from '../../settlement/settlement.ts';
import { type Wh, wh } from '../../units/energy.ts';
import { Exact, roundToWh } from '../../units/rate.ts';
import type { MeterChannel, TrueRead } from './cause.ts';

/** current − previous as they stand, without what the dials add when they pass all nines. */
export function plainDifference(read: TrueRead): Exact {
  return new Exact(read.current).minus(read.previous);
}

/** The difference of a read mod 10^dials, before the multiplier. */
export function dialDifference(read: TrueRead): Exact {
  const plain = plainDifference(read);
  return plain.lt(0) ? plain.plus(new Exact(10).pow(read.dials)) : plain;
}

/** kWh of a read: ((current − previous) mod 10^dials) × multiplier (rate-plan.md, order in a cycle, 1). */
export function readKwh(read: TrueRead): Exact {
  return dialDifference(read).times(read.multiplier);
}

/** A channel's energy from its reads, each counted as `kwhOf` says. */
export function energyOf(
  reads: readonly TrueRead[],
  channel: MeterChannel,
  kwhOf: (read: TrueRead) => Exact = readKwh,
): Wh {
  const own = reads.filter((read) => read.channel === channel);
  return roundToWh(own.reduce((sum, read) => sum.plus(kwhOf(read)), new Exact(0)));
}

export function channelsOf(reads: readonly TrueRead[]): MeterChannel[] {
  return [...new Set(reads.map((read) => read.channel))];
}

/** A usage's total of a channel; null where it is not known. */
export function totalOf({ importWh, exportWh, productionWh, loadWh }: CycleUsage, channel: MeterChannel): Wh | null {
  return { import: importWh, export: exportWh, production: productionWh, load: loadWh }[channel];
}

export type Totals = Partial<Record<MeterChannel, Wh>>;

/** The usage with other totals of some channels; what is known by period or interval stays as it is. */
export function withTotals(usage: CycleUsage, totals: Totals): CycleUsage {
  return {
    ...usage,
    importWh: totals.import ?? usage.importWh,
    exportWh: totals.export ?? usage.exportWh,
    productionWh: totals.production ?? usage.productionWh,
    loadWh: totals.load ?? usage.loadWh,
  };
}

type Flow = { importWh: Wh; exportWh: Wh };

/** The usage with import and export each put through `change`, also where they are known by period or after netting. */
export function withFlows(usage: CycleUsage, change: (flow: Flow) => Flow): CycleUsage {
  const periods = (by: Record<string, Flow> | null) =>
    by === null ? null : Object.fromEntries(Object.entries(by).map(([period, flow]) => [period, change(flow)]));
  const netted: CycleUsage['netted'] = {};
  for (const netting of ['15min', 'hour'] as const) {
    const flow = usage.netted[netting];
    if (flow) netted[netting] = { ...change(flow), byPeriod: periods(flow.byPeriod) };
  }
  return { ...usage, ...change(usage), netted, byPeriod: periods(usage.byPeriod) };
}

/** An energy times a factor, to the nearest Wh. */
export function scaledWh(amount: Wh, factor: Exact): Wh {
  return wh(new Exact(amount).times(factor).toDecimalPlaces(0).toNumber());
}
