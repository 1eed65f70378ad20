import { getPosition, getTimes } from 'suncalc';
import type { HouseFacts } from '../facts/house.ts';
import { addDays, type Day, daysBetween } from '../units/day.ts';
import { midnightUtc } from './cycle-intervals.ts';

/** A point on the earth in degrees, north and east positive. */
export type Place = { latitude: number; longitude: number };

/** Daylight in milliseconds since 1970: from sunrise to sunset. */
export type Light = { rise: number; set: number };

/**
 * The sun is down while its centre stands lower than −0.833°: with refraction (34′) and half its width (16′) its upper edge is then below a level
 * horizon, as sunrise is defined (US Naval Observatory; from memory). suncalc's own sunrise is that moment, and the height it then gives, refraction
 * included by its formula, is this one.
 */
const SEEN_HEIGHT_AT_SUNRISE = -0.349;
const MS_PER_DAY = 86_400_000;
const MS_PER_HOUR = 3_600_000;
/** In so many days a clock may have been changed there and back, and every midnight is asked for. */
const MOST_DAYS_BY_ENDS = 60;

/** Where the house stands; null until both coordinates are stated. */
export function placeOf({ latitude, longitude }: HouseFacts): Place | null {
  return latitude === null || longitude === null ? null : { latitude, longitude };
}

/** Whether any of the sun stands above a level horizon. */
export function sunIsUp({ latitude, longitude }: Place, instant: number): boolean {
  return getPosition(new Date(instant), latitude, longitude).altitude > SEEN_HEIGHT_AT_SUNRISE;
}

/** Every daylight that touches the span, in order; a polar day is one of 24 hours, a polar night none. */
export function lightsBetween({ latitude, longitude }: Place, from: number, to: number): Light[] {
  const lights: Light[] = [];
  for (let noon = from - MS_PER_DAY; noon < to + 2 * MS_PER_DAY; noon += MS_PER_DAY) {
    const { sunrise, sunset, solarNoon, alwaysUp } = getTimes(new Date(noon), latitude, longitude);
    if (sunrise !== null && sunset !== null) lights.push({ rise: sunrise.getTime(), set: sunset.getTime() });
    else if (alwaysUp === true) {
      lights.push({ rise: solarNoon.getTime() - MS_PER_DAY / 2, set: solarNoon.getTime() + MS_PER_DAY / 2 });
    }
  }
  return lights;
}

/** The instants at which the civil days of `[from, to)` begin, in milliseconds since 1970. */
export function midnights(from: Day, to: Day, timeZone: string): number[] {
  const days = daysBetween(from, to);
  const at = (count: number) => Date.parse(midnightUtc(addDays(from, count), timeZone));
  const first = at(0);
  const even = days <= MOST_DAYS_BY_ENDS && at(days) - first === days * MS_PER_DAY;
  return Array.from({ length: days }, (_, count) => (even ? first + count * MS_PER_DAY : at(count)));
}

/** Hours the house's clock is ahead of UTC at the midnight that begins a day; below zero west of Greenwich. */
export function hoursFromUtc(date: Day, timeZone: string): number {
  return (Date.parse(`${date}T00:00:00Z`) - Date.parse(midnightUtc(date, timeZone))) / MS_PER_HOUR;
}
