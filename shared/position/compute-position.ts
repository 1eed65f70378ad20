import type { HourlyProfile } from '../metering/hourly-profile.ts';
import { keptAt } from '../settlement/place.ts';
import type { Opening } from '../settlement/settlement.ts';
import type { ProjectionBasis } from './basis.ts';
import { positionEvents } from './events.ts';
import { marginFigures, paceFigure, settledFigures } from './figures.ts';
import { type FoldInput, foldPosition, type PositionCycle } from './fold.ts';
import { loansOf } from './loans.ts';
import { basisOf } from './make-basis.ts';
import type { Position } from './position.ts';
import { type ProjectionFacts, projectFrom, type StatedCycle } from './project.ts';
import { sumsByBook } from './sums.ts';

export type PositionInput = {
  facts: ProjectionFacts;
  today: FoldInput['today'];
  /** Placed entries of every book through today. */
  entries: FoldInput['entries'];
  /** Closed cycles in order, with what the utility holds after each and the energies the projection repeats. */
  cycles: readonly (PositionCycle & StatedCycle)[];
  /** The shape of a mean day, where the readings give one. */
  hourly?: HourlyProfile | null;
  /** What the utility's books hold after the last cycle. */
  opening: Opening;
};

/** The position, and what its projection starts from (null while there is none). */
export type MadePosition = { position: Position; basis: ProjectionBasis | null };

/** The whole position of a household: points, figures with their workings, events and the base projection. */
export function computePosition(input: PositionInput): MadePosition {
  const { facts, today, entries, cycles } = input;
  const fold: FoldInput = { entries, cycles, today, loans: loansOf(facts), credit: facts.credit };
  const points = foldPosition(fold);
  const last = keptAt(points, points.length - 1);
  const sums = sumsByBook(
    entries,
    cycles.map((cycle) => cycle.to),
  );
  const { cashSoFar } = sums.all;
  const made = basisOf({
    facts,
    today,
    cycles,
    hourly: input.hourly ?? null,
    opening: input.opening,
    points,
    since: entries.filter((entry) => entry.cycle === 'since'),
  });
  const projected = made.ok ? projectFrom(made.basis) : made;
  const position: Position = {
    today,
    points,
    cashSoFar,
    ...settledFigures(fold, last, cashSoFar),
    pace: paceFigure(points),
    ...marginFigures(entries, points),
    sums,
    events: positionEvents(facts, today),
    projection: projected.ok ? projected.projection : null,
    whyNoProjection: projected.ok ? null : projected.why,
  };
  return { position, basis: made.ok && projected.ok ? made.basis : null };
}
