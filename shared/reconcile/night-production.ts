import { dcWattsOf } from '../facts/dc-rating.ts';
import { sayCount, sayDate, sayKwh } from '../ledger/say.ts';
import { intervalDayOf } from '../metering/interval-index.ts';
import { hoursFromUtc, type Light, lightsBetween, midnights, type Place, placeOf, sunIsUp } from '../metering/sun.ts';
import { addDays, type Day } from '../units/day.ts';
import { type Wh, wh, ZERO_WH } from '../units/energy.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareWh, type Difference, nothingToCompare } from './make-check.ts';

const CHANNELS = ['production', 'monitor'] as const;
const FILES = { production: 'production file', monitor: 'monitoring file' } as const;

const MS_PER_MINUTE = 60_000;
const MS_PER_HOUR = 3_600_000;
const MS_PER_DAY = 86_400_000;
/** Steps longer than this hold both night and day. */
const LONGEST_STEP_MINUTES = 60;
const MOST_HOURS_OFF = 12;
/** Mean power below 1/200 (0.5 %) of the nameplate is a sensor's idle count, not production (net-metering.md §5 "ignore <0.5% of nameplate"). */
const IDLE_PARTS = 200;
const MINUTES_PER_HOUR = 60;

/** One step of a file that counts: when it begins by the file's clock, how long it is, and its energy. */
type Step = { at: number; length: number; wh: number };

/**
 * No production while the sun is down at the house's coordinates (net-metering.md §5 "P_t = 0 from dusk to dawn"), for each file of steps of an hour or less.
 * A step counts as made in the dark if the sun is down from one step before it begins to one step after it ends, and its mean power is at least 0.5 %
 * of the DC rating (failing that, of the inverters' AC rating; failing that, of the cycle's highest step).
 */
export function productionAtNightChecks({ paper, index, metered, facts: { house } }: CheckContext): Check[] {
  const place = placeOf(house);
  const seen = { production: metered.witnesses.production.intervals, monitor: metered.monitor };
  const held = CHANNELS.filter((channel) => seen[channel] !== null);
  return held.map((channel) => {
    const title = `Production while the sun is down, ${FILES[channel]}`;
    const missing = (cause: string, advice: string | null) =>
      nothingToCompare('productionAtNight', channel, 'kWh', { title, cause, advice });
    if (place === null) {
      return missing(
        'Without the house’s coordinates nobody can say when the sun is down.',
        'Enter the house’s place in set-up.',
      );
    }
    const starts = midnights(paper.from, paper.to, house.timeZone);
    const days = starts.flatMap((start, at): FilledDay[] => {
      const date = addDays(paper.from, at);
      const row = intervalDayOf(index, channel, date);
      return row === null ? [] : [{ start, date, minutes: row.minutes, values: row.values }];
    });
    if (days.some(({ minutes }) => minutes > LONGEST_STEP_MINUTES)) {
      return missing(`The ${FILES[channel]} has steps longer than an hour, which hold both night and day.`, null);
    }
    const watts = dcWattsOf(house.arrays) || (house.inverterAcWatts ?? highestWatts(days));
    const dark = days.map((one) => ({ date: one.date, wh: darkWh(one, watts, place) })).filter((one) => one.wh > 0);
    const sides = { stated: sumOf(dark), found: ZERO_WH, tolerance: ZERO_WH };
    return compareWh('productionAtNight', channel, title, sides, () => {
      const steps = days.flatMap((one) => countedSteps(one, watts));
      const reach = MOST_HOURS_OFF * MS_PER_HOUR;
      const lights = lightsBetween(place, Math.min(...starts) - reach, Math.max(...starts) + MS_PER_DAY + reach);
      const utc = [paper.from, paper.to].map((date) => -hoursFromUtc(date, house.timeZone));
      return clockTexts(dark, hoursAhead(steps, lights), utc);
    });
  });
}

