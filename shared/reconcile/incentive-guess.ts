import type { EnergyFigure } from '../ledger/cycle.ts';
import { sayDay } from '../ledger/say.ts';
import { isComplete, type MeteredCycle } from '../metering/cycle-energy.ts';
import { sumWh, type Wh } from '../units/energy.ts';
import type { CheckContext } from './check-context.ts';
import type { Span } from './programme.ts';

/** A quantity an incentive may have been paid on by mistake, and how it is called. */
export type Guess = { words: string; wh: Wh };

/**
 * Every wrong quantity that is tried for a span of cycles (net-metering.md §4 "incentive: qty=ΔP; date ≤ term; never E"): the export register's, the monitoring's, the days
 * outside the term left in, as many cycles one earlier or one later, one cycle left out. Those that are not known are not tried, nor is one that is right.
 */
export function incentiveGuesses(
  { papers, meters }: Pick<CheckContext, 'papers' | 'meters'>,
  span: Pick<Span, 'cycles' | 'eligibleWh' | 'productionWh'>,
): Guess[] {
  const { cycles, eligibleWh, productionWh } = span;
  const guesses: Guess[] = [{ words: 'all the production, also of days outside the term', wh: productionWh }];
  const add = (words: string, rows: readonly MeteredCycle[], of: (row: MeteredCycle) => Wh | null) => {
    const known = rows.map(of).filter((one) => one !== null);
    if (known.length > 0 && known.length === rows.length) guesses.push({ words, wh: sumWh(known) });
  };
  const made = ({ energy }: MeteredCycle) => complete(energy.production);
  const moved = (by: number) => meters.filter((_, at) => cycles.includes(at - by));
  const own = moved(0);
  add('the export register’s kWh', own, ({ energy }) => complete(energy.export));
  add('the monitoring’s kWh', own, ({ monitor }) => (monitor?.complete ? monitor.figure.wh : null));
  for (const [by, words] of [
    [-1, 'earlier'],
    [1, 'later'],
  ] as const) {
    const rows = moved(by);
    if (rows.length === own.length) add(`the production of one cycle ${words}`, rows, made);
  }
  for (const { index, to } of papers) {
    if (!cycles.includes(index)) continue;
    const rest = meters.filter((_, at) => at !== index && cycles.includes(at));
    add(`the production without the cycle to ${sayDay(to)}`, rest, made);
  }
  return guesses.filter((guess) => guess.wh !== eligibleWh);
}

/** "It is exactly the export register’s kWh."; several are all named; null for none. */
export function guessWords(found: readonly Guess[]): string | null {
  return found.length === 0 ? null : `It is exactly ${found.map(({ words }) => words).join(', and exactly ')}.`;
}

function complete(figure: EnergyFigure | null): Wh | null {
  return isComplete(figure) ? figure.wh : null;
}
