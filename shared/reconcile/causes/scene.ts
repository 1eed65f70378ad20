import { settleCycle } from '../../settlement/settle.ts';
import type { Opening } from '../../settlement/settlement.ts';
import type { CauseInput } from './cause.ts';
import type { Place } from './edit.ts';
import { flatUsage } from './flat-usage.ts';
import { billedOtherwise, billedSums, reproducesMoney } from './reproduces.ts';

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
    const settled = settleCycle(given.plan, opening, given.usage);
    if (!settled.ok) return null;
    const truth = settled.value;
    const cycle = { ...given, usage: flatUsage(given.plan, opening, given.usage, truth) };
    const sums = billedSums(given.billed);
    const differs = firstOff === null ? billedOtherwise(sums, truth) : null;
    if (firstOff === null && !reproducesMoney(sums, truth)) firstOff = at;
    const mayDiffer = (id: string) => differs === null || differs.has(id);
    places.push({ index: at, cycle, opening, truth, sums, mayDiffer, planBefore });
    opening = truth.closing;
    planBefore = given.plan;
  }
  return firstOff === null ? null : { places, firstOff, opening: input.opening };
}
