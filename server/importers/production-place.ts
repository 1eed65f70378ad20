import type { ProductionMapping } from '#shared/api/log.ts';
import { dayFromNumber } from '#shared/units/day.ts';
import { placeRows } from './production-instants.ts';
import type { Doubts } from './production-mapping.ts';
import type { Rows } from './production-rows.ts';
import { type ZoneClock, zoneClock } from './zone-clock.ts';

const SECONDS_PER_DAY = 86_400;

export type Placed = { at: number[]; house: ZoneClock; timeZone: string };

type How = Pick<ProductionMapping, 'stamp' | 'quantity' | 'timeZone'> & {
  houseZone: string;
  step: number;
  backwards: boolean;
  /** False where the owner's mapping names the zone: then it is not second-guessed. */
  mayChangeZone: boolean;
};

/** The zone of a clock that never changes, so many hours from UTC; IANA counts the sign of these the other way round. */
function fixedZone(offset: number): string | null {
  if (offset % 3600 !== 0) return null;
  const hours = offset / 3600;
  return hours === 0 ? 'Etc/GMT' : `Etc/GMT${hours < 0 ? '+' : '-'}${Math.abs(hours)}`;
}

function place(rows: Rows, zone: ZoneClock, how: How) {
  const ends = how.stamp === 'end' && how.quantity === 'interval';
  const asWritten = placeRows(rows, zone, how.backwards, 0);
  if (!ends) return asWritten;
  const moved = { ...asWritten, utc: asWritten.utc.map((utc) => utc - how.step) };
  moved.gapRows = moved.gapRows.filter((at) => zone.kindOf((rows.local[at] ?? 0) - how.step) === 'gap');
  // Some loggers add the step to the wall clock instead of to the moment; at a change of the clocks only one of the two leaves no clash.
  const byWall = placeRows(rows, zone, how.backwards, -how.step);
  return byWall.clashes() < moved.clashes() ? byWall : moved;
}

/** Where each row's step begins, in UTC seconds (for a running total: when it was read), and what the clock changes left in doubt. */
export function placeInTime(rows: Rows, how: How, doubts: Doubts): Placed {
  const house = zoneClock(how.houseZone);
  const zone = zoneClock(how.timeZone);
  let placed = place(rows, zone, how);
  let timeZone = how.timeZone;
  const gap = placed.gapRows[0];
  if (gap !== undefined) {
    const local = rows.local[gap] ?? 0;
    const day = dayFromNumber(Math.floor(local / SECONDS_PER_DAY));
    const before = local - (placed.utc[gap] ?? 0) - (how.stamp === 'end' && how.quantity === 'interval' ? how.step : 0);
    const fixed = fixedZone(before);
    const steady =
      fixed !== null && how.mayChangeZone && placed.clashes() > 0 ? place(rows, zoneClock(fixed), how) : null;
    if (steady !== null && fixed !== null && steady.clashes() < placed.clashes()) {
      placed = steady;
      timeZone = fixed;
      const message = `The file has readings in the hour the clocks skipped on ${day} and in the next one, so its clock seems to stay on standard time all year. It is read so.`;
      doubts.push({ field: 'timeZone', message });
    } else {
      const rowsSaid = placed.gapRows.length === 1 ? '1 row stands' : `${placed.gapRows.length} rows stand`;
      doubts.push({
        field: 'timeZone',
        message: `${rowsSaid} in an hour the clocks skip (first on ${day}). Read as one hour later.`,
      });
    }
  }
  if (placed.onceOfTwo > 0 && timeZone === how.timeZone) {
    const message = `The hour the clocks repeat is in the file once, not twice (${placed.onceOfTwo} ${placed.onceOfTwo === 1 ? 'row' : 'rows'}). It is read as the first, in daylight time.`;
    doubts.push({ field: 'timeZone', message });
  }
  return { at: placed.utc, house, timeZone };
}

/**
 * Moments of a file with one figure a day, in local seconds: as written where every row is dated, or written at midnight; else in the
 * household's zone. A timed end stamp belongs to the day before it; a dated running total read in the evening, to the midnight after it.
 */
export function dailyMoments(
  rows: Rows,
  placed: Placed,
  how: { register: boolean; stamp: ProductionMapping['stamp'] },
): number[] {
  const asWritten = rows.dateOnly || rows.local.every((local) => local % SECONDS_PER_DAY === 0);
  let shift = 0;
  if (how.stamp === 'end' && how.register && rows.dateOnly) shift = SECONDS_PER_DAY;
  if (how.stamp === 'end' && !how.register && !rows.dateOnly) shift = -SECONDS_PER_DAY;
  return rows.local.map((local, index) => {
    const utc = placed.at[index] ?? 0;
    return (asWritten ? local : utc + placed.house.offsetAt(utc)) + shift;
  });
}
