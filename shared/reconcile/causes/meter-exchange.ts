import { sayDay, sayKwh } from '../../ledger/say.ts';
import { roundToWh } from '../../units/rate.ts';
import type { TrueRead } from './cause.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';
import { channelsOf, energyOf, readKwh, type Totals, withTotals } from './meter-reads.ts';
import { eachAndAll, sayList } from './plan-edit.ts';

/** One meter's part of an exchange is left out, on one of its registers or on all (net-metering.md §4, "meter exchange": q = Σ segments). */
export const meterExchange = hypothesis('meterExchange', editsOf);

function editsOf({ cycle: { reads, usage } }: Place): Edit[] {
  const segments = reads.filter(
    (read) =>
      (read.from !== usage.from || read.to !== usage.to) &&
      reads.filter((other) => other.channel === read.channel).length > 1,
  );
  const spans = new Map<string, TrueRead[]>();
  for (const read of segments) {
    const key = `${read.meter} ${read.from}`;
    spans.set(key, [...(spans.get(key) ?? []), read]);
  }
  return [...spans.values()].flatMap((span) => eachAndAll(span).map((left) => leftOut(reads, left, usage)));
}

function leftOut(reads: readonly TrueRead[], left: readonly TrueRead[], usage: Place['cycle']['usage']): Edit {
  const totals: Totals = {};
  const rest = reads.filter((read) => !left.includes(read));
  for (const channel of channelsOf(left)) totals[channel] = energyOf(rest, channel);
  const said = left.map((read) => `${sayKwh(roundToWh(readKwh(read)))} kWh of ${read.channel}`);
  const [span] = left.map((read) => `meter ${read.meter}, ${sayDay(read.from)} to ${sayDay(read.to)}`);
  return edit(
    left.map((read) => `${read.channel} ${read.meter} ${read.from}`).join(),
    { usage: withTotals(usage, totals) },
    `The meter was exchanged, and one part was left out: ${span}, ${sayList(said)}.`,
    { channels: channelsOf(left).join(', '), meter: sayList([...new Set(left.map((read) => read.meter))]) },
  );
}
