import { sayKwh } from '../../ledger/say.ts';
import { isSeen } from './channels-seen.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';
import { channelsOf, energyOf, plainDifference, readKwh, withTotals } from './meter-reads.ts';
import { sayList, subsets } from './plan-edit.ts';

/** The dials passed all nines, and the difference was taken as it stands (net-metering.md §4, "dial rollover"). */
export const registerRollover = hypothesis('registerRollover', editsOf);

function editsOf({ cycle }: Place): Edit[] {
  const { reads, usage } = cycle;
  const turned = channelsOf(reads).filter(
    (channel) =>
      isSeen(cycle, channel) && reads.some((read) => read.channel === channel && plainDifference(read).lt(0)),
  );
  return subsets(turned).map((channels) => {
    const billed = channels.map((channel) => ({
      channel,
      trueWh: energyOf(reads, channel, readKwh),
      billedWh: energyOf(reads, channel, (read) => plainDifference(read).times(read.multiplier)),
    }));
    const totals = Object.fromEntries(billed.map(({ channel, billedWh }) => [channel, billedWh]));
    const said = billed.map((one) => `${sayKwh(one.billedWh)} kWh of ${one.channel} instead of ${sayKwh(one.trueWh)}`);
    return edit(
      channels.join(),
      { usage: withTotals(usage, totals) },
      `The register passed all nines and the difference was taken as it stands: ${sayList(said)}.`,
      { channels: channels.join(', ') },
    );
  });
}
