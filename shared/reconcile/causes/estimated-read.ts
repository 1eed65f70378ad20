import { sayDay } from '../../ledger/say.ts';
import { sumWh, type Wh, ZERO_WH } from '../../units/energy.ts';
import type { MeterChannel } from './cause.ts';
import { type Attempt, edit, type Hypothesis, type Place } from './edit.ts';
import { type Totals, totalOf, withTotals } from './meter-reads.ts';
import { sayList } from './plan-edit.ts';
import type { Scene } from './scene.ts';

const CHANNELS: readonly MeterChannel[] = ['import', 'export', 'production', 'load'];

/**
 * An estimated read in place of the actual one, made up for by the next actual read: the kWh of the cycles are right only together
 * (net-metering.md §4, "estimated read": actual(n+1) − actual(n−1) = q(n) + q(n+1)).
 */
export const estimatedRead: Hypothesis = {
  cause: 'estimatedRead',
  overlooks: { days: false, kWh: false },
  attempts: (scene) => runsOf(scene).flatMap((run) => attemptOver(run)),
};

/** Stretches of cycles of which all but the last close on an estimated read. */
function runsOf({ places }: Scene): Place[][] {
  const runs: Place[][] = [];
  let open: Place[] = [];
  for (const place of places) {
    open.push(place);
    if (place.cycle.billed.reads.some((read) => read.type === 'estimated')) continue;
    if (open.length > 1) runs.push(open);
    open = [];
  }
  return runs;
}

function attemptOver(run: readonly Place[]): Attempt[] {
  const estimated = CHANNELS.filter((channel) =>
    run.some(({ cycle }) => cycle.billed.reads.some((read) => read.channel === channel && read.type === 'estimated')),
  );
  const madeUpFor = estimated.every(
    (channel) =>
      sumWh(run.map((place) => billedWh(place, channel))) ===
      sumWh(run.map(({ cycle }) => totalOf(cycle.usage, channel) ?? ZERO_WH)),
  );
  if (!madeUpFor) return [];
  const until = run.slice(-1).map((place) => sayDay(place.cycle.usage.to));
  const [first] = run.map((place) => sayDay(place.cycle.usage.to));
  return [
    run.map((place) => {
      const totals: Totals = {};
      for (const channel of estimated) totals[channel] = billedWh(place, channel);
      const words = `The ${sayList(estimated)} read of ${first} was estimated; the read of ${until.join()} made up for it.`;
      const usage = withTotals(place.cycle.usage, totals);
      return { place, edit: edit('estimated', { usage }, words, { channels: estimated.join(', ') }) };
    }),
  ];
}

function billedWh({ cycle }: Place, channel: MeterChannel): Wh {
  return sumWh(cycle.billed.reads.filter((read) => read.channel === channel).map((read) => read.usageWh));
}
