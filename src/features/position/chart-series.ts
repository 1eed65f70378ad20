import { BOOKS, type BookId } from '#shared/books/book.ts';
import type { Range } from '#shared/position/outlook.ts';
import type { ByBook, Position, PositionEvent } from '#shared/position/position.ts';
import type { Cents } from '#shared/units/cents.ts';
import { addMonths, type Day, dayNumber } from '#shared/units/day.ts';

/** One point of the running lines, at the close of a cycle or of a projected month. */
export type RunningPoint = { on: Day; settledCents: Cents; cashCents: Cents; projected: boolean };
/** What eight of ten resampled futures lie between. */
export type BandPoint = { on: Day; lowCents: Cents; highCents: Cents };
/** One bar: what a cycle or projected month added, by book, standing over the middle of its days. */
export type CycleBar = { from: Day; on: Day; books: ByBook; addedCents: Cents; projected: boolean };
export type Series = {
  /** The close of every cycle, and today where something was posted since. */
  past: RunningPoint[];
  /** Starts with the last closed cycle, from which the projection was made. */
  projected: RunningPoint[];
  /** The range of the projection, from the last close on; empty while there is none. */
  band: BandPoint[];
  bars: CycleBar[];
  /** What was posted since the last cycle: no bar, since its bill is not here yet. */
  since: CycleBar | null;
  events: (PositionEvent & { number: number })[];
  first: Day;
  last: Day;
  even: Day | null;
  /** True where the projection runs on past `last`. */
  cut: boolean;
};

/** How long the chart goes on after the last thing that happens on it. */
const TAIL_MONTHS = 24;
const SHORTEST_MONTHS = 120;

/**
 * What the two charts draw. The whole projection is shown with `whole`; else the chart ends two years after the day it comes even and the last
 * event, since twenty-five years would press the past into a corner.
 */
export function chartSeries(position: Position, whole: boolean, range: Range | null = null): Series | null {
  const closed = position.points.filter((point) => point.cycle !== 'since');
  const firstPoint = closed[0];
  const lastPoint = closed.at(-1);
  if (!firstPoint || !lastPoint) return null;
  const months = position.projection?.months ?? [];
  const even = position.projection?.evenOn ?? null;
  const end = months.at(-1)?.on ?? position.today;
  const needed = latest([
    addMonths(even ?? firstPoint.on, TAIL_MONTHS),
    addMonths(latest(position.events.map((event) => event.on)) ?? firstPoint.on, TAIL_MONTHS),
    addMonths(firstPoint.on, SHORTEST_MONTHS),
  ]);
  const last = whole || even === null || needed === null || needed > end ? end : needed;
  const sincePoint = position.points.find((point) => point.cycle === 'since' && point.on > lastPoint.on) ?? null;
  const past = [...closed, ...(sincePoint ? [sincePoint] : [])].map((point) => ({
    on: point.on,
    settledCents: point.settledTodayCents,
    cashCents: point.cashSoFarCents,
    projected: false,
  }));
  const shown = months.filter((month) => month.on <= last);
  const ahead = shown.map((month) => ({
    on: month.on,
    settledCents: month.settledTodayCents,
    cashCents: month.cashSoFarCents,
    projected: true,
  }));
  const bars: CycleBar[] = [];
  let from = firstPoint.on;
  for (const point of closed) {
    if (point.cycle === 'before') continue;
    bars.push({ from, on: point.on, books: point.books, addedCents: point.addedCents, projected: false });
    from = point.on;
  }
  for (const month of shown) {
    bars.push({ from, on: month.on, books: month.books, addedCents: month.addedCents, projected: true });
    from = month.on;
  }
  const joint = past[closed.length - 1];
  const drawn = shown.flatMap((month, at) => {
    const between = range?.months[at];
    return between ? [{ on: month.on, ...between }] : [];
  });
  return {
    past,
    projected: joint && ahead.length > 0 ? [joint, ...ahead] : [],
    band:
      joint && drawn.length > 0
        ? [{ on: joint.on, lowCents: joint.settledCents, highCents: joint.settledCents }, ...drawn]
        : [],
    bars,
    since: sincePoint && {
      from: lastPoint.on,
      on: sincePoint.on,
      books: sincePoint.books,
      addedCents: sincePoint.addedCents,
      projected: false,
    },
    events: [...position.events]
      .filter((event) => event.on >= firstPoint.on && event.on <= last)
      .sort((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : 0))
      .map((event, index) => ({ ...event, number: index + 1 })),
    first: firstPoint.on,
    last: latest([last, lastPoint.on]) ?? last,
    even,
    cut: last < end,
  };
}

function latest(days: Day[]): Day | null {
  return days.reduce<Day | null>((found, day) => (found === null || day > found ? day : found), null);
}

/** Where a bar stands: the middle of its days. */
export function barMiddle(bar: CycleBar): number {
  return (dayNumber(bar.from) + dayNumber(bar.on)) / 2;
}

/** The books that a bar stacks. Tax credits come seldom and are large, so they are marked above the bar and not stacked. */
export const BAR_BOOKS: readonly BookId[] = BOOKS.filter((book) => book !== 'credit');

/** The books that any bar has something of. */
export function stackedBooks(series: Series): BookId[] {
  return BAR_BOOKS.filter((book) => series.bars.some((bar) => bar.books[book] !== 0));
}

/** How far above the ordinary a bar may stand before it is cut at the edge of the chart and marked. */
const ORDINARY = 1.8;

/**
 * The height of the bars' scale in cents each way: what ordinary cycles need. A single large payment or cost must not press all others flat;
 * it is cut at the edge.
 */
export function barScale(bars: readonly CycleBar[]): { upCents: number; downCents: number } {
  const ups = bars.map((bar) => barHeights(bar).upCents);
  const downs = bars.map((bar) => barHeights(bar).downCents);
  return { upCents: ordinaryMax(ups), downCents: ordinaryMax(downs) };
}

/** What stands above and below zero in a bar, both as positive cents, without the tax credit. */
export function barHeights(bar: CycleBar): { upCents: number; downCents: number } {
  let up = 0;
  let down = 0;
  for (const book of BAR_BOOKS) {
    const amount = bar.books[book];
    if (amount > 0) up += amount;
    else down -= amount;
  }
  return { upCents: up, downCents: down };
}

function ordinaryMax(heights: number[]): number {
  const sorted = heights.filter((height) => height > 0).sort((a, b) => a - b);
  if (sorted.length === 0) return 0;
  const usual = sorted[Math.floor((sorted.length - 1) * 0.95)] ?? 0;
  return Math.min(sorted.at(-1) ?? 0, usual * ORDINARY);
}