type FilledDay = { start: number; date: Day; minutes: number; values: readonly (number | null)[] };

/** The steps of a day that are more than a sensor's idle count, in order. */
function countedSteps({ start, minutes, values }: FilledDay, watts: number): Step[] {
  const length = minutes * MS_PER_MINUTE;
  return values.flatMap((value, at) =>
    counts(value, minutes, watts) ? [{ at: start + at * length, length, wh: value }] : [],
  );
}

function counts(value: number | null, minutes: number, watts: number): value is number {
  return value !== null && value > 0 && value * MINUTES_PER_HOUR * IDLE_PARTS >= watts * minutes;
}

function highestWatts(days: readonly FilledDay[]): number {
  let highest = 0;
  for (const { values, minutes } of days) {
    for (const value of values) highest = Math.max(highest, ((value ?? 0) * MINUTES_PER_HOUR) / minutes);
  }
  return highest;
}

/** What a day holds before its first step in the light and after its last: there is one daylight in a day, and only its ends are looked at. */
function darkWh({ start, minutes, values }: FilledDay, watts: number, place: Place): number {
  const length = minutes * MS_PER_MINUTE;
  const begins = (at: number) => sunIsUp(place, start + (at - 1) * length);
  const ends = (at: number) => sunIsUp(place, start + (at + 2) * length);
  const first = values.findIndex((value, at) => counts(value, minutes, watts) && (ends(at) || begins(at)));
  const last = values.findLastIndex((value, at) => counts(value, minutes, watts) && (begins(at) || ends(at)));
  const outside = first === -1 ? values : [...values.slice(0, first), ...values.slice(last + 1)];
  return outside.reduce<number>((sum, value) => (counts(value, minutes, watts) ? sum + value : sum), 0);
}

function sumOf(days: readonly { wh: number }[]): Wh {
  return wh(days.reduce((sum, day) => sum + day.wh, 0));
}

/** Every whole number of hours the file's clock may be ahead (below zero: behind) so that all of it was made in the light, the smallest first. */
function hoursAhead(steps: readonly Step[], lights: readonly Light[]): number[] {
  const found: number[] = [];
  for (let hours = 1; hours <= MOST_HOURS_OFF; hours += 1) {
    for (const ahead of [-hours, hours]) {
      const inTheLight = steps.every((step) => {
        const at = step.at - ahead * MS_PER_HOUR;
        return lights.some(({ rise, set }) => rise < at + 2 * step.length && set > at - step.length);
      });
      if (inTheLight) found.push(ahead);
    }
  }
  return found;
}

function clockTexts(
  dark: readonly { date: Day; wh: number }[],
  ahead: readonly number[],
  utc: readonly number[],
): Difference {
  const since = dark.slice(0, 1).map(({ date }) => sayDate(date));
  const what = `${sayKwh(sumOf(dark))} kWh in the dark on ${sayCount(dark.length, 'day', 'days')}, the first ${since.join('')}.`;
  if (ahead.length === 0) {
    return {
      cause: `${what} No whole number of hours by which its clock could be off puts it all by day.`,
      advice:
        'Look at those days in the file: a reading caught up after a gap, another meter’s figures, or a clock changed half-way.',
    };
  }
  return {
    cause: `${what} ${ahead.map((hours) => clockWords(hours, utc)).join(' Or: ')}`,
    advice: 'Find out which time its stamps are in, and upload the file again with that time.',
  };
}

function clockWords(ahead: number, utcHours: readonly number[]): string {
  const off = `The file’s clock is ${sayCount(Math.abs(ahead), 'hour', 'hours')} ${ahead > 0 ? 'ahead' : 'behind'}`;
  if (utcHours.includes(ahead)) return `${off}: looks like UTC taken for local time.`;
  if (ahead === -1) return `${off}: looks like daylight-saving time left out.`;
  if (ahead === 1) return `${off}: looks like daylight-saving time kept on past its end.`;
  return `${off}.`;
}
