import type { Entry } from '../books/book.ts';
import type { HouseholdFacts } from '../facts/household.ts';
import { positionEvents } from '../position/events.ts';
import { marginFigures, paceFigure, settledFigures } from '../position/figures.ts';
import { type FoldInput, foldPosition } from '../position/fold.ts';
import type { Figure, Position } from '../position/position.ts';
import { sumsByBook } from '../position/sums.ts';
import type { Opening } from '../settlement/settlement.ts';
import { ZERO_CENTS } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { AssembledCycle } from './cycles.ts';

export type PositionInput = {
  today: Day;
  /** Placed entries of every book. */
  entries: readonly Entry[];
  assembled: readonly AssembledCycle[];
  /** What the utility's books hold after the last cycle. */
  closing: Opening;
};

/** The position from the entries and the closes of the cycles (ledger.md §6), and its first projection. */
export function computePosition(facts: HouseholdFacts, input: PositionInput): Position {
  const { today, entries, assembled } = input;
  const cycles = assembled.map(({ cycle, utilityBank }) => ({
    from: cycle.from,
    to: cycle.to,
    provisional: cycle.provisional,
    utilityBank,
  }));
  const fold: FoldInput = { entries, cycles, today, loan: facts.loan, credit: facts.credit };
  const points = foldPosition(fold);
  const last = points.at(-1);
  if (last === undefined) throw new Error('a position has at least one point');
  const sums = sumsByBook(
    entries,
    cycles.map((cycle) => cycle.to),
  );
  const cashSoFar: Figure = sums.all.cashSoFar ?? {
    amountCents: ZERO_CENTS,
    working: { words: 'No entries', formula: '0', inputs: [], unit: 'USD', basis: 'computed' },
  };
  return {
    today,
    points,
    cashSoFar,
    ...settledFigures(fold, last, cashSoFar),
    pace: paceFigure(points),
    ...marginFigures(entries, points),
    sums,
    events: positionEvents(facts, today),
    projection: null,
    whyNoProjection: 'The projection needs one closed cycle.',
  };
}
