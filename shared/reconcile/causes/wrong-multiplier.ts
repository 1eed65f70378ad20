import type { CycleUsage } from '../../settlement/settlement.ts';
import { Exact, roundToWh } from '../../units/rate.ts';
import type { MeterChannel } from './cause.ts';
import { isSeen } from './channels-seen.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';
import { channelsOf, dialDifference, scaledWh, type Totals, totalOf, withFlows, withTotals } from './meter-reads.ts';
import { sayList, subsets } from './plan-edit.ts';

/** Ratios of the transformers in front of a meter: the multipliers of net-metering.md §3, "difference × 10, 20, 40 …". */
const RATIOS = ['10', '20', '40', '80', '0.1', '0.05', '0.025', '0.0125'];

/** What a channel's registers turned by, before any multiplier, and the multipliers of its meters. */
type Turned = { channel: MeterChannel; kWh: Exact; meters: string[] };

/** Another multiplier than the meter's, on one register or on all (net-metering.md §4, "multiplier"). */
export const wrongMultiplier = hypothesis('wrongMultiplier', editsOf);

function editsOf(place: Place): Edit[] {
  const { reads, usage } = place.cycle;
  const known = reads.length > 0 ? turnedByReads(place) : turnedByTotals(usage);
  return subsets(known.filter(({ channel }) => isSeen(place.cycle, channel))).flatMap((turned) => {
    const meters = [...new Set(turned.flatMap((one) => one.meters))];
    return takenFor(meters)
      .filter((taken) => turned.every((one) => mayBeBilled(place, one, taken)))
      .map((taken) => multiplied(usage, turned, meters, taken));
  });
}

function turnedByReads({ cycle: { reads } }: Place): Turned[] {
  return channelsOf(reads).map((channel) => {
    const own = reads.filter((read) => read.channel === channel);
    const kWh = own.reduce((sum, read) => sum.plus(dialDifference(read)), new Exact(0));
    return { channel, kWh, meters: own.map((read) => read.multiplier) };
  });
}

/** Without reads the kWh stand for what the dials turned, at a multiplier of 1. */
function turnedByTotals(usage: CycleUsage): Turned[] {
  return (['import', 'export', 'production', 'load'] as const).flatMap((channel) => {
    const total = totalOf(usage, channel);
    return total === null ? [] : [{ channel, kWh: new Exact(total).div(1000), meters: ['1'] }];
  });
}

/** Multipliers to try in place of the meter's: 1 and the usual ratios, by themselves and times the meter's own. */
function takenFor(meters: readonly string[]): string[] {
  const taken = new Set(['1', ...RATIOS]);
  for (const meter of meters) {
    if (meter !== '1') for (const ratio of RATIOS) taken.add(new Exact(meter).times(ratio).toString());
  }
  return [...taken].filter((one) => !meters.every((meter) => new Exact(meter).eq(one)));
}

/** Where the statement prints the kWh they rule out most multipliers at once. */
function mayBeBilled({ cycle: { billed } }: Place, { channel, kWh }: Turned, taken: string): boolean {
  const { importWh, exportWh, productionWh } = billed;
  const printed = { import: importWh, export: exportWh, production: productionWh, load: null }[channel];
  return printed === null || roundToWh(kWh.times(taken)) === printed;
}

function multiplied(usage: CycleUsage, turned: readonly Turned[], meters: readonly string[], taken: string): Edit {
  const channels = turned.map((one) => one.channel);
  const totals: Totals = {};
  for (const one of turned) totals[one.channel] = roundToWh(one.kWh.times(taken));
  const registers = `${sayList(channels)} ${channels.length > 1 ? 'registers were' : 'register was'}`;
  return edit(
    `${channels.join()}:${taken}`,
    { usage: withTotals(scaledFlows(usage, channels, meters, taken), totals) },
    `The ${registers} multiplied by ${taken}; the meter’s multiplier is ${sayList(meters)}.`,
    { channels: channels.join(', '), multiplier: taken },
  );
}

/** What is known by period or after netting grows as the total does, where all registers have one multiplier. */
function scaledFlows(
  usage: CycleUsage,
  channels: readonly MeterChannel[],
  meters: readonly string[],
  taken: string,
): CycleUsage {
  if (meters.length > 1) return usage;
  const ratio = meters.reduce((left, meter) => left.div(meter), new Exact(taken));
  return withFlows(usage, ({ importWh, exportWh }) => ({
    importWh: channels.includes('import') ? scaledWh(importWh, ratio) : importWh,
    exportWh: channels.includes('export') ? scaledWh(exportWh, ratio) : exportWh,
  }));
}
