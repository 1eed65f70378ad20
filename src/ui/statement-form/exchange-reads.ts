import { emptyRead, type ReadRow } from './statement-values.ts';

/**
 * The reads after a meter was exchanged on a day: each register of the old meter ends there, and the new meter's register of the same kind begins
 * there, to be filled in with its own number, dials and multiplier.
 */
export function exchangedReads(reads: readonly ReadRow[], old: string, fresh: string, on: string): ReadRow[] {
  return reads.flatMap((read) => {
    if (read.meter !== old) return [read];
    const begins = emptyRead({ meter: fresh, dials: read.dials, multiplier: read.multiplier });
    return [
      { ...read, to: on },
      { ...begins, channel: read.channel, from: on },
    ];
  });
}
