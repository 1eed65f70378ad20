import { settleAmounts } from '../../settlement/settle.ts';
import type { Opening } from '../../settlement/settlement.ts';
import type { CauseInput } from './cause.ts';
import type { Place } from './edit.ts';
import { flatUsage } from './flat-usage.ts';
import { billedOtherwise, billedSums, leftUnsaid } from './reproduces.ts';

/** The cycles under trial, settled rightly. */
export type Scene = {
  places: readonly Place[];
  /** The first cycle billed otherwise: a mistake made only after it explains nothing. */
  firstOff: number;
  opening: Opening;
};

/** Settles the cycles rightly; null where one cannot be settled, or where nothing was billed otherwise (cents, kWh of a line, a bank, a payout). */
export function openScene(input: CauseInput): Scene | null {
  const places: Place[] = [];
  let firstOff: number | null = null;
  let opening = input.opening;
  let planBefore: Place['planBefore'] = null;
  for (const [at, given] of input.cycles.entries()) {
    const settled = settleAmounts(given.plan, opening, given.usage);
    if (!settled.ok) return null;
    const truth = settled.value;
    const cycle = { ...given, usage: flatUsage(given.plan, opening, given.usage, truth) };
    const sums = billedSums(given.billed);
    const known = firstOff === null;
    const differs = known ? billedOtherwise(sums, truth) : new Set<string>();
    const unsaid = leftUnsaid(sums, truth);
    const mayDiffer = (id: string) => !known || differs.has(id) || unsaid.has(id);
    if (known && differs.size > 0) firstOff = at;
    places.push({ index: at, cycle, opening, truth, sums, differs, mayDiffer, planBefore });
    opening = truth.closing;
    planBefore = given.plan;
  }
  return firstOff === null ? null : { places, firstOff, opening: input.opening };
}
