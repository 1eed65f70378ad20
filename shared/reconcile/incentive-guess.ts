import { sayDay } from '../ledger/say.ts';
import { isComplete } from '../metering/cycle-energy.ts';
import { sumWh, type Wh } from '../units/energy.ts';
import type { CheckContext } from './check-context.ts';

/** A quantity an incentive may have been paid on by mistake, and how it is called. */
export type Guess = { words: string; wh: Wh };

/** What was made over some cycles, by their places, and what of it lies within the term. */
export type Made = { cycles: readonly number[]; eligibleWh: Wh; productionWh: Wh };

/**
 * Every wrong quantity that is tried (net-metering.md §4 "incentive: qty=ΔP; date ≤ term; never E"): the export register's, the monitoring's, the days outside
 * the term left in, as many cycles one earlier or one later, one cycle left out. Those that are not known are not tried, nor is one that is right.
 */
export function incentiveGuesses({ papers, meters }: Pick<CheckContext, 'papers' | 'meters'>, span: Made): Guess[] {
  const guesses: Guess[] = [];
  const add = (words: string, places: readonly number[], of: (at: number) => Wh | null) => {
    const found = places.map(of);
    const known = found.filter((one) => one !== null);
    if (known.length > 0 && known.length === found.length) guesses.push({ words, wh: sumWh(known) });
  };
  const made = (at: number) => complete(meters[at]?.energy.production ?? null);
  add('the export register’s kWh', span.cycles, (at) => complete(meters[at]?.energy.export ?? null));
  add('the monitoring’s kWh', span.cycles, (at) => {
    const monitor = meters[at]?.monitor;
    return monitor?.complete ? monitor.figure.wh : null;
  });
  guesses.push({ words: 'all the production, also of days outside the term', wh: span.productionWh });
  const moved = (by: number) => span.cycles.map((at) => at + by);
  add('the production of one cycle earlier', moved(-1), made);
  add('the production of one cycle later', moved(1), made);
  for (const paper of papers) {
    if (span.cycles.length < 2 || !span.cycles.includes(paper.index)) continue;
    const rest = span.cycles.filter((at) => at !== paper.index);
    add(`the production without the cycle to ${sayDay(paper.to)}`, rest, made);
  }
  return guesses.filter((guess) => guess.wh !== span.eligibleWh);
}

/** "It is exactly the export register’s kWh."; several are all named; null for none. */
export function guessWords(found: readonly Guess[]): string | null {
  return found.length === 0 ? null : `It is exactly ${found.map(({ words }) => words).join(', and exactly ')}.`;
}

function complete(figure: Parameters<typeof isComplete>[0]): Wh | null {
  return isComplete(figure) ? figure.wh : null;
}
