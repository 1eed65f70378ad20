import { dcWattsOf } from '../facts/dc-rating.ts';
import type { HouseFacts } from '../facts/house.ts';
import { sayCount, sayDate, sayKwh } from '../ledger/say.ts';
import { intervalDayOf, intervalEnergy } from '../metering/interval-index.ts';
import { hoursFromUtc, type Light, lightsBetween, midnights, type Place, placeOf, sunIsUp } from '../metering/sun.ts';
import { addDays, type Day, daysBetween } from '../units/day.ts';
import { type Wh, wh, ZERO_WH } from '../units/energy.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareWh, type Difference, nothingToCompare } from './make-check.ts';

const CHANNELS = ['production', 'monitor'] as const;
type Channel = (typeof CHANNELS)[number];
const FILES = { production: 'production file', monitor: 'monitoring file' } as const;

const MS_PER_MINUTE = 60_000;
const MS_PER_HOUR = 3_600_000;
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
export function productionAtNightChecks({ paper, index, facts: { house } }: CheckContext): Check[] {
  const place = placeOf(house);
  const held = CHANNELS.filter((channel) => intervalEnergy(index, channel, paper.from, paper.to) !== null);
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
    const days = filledDays(index, channel, paper.from, paper.to);
    if (days.some(({ minutes }) => minutes > LONGEST_STEP_MINUTES)) {
      return missing(`The ${FILES[channel]} has steps longer than an hour, which hold both night and day.`, null);
    }
    const starts = midnights(paper.from, paper.to, house.timeZone);
    const counted = days.map(({ at, date, minutes, values }) => ({
      date,
      steps: countedSteps(values, starts[at] ?? 0, minutes, house, days),
    }));
    const dark = counted.map(({ date, steps }) => ({ date, wh: darkWh(steps, place) })).filter((day) => day.wh > 0);
    const sides = { stated: sumOf(dark), found: ZERO_WH, tolerance: ZERO_WH };
    return compareWh('productionAtNight', channel, title, sides, () =>
      clockTexts(
        dark,
        counted.flatMap(({ steps }) => steps),
        place,
        [-hoursFromUtc(paper.from, house.timeZone), -hoursFromUtc(paper.to, house.timeZone)],
      ),
    );
  });
}

type FilledDay = { at: number; date: Day; minutes: number; values: readonly (number | null)[] };

function filledDays(index: CheckContext['index'], channel: Channel, from: Day, to: Day): FilledDay[] {
  const days: FilledDay[] = [];
  for (let at = 0; at < daysBetween(from, to); at += 1) {
    const date = addDays(from, at);
    const row = intervalDayOf(index, channel, date);
    if (row !== null) days.push({ at, date, minutes: row.minutes, values: row.values });
  }
  return days;
}

/** The steps of a day that are more than a sensor's idle count, in order. */
function countedSteps(
  values: FilledDay['values'],
  start: number,
  minutes: number,
  house: HouseFacts,
  days: readonly FilledDay[],
): Step[] {
  const watts = dcWattsOf(house.arrays) || (house.inverterAcWatts ?? highestWatts(days));
  const length = minutes * MS_PER_MINUTE;
  const steps: Step[] = [];
  values.forEach((value, at) => {
    if (value !== null && value > 0 && value * MINUTES_PER_HOUR * IDLE_PARTS >= watts * minutes) {
      steps.push({ at: start + at * length, length, wh: value });
    }
  });
  return steps;
}

function highestWatts(days: readonly FilledDay[]): number {
  let highest = 0;
  for (const { values, minutes } of days) {
    for (const value of values) highest = Math.max(highest, ((value ?? 0) * MINUTES_PER_HOUR) / minutes);
  }
  return highest;
}

/** What a day holds before its first step in the light and after its last: there is one daylight in a day. */
function darkWh(steps: readonly Step[], place: Place): number {
  let dark = 0;
  let first = 0;
  for (; first < steps.length; first += 1) {
    const step = steps[first];
    if (!step || sunIsUp(place, step.at + 2 * step.length) || sunIsUp(place, step.at - step.length)) break;
    dark += step.wh;
  }
  for (let last = steps.length - 1; last > first; last -= 1) {
    const step = steps[last];
    if (!step || sunIsUp(place, step.at - step.length) || sunIsUp(place, step.at + 2 * step.length)) break;
    dark += step.wh;
  }
  return dark;
}

function sumOf(days: readonly { wh: number }[]): Wh {
  return wh(days.reduce((sum, day) => sum + day.wh, 0));
}

/** The cause by trying: every whole number of hours by which the file's clock must be off for all of it to have been made by day. */
function clockTexts(
  dark: readonly { date: Day; wh: number }[],
  steps: readonly Step[],
  place: Place,
  utcHours: readonly number[],
): Difference {
  const first = dark[0]?.date;
  const what = `${sayKwh(sumOf(dark))} kWh in the dark on ${sayCount(dark.length, 'day', 'days')}${first ? `, the first ${sayDate(first)}` : ''}.`;
  const begin = (steps[0]?.at ?? 0) - MOST_HOURS_OFF * MS_PER_HOUR;
  const end = (steps.at(-1)?.at ?? 0) + MOST_HOURS_OFF * MS_PER_HOUR;
  const lights = lightsBetween(place, begin, end);
  const found: number[] = [];
  for (let hours = 1; hours <= MOST_HOURS_OFF; hours += 1) {
    for (const ahead of [-hours, hours]) if (allInTheLight(steps, lights, ahead * MS_PER_HOUR)) found.push(ahead);
  }
  if (found.length === 0) {
    return {
      cause: `${what} No whole number of hours by which its clock could be off puts it all by day.`,
      advice:
        'Look at those days in the file: a reading caught up after a gap, another meter’s figures, or a clock changed half-way.',
    };
  }
  return {
    cause: `${what} ${found.map((ahead) => clockWords(ahead, utcHours)).join(' Or: ')}`,
    advice: 'Find out which time its stamps are in, and upload the file again with that time.',
  };
}

/** Whether every step, put back by so much, touches daylight or lies within one step of it. */
function allInTheLight(steps: readonly Step[], lights: readonly Light[], ahead: number): boolean {
  let at = 0;
  return steps.every((step) => {
    const begin = step.at - ahead - step.length;
    const end = step.at - ahead + 2 * step.length;
    while ((lights[at]?.set ?? Number.POSITIVE_INFINITY) <= begin) at += 1;
    return (lights[at]?.rise ?? Number.POSITIVE_INFINITY) < end;
  });
}

function clockWords(ahead: number, utcHours: readonly number[]): string {
  const off = `The file’s clock is ${sayCount(Math.abs(ahead), 'hour', 'hours')} ${ahead > 0 ? 'ahead' : 'behind'}`;
  if (utcHours.includes(ahead)) return `${off}: looks like UTC taken for local time.`;
  if (ahead === -1) return `${off}: looks like daylight-saving time left out.`;
  if (ahead === 1) return `${off}: looks like daylight-saving time kept on past its end.`;
  return `${off}.`;
}
