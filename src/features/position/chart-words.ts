import type { Range } from '#shared/position/outlook.ts';
import type { Position } from '#shared/position/position.ts';
import { dollars, monthYear } from '#src/lib/format.ts';
import type { Series } from './chart-series.ts';

/** The charts in one sentence, for those who cannot see them and for those in a hurry. */
export function chartSummary(position: Position, series: Series): string {
  const first = series.past[0];
  const now = series.past.at(-1);
  if (!first || !now) return 'Nothing is drawn yet.';
  const past = `Settled today went from ${dollars(first.settledCents)} in ${monthYear(first.on)} to ${dollars(now.settledCents)} in ${monthYear(now.on)}; cash so far stands at ${dollars(now.cashCents)}.`;
  if (!position.projection) return past;
  const even = position.projection.evenOn;
  if (even === null) {
    const years = Math.round(position.projection.months.length / 12);
    return `${past} It does not stay at even within the ${years} years projected.`;
  }
  return even <= now.on
    ? `${past} It stays past even in the projection.`
    : `${past} Projected to come even in ${monthYear(even)} and to stay so.`;
}

/** When it comes even in eight of ten resampled futures, counting those that do not within the horizon. */
export function rangeSentence(range: Range, years: number): string {
  const { evenEarliest: early, evenLatest: late, evenWithin, resamples } = range;
  if (early === null) {
    return evenWithin === 0
      ? `Not even within the ${years} years in any of ${resamples} resampled futures.`
      : `Even within the ${years} years in ${evenWithin} of ${resamples} resampled futures.`;
  }
  if (late === null) {
    return `Even in ${monthYear(early)} at the earliest in nine of ten resampled futures; ${resamples - evenWithin} of ${resamples} do not come even within the ${years} years.`;
  }
  return early === late
    ? `Even in ${monthYear(early)} in at least 8 of 10 resampled futures.`
    : `Even between ${monthYear(early)} and ${monthYear(late)} in 8 of 10 resampled futures.`;
}

/** How the range is drawn, and what it leaves out. */
export function rangeMethod(range: Range): string {
  return `Shaded: what 8 of 10 of ${range.resamples} futures lie between. Each redraws every month from your own record: a recorded day of the same calendar month, with its cycle’s production, use and share sent out. It shows how much ordinary months differ, and nothing of prices, faults or changes that last.`;
}
