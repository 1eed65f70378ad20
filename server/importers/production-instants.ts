import type { Rows } from './production-rows.ts';
import type { ZoneClock } from './zone-clock.ts';

/** Steps loggers use, in minutes. */
const USUAL_MINUTES = [5, 10, 15, 20, 30, 60, 120, 180, 240, 360, 480, 720];

/** A step that is out by a minute, since its logger writes a little early and late, brought to the usual one it stands for. */
function usual(step: number): number {
  const minutes = USUAL_MINUTES.find((known) => Math.abs(known * 60 - step) <= 60);
  return minutes === undefined ? step : minutes * 60;
}

/** The commonest distance between neighbouring moments, in seconds, to the minute; null with fewer than two moments. */
export function commonStep(moments: readonly number[]): number | null {
  const counts = new Map<number, number>();
  let last = moments[0];
  for (let at = 1; at < moments.length; at += 1) {
    const moment = moments[at];
    if (moment === undefined || last === undefined) continue;
    const step = Math.round(Math.abs(moment - last) / 60) * 60;
    if (step > 0) counts.set(step, (counts.get(step) ?? 0) + 1);
    last = moment;
  }
  let best: number | null = null;
  let most = 0;
  for (const [step, times] of counts) {
    if (times > most || (times === most && best !== null && step < best)) {
      most = times;
      best = step;
    }
  }
  return best === null ? null : usual(best);
}

/** True where most rows go back in time: the newest stands first. */
export function newestFirst(moments: readonly number[]): boolean {
  let back = 0;
  let on = 0;
  for (let at = 1; at < moments.length; at += 1) {
    const step = (moments[at] ?? 0) - (moments[at - 1] ?? 0);
    if (step < 0) back += 1;
    if (step > 0) on += 1;
  }
  return back > on;
}

export type Instants = {
  /** UTC seconds of each row, in the rows' order. */
  utc: number[];
  /** Rows whose wall clock never showed: they stand in the hour the clocks skip. */
  gapRows: number[];
  /** Rows of an hour the clocks repeat that stand there once only. */
  onceOfTwo: number;
  /** Counts the rows whose moment another row claims as well. */
  clashes: () => number;
};

/**
 * Places each row in time. A stated offset wins; else the zone's clock: of two equal stamps in an hour that repeats, the first in time order
 * of the file is daylight time, the second standard; a stamp in the skipped hour counts on from before the change.
 */
export function placeRows(rows: Rows, zone: ZoneClock, backwards: boolean, shift: number): Instants {
  const count = rows.local.length;
  const utc = new Array<number>(count).fill(0);
  const gapRows: number[] = [];
  const seen = new Map<number, number>();
  for (let step = 0; step < count; step += 1) {
    const at = backwards ? count - 1 - step : step;
    const local = (rows.local[at] ?? 0) + shift;
    const offset = rows.offset[at] ?? Number.NaN;
    if (!Number.isNaN(offset)) {
      utc[at] = local - offset;
      continue;
    }
    const early = zone.toUtc(local, false);
    utc[at] = early;
    const shown = early + zone.offsetAt(early);
    if (shown !== local) gapRows.push(at);
    else if (zone.toUtc(local, true) !== early) {
      const times = seen.get(local) ?? 0;
      seen.set(local, times + 1);
      if (times > 0) utc[at] = zone.toUtc(local, true);
    }
  }
  let onceOfTwo = 0;
  for (const times of seen.values()) if (times === 1) onceOfTwo += 1;
  return { utc, gapRows, onceOfTwo, clashes: () => count - new Set(utc).size };
}

/** Positions of the rows in time order; equal moments keep the order of the file (turned round where the newest stands first). */
export function inOrder(moments: readonly number[], backwards: boolean): number[] {
  const order = moments.map((_, at) => (backwards ? moments.length - 1 - at : at));
  let sorted = true;
  for (let at = 1; at < order.length && sorted; at += 1) {
    sorted = (moments[order[at] ?? 0] ?? 0) >= (moments[order[at - 1] ?? 0] ?? 0);
  }
  return sorted ? order : order.sort((a, b) => (moments[a] ?? 0) - (moments[b] ?? 0));
}
