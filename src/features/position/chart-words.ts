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
