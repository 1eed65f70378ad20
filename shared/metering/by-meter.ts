import type { MeterFacts } from '../facts/house.ts';
import type { ReadChannel, RegisterRead } from '../facts/papers.ts';
import type { MeterEnergy } from '../ledger/cycle.ts';
import type { CyclePaper } from '../ledger/cycle-papers.ts';
import { registerEnergy } from './register.ts';

const CHANNELS: readonly ReadChannel[] = ['import', 'export', 'production'];

/**
 * What each meter of a channel saw, where the statement reads more than one of them (two net meters, an exchange, another service point): the parts
 * of the channel's sum, and beside them what is kept apart from it. Empty where every channel has one meter, or where the reads are shared by days.
 */
export function energyByMeter(paper: CyclePaper, meters: readonly MeterFacts[]): MeterEnergy[] {
  if (!paper.readsFit) return [];
  const { statement } = paper;
  const reads = statement.reads.filter((read) => read.from >= paper.from);
  return CHANNELS.flatMap((channel) => {
    const own = reads.filter((read) => read.channel === channel);
    const ids = [...new Set(own.map((read) => read.meter))];
    if (ids.length < 2) return [];
    return ids.flatMap((meter) => {
      const part = own.filter((read) => read.meter === meter);
      const figure = registerEnergy(part, channel, statement.source);
      if (figure === null) return [];
      const known = meters.find((one) => one.id === meter);
      return [
        {
          meter,
          label: known?.label ?? null,
          channel,
          counted: counts(paper, part),
          servicePoint: known?.servicePoint ?? null,
          figure,
        },
      ];
    });
  });
}

function counts(paper: CyclePaper, reads: readonly RegisterRead[]): boolean {
  return reads.every((read) => paper.reads.includes(read));
}
