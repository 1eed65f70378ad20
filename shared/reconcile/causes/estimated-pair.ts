import type { ReadChannel } from '../../facts/papers.ts';
import type { CyclePaper } from '../../ledger/cycle-papers.ts';
import type { MeteredCycle } from '../../metering/cycle-energy.ts';
import { closesEstimated } from '../../metering/estimated-reads.ts';
import type { CycleUsage } from '../../settlement/settlement.ts';
import { type Wh, wh } from '../../units/energy.ts';
import { type Totals, withTotals } from './meter-reads.ts';

const CHANNELS: readonly ReadChannel[] = ['import', 'export', 'production'];
const REGISTER_STEP_WH = 1000;

type Witnesses = MeteredCycle['witnesses'];

/** Whether the first of two cycles closes on an estimated read that the second, following it, makes up for with actual ones. */
export function isEstimatedPair(first: CyclePaper, second: CyclePaper): boolean {
  return (
    first.to === second.from &&
    CHANNELS.some((channel) => closesEstimated(first.reads, channel) === true) &&
    CHANNELS.every((channel) => closesEstimated(second.reads, channel) !== true)
  );
}

/**
 * What actual reads would have given in both cycles: the registers' sum over the two, which is right, parted as the interval data say, in whole kWh as
 * dials show. Null where complete interval data do not bear it out: then no one knows what the read would have been.
 */
export function actualSplit(
  usages: readonly [CycleUsage, CycleUsage],
  witnesses: readonly [Witnesses, Witnesses],
  paper: CyclePaper,
): [CycleUsage, CycleUsage] | null {
  const first: Totals = {};
  const second: Totals = {};
  for (const channel of CHANNELS) {
    if (closesEstimated(paper.reads, channel) !== true) continue;
    const parted = partOf(witnesses[0][channel], witnesses[1][channel]);
    if (parted === null) return null;
    [first[channel], second[channel]] = parted;
  }
  return [withTotals(usages[0], first), withTotals(usages[1], second)];
}

type Witness = Witnesses[ReadChannel];

function partOf(before: Witness, after: Witness): [Wh, Wh] | null {
  if (!before.register || !after.register || !before.intervals?.complete || !after.intervals?.complete) return null;
  const total = before.register.wh + after.register.wh;
  const counted = before.intervals.figure.wh + after.intervals.figure.wh;
  if (Math.abs(total - counted) > Math.max(before.toleranceWh, after.toleranceWh)) return null;
  const first = Math.round(before.intervals.figure.wh / REGISTER_STEP_WH) * REGISTER_STEP_WH;
  return [wh(first), wh(total - first)];
}
