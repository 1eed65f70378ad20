import type { ZoneClock } from './zone-clock.ts';

const SECONDS_PER_DAY = 86_400;
/** Minutes a stored day may be divided by. */
export const STORED_MINUTES = [5, 15, 30, 60, 1440] as const;
/** Loggers write a little early or late: so much of a step, and at most a minute, is taken as on time. */
const LATE_SHARE = 0.1;
const LATE_SECONDS = 60;

/** The steps of local days. `index` counts the file's own steps from local midnight. */
export type Grid = {
  /** The file's step in seconds. */
  step: number;
  /** The step of the stored days in seconds: the file's own, or the next larger one that holds it whole. */
  storedStep: number;
  /** Seconds by which all stamps stand past a step. */
  phase: number;
  place: (utc: number) => { day: number; index: number } | null;
  /** The file's steps in a local day: one of 23 or 25 hours has fewer or more. */
  stepsIn: (day: number) => number;
  /** The file's steps in the days from one up to another, not counting that. */
  stepsBetween: (from: number, to: number) => number;
};

/** The stored step for a file's step; null when no stored one can hold it (or it is over a day). */
export function storedStepFor(step: number): number | null {
  if (step < 60 || step > SECONDS_PER_DAY || SECONDS_PER_DAY % step !== 0) return null;
  const minutes = STORED_MINUTES.find((stored) => (stored * 60) % step === 0);
  return minutes === undefined ? null : minutes * 60;
}

/** Lays local days of `zone` out in steps. `starts` are the moments at which the file's steps begin. Null when the step cannot be stored. */
export function layGrid(zone: ZoneClock, step: number, starts: readonly number[]): Grid | null {
  const storedStep = storedStepFor(step);
  if (storedStep === null) return null;
  const phases = new Map<number, number>();
  for (const utc of starts) {
    const phase = (utc + zone.offsetAt(utc)) % step;
    phases.set(phase, (phases.get(phase) ?? 0) + 1);
  }
  let phase = 0;
  let most = phases.get(0) ?? 0;
  for (const [found, times] of phases) {
    if (times > most) {
      most = times;
      phase = found;
    }
  }
  const late = Math.min(step * LATE_SHARE, LATE_SECONDS);
  if (phase <= late || step - phase <= late) phase = 0;
  let knownDay = Number.NaN;
  let dayStart = 0;
  let dayEnd = 0;
  const open = (day: number) => {
    if (day === knownDay) return;
    knownDay = day;
    dayStart = zone.toUtc(day * SECONDS_PER_DAY, false);
    dayEnd = zone.toUtc((day + 1) * SECONDS_PER_DAY, false);
  };
  return {
    step,
    storedStep,
    phase,
    place: (utc) => {
      const local = utc + zone.offsetAt(utc);
      const snapped = Math.round((local - phase) / step) * step + phase;
      if (Math.abs(snapped - local) > late) return null;
      const moved = utc + snapped - local;
      open(Math.floor(snapped / SECONDS_PER_DAY));
      return { day: knownDay, index: Math.floor((moved - dayStart) / step) };
    },
    stepsIn: (day) => {
      open(day);
      return Math.ceil((dayEnd - dayStart) / step);
    },
    stepsBetween: (from, to) => {
      const seconds = zone.toUtc(to * SECONDS_PER_DAY, false) - zone.toUtc(from * SECONDS_PER_DAY, false);
      return Math.ceil(seconds / step);
    },
  };
}

/** Days as single steps, for files with one figure a day: `place` takes the wall clock of the file. */
export function dailyGrid(): Grid {
  return {
    step: SECONDS_PER_DAY,
    storedStep: SECONDS_PER_DAY,
    phase: 0,
    place: (local) => ({ day: Math.floor(local / SECONDS_PER_DAY), index: 0 }),
    stepsIn: () => 1,
    stepsBetween: (from, to) => to - from,
  };
}
