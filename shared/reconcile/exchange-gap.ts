import type { RegisterRead } from '../facts/papers.ts';
import type { CyclePaper } from '../ledger/cycle-papers.ts';
import { sayDate } from '../ledger/say.ts';
import { type IntervalIndex, intervalEnergy } from '../metering/interval-index.ts';
import { registerKwh } from '../metering/register.ts';
import { whOfQty } from '../settlement/quantity.ts';
import { addDays, type Day } from '../units/day.ts';

/** A read of whole kWh is right to ±1 kWh at each end of its segment (net-metering.md §5). */
const SEGMENT_STEP_WH = 2000;

/**
 * Whether the kWh that a statement lacks went by while its meter was exchanged, found by trying against the interval file: the old meter's segment
 * ends within the day of the exchange, the new meter's begins within it, and what lies between the two is what lacks. Null where the reads say no such
 * thing; else the sentence.
 */
export function exchangeGap(
  { paper, index }: { paper: CyclePaper; index: IntervalIndex },
  channel: 'import' | 'export',
): string | null {
  const reads = paper.reads.filter((read) => read.channel === channel);
  const [first, second] = [...reads].sort((a, b) => a.from.localeCompare(b.from));
  if (reads.length !== 2 || !first || !second || first.meter === second.meter) return null;
  const on = second.from;
  if (first.to !== on) return null;
  const before = between(index, channel, paper.from, on);
  const after = between(index, channel, addDays(on, 1), paper.to);
  const during = between(index, channel, on, addDays(on, 1));
  if (before === null || after === null || during === null) return null;
  const fits = (read: RegisterRead, least: number) => {
    const wh = whOfQty(registerKwh(read));
    return wh >= least - SEGMENT_STEP_WH && wh <= least + during + SEGMENT_STEP_WH;
  };
  if (!fits(first, before) || !fits(second, after)) return null;
  const what = channel === 'export' ? 'left' : 'came in';
  return `The meter was exchanged on ${sayDate(on)}: what ${what} between the old meter’s last read and the new meter’s first is on no bill.`;
}

/** Energy over `[from, to)` where the file holds all of it; nothing over no days. */
function between(index: IntervalIndex, channel: 'import' | 'export', from: Day, to: Day): number | null {
  if (from >= to) return 0;
  const seen = intervalEnergy(index, channel, from, to);
  return seen?.complete ? seen.figure.wh : null;
}
