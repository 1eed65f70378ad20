import type { ReadChannel, RegisterRead } from '../facts/papers.ts';
import type { CyclePaper } from '../ledger/cycle-papers.ts';

/** Cycles whose reads only add up together: those that ended on an estimated read, and the one whose actual read made up for them. */
export type EstimatedRun = {
  channel: ReadChannel;
  /** Indexes of the cycles of the run, in order. */
  cycles: number[];
  /** True while no actual read has followed. */
  pending: boolean;
};

const CHANNELS: readonly ReadChannel[] = ['import', 'export', 'production'];

/** Whether a read that closes a channel in these reads, of whichever of its meters, is an estimate; null where the channel is not read. */
export function closesEstimated(reads: readonly RegisterRead[], channel: ReadChannel): boolean | null {
  const own = reads.filter((read) => read.channel === channel);
  if (own.length === 0) return null;
  const end = own
    .map((read) => read.to)
    .sort()
    .at(-1);
  return own.some((read) => read.to === end && read.type === 'estimated');
}

/** Runs of cycles joined by estimated reads, by cycle index and channel. */
export function estimatedRuns(papers: readonly CyclePaper[]): Map<string, EstimatedRun> {
  const runs = new Map<string, EstimatedRun>();
  for (const channel of CHANNELS) {
    let open: EstimatedRun | null = null;
    for (const paper of papers) {
      const estimated = closesEstimated(paper.reads, channel);
      if (estimated === null) continue;
      if (estimated || open) {
        open ??= { channel, cycles: [], pending: true };
        open.cycles.push(paper.index);
        runs.set(runKey(paper.index, channel), open);
      }
      if (!estimated && open) {
        open.pending = false;
        open = null;
      }
    }
  }
  return runs;
}

export function runKey(cycle: number, channel: ReadChannel): string {
  return `${cycle}:${channel}`;
}
