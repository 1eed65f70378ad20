import type { ReadChannel } from '../facts/papers.ts';
import type { EnergyFigure } from '../ledger/cycle.ts';
import type { CyclePaper } from '../ledger/cycle-papers.ts';
import { kwhText, type Wh, wh } from '../units/energy.ts';
import { Exact, exact, kwhOf, roundToWh } from '../units/rate.ts';
import { type IntervalIndex, type IntervalReading, intervalEnergy } from './interval-index.ts';
import { registerEnergy } from './register.ts';
import { input, ownFigure, paperSourceOf } from './source.ts';

/** What each witness says of one channel in one cycle. Null where it says nothing. */
export type ChannelWitnesses = {
  channel: ReadChannel;
  register: EnergyFigure | null;
  printed: EnergyFigure | null;
  intervals: IntervalReading | null;
  /** How far register and complete interval data may lie apart before they disagree. */
  toleranceWh: Wh;
};

/** A register of whole kWh is right to ±1 kWh per difference (net-metering.md §5); the utility's own two records to 1 % (ledger.md §4). */
const REGISTER_STEP_WH = 1000;
const INTERVAL_SHARE = '0.01';

export function channelWitnesses(paper: CyclePaper, index: IntervalIndex, channel: ReadChannel): ChannelWitnesses {
  const { statement, split, elsewhere } = paper;
  // Printed kWh of a statement that reads other service points too may hold theirs.
  const printedWh = elsewhere.apart.has(channel)
    ? null
    : { import: statement.importWh, export: statement.exportWh, production: statement.productionWh }[channel];
  let register = registerEnergy(paper.reads, channel, statement.source);
  // Printed kWh are asked only where no register speaks.
  let printed = printedWh === null || register !== null ? null : printedEnergy(paper, channel, printedWh);
  if (split !== null) {
    if (register !== null && !paper.readsFit) register = shareByDays(register, split);
    if (printed !== null) printed = shareByDays(printed, split);
  }
  // An interval file speaks of the house's own meter; it is no witness of kWh that other service points are netted into.
  const intervals = elsewhere.joined.has(channel) ? null : intervalEnergy(index, channel, paper.from, paper.to);
  return { channel, register, printed, intervals, toleranceWh: agreementTolerance(paper, channel, intervals) };
}

/**
 * The energy of a channel: the register, unless complete interval data disagree with it beyond tolerance; then the interval data, since they
 * hold every step of the cycle and a register difference only its two ends. Within tolerance the register stands, so that whole kWh give the
 * billed cents. `preferRegister` holds to the register where an estimated read has been, or will be, made up for by a later one.
 */
export function chosenEnergy(
  witnesses: ChannelWitnesses,
  split: boolean,
  preferRegister: boolean,
): EnergyFigure | null {
  const { register, printed, intervals, toleranceWh } = witnesses;
  const stated = register ?? printed;
  if (intervals === null) return stated;
  if (stated === null) return intervals.figure;
  if (!intervals.complete || preferRegister) return stated;
  if (split && stated.working.basis === 'estimated') return intervals.figure;
  return Math.abs(stated.wh - intervals.figure.wh) <= toleranceWh ? stated : intervals.figure;
}

/** The cycle's share of a statement's energy, by days: an estimate. */
export function shareByDays(figure: EnergyFigure, share: { days: number; of: number }): EnergyFigure {
  return {
    wh: roundToWh(kwhOf(figure.wh).times(share.days).div(share.of)),
    from: figure.from,
    coverage: figure.coverage,
    working: {
      words: `${kwhText(figure.wh)} kWh × ${share.days} of ${share.of} days`,
      formula: 'roundWhole(whole * days / of * 1000) / 1000',
      inputs: [
        input(
          'whole',
          'On the whole statement',
          kwhText(figure.wh),
          'kWh',
          figure.working.inputs[0]?.source ?? ownFigure('statement'),
        ),
        input('days', 'Days from switch-on', String(share.days), 'days', ownFigure('switch-on')),
        input('of', 'Days of the statement', String(share.of), 'days', ownFigure('statement dates')),
      ],
      unit: 'kWh',
      basis: 'estimated',
    },
  };
}

function printedEnergy(paper: CyclePaper, channel: ReadChannel, printed: Wh): EnergyFigure {
  return {
    wh: printed,
    from: 'printed',
    coverage: 1,
    working: {
      words: `${kwhText(printed)} kWh as printed`,
      formula: 'printed',
      inputs: [
        input('printed', `${channel} as printed`, kwhText(printed), 'kWh', paperSourceOf(paper.statement.source, null)),
      ],
      unit: 'kWh',
      basis: 'billed',
    },
  };
}

function agreementTolerance(paper: CyclePaper, channel: ReadChannel, intervals: IntervalReading | null): Wh {
  let least = 0;
  for (const read of paper.reads) {
    if (read.channel === channel) least += read.multiplier === '1' ? REGISTER_STEP_WH : stepOf(read.multiplier);
  }
  least = Math.max(least, REGISTER_STEP_WH);
  if (intervals === null) return wh(least);
  const share = new Exact(intervals.figure.wh).abs().times(INTERVAL_SHARE).floor().toNumber();
  return wh(Math.max(least, share));
}

/** A step of the dials in Wh; a multiplier below one is taken for one, since the printed kWh are whole. */
function stepOf(multiplier: string): number {
  return Exact.max(1, exact(multiplier).abs()).times(REGISTER_STEP_WH).floor().toNumber();
}
