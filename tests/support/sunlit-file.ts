import { getPosition } from 'suncalc';
import type { IntervalChannel, IntervalDay } from '#shared/facts/papers.ts';
import { midnights } from '#shared/metering/sun.ts';
import { addDays, type Day } from '#shared/units/day.ts';

export type SunlitFile = {
  channel: IntervalChannel;
  from: Day;
  to: Day;
  minutes: number;
  place: { latitude: number; longitude: number };
  timeZone: string;
  watts: number;
  /** Hours the file's clock is ahead of the house's. */
  hoursAhead: number;
};

const MS_PER_MINUTE = 60_000;

/** A file of what a level roof under a clear sky makes: watts × the sine of the sun's height at the middle of each step, nothing while it is down. */
export function sunlitFile(file: SunlitFile): IntervalDay[] {
  const { channel, from, to, minutes, place, timeZone, watts, hoursAhead } = file;
  const end = midnights(to, addDays(to, 1), timeZone)[0] ?? 0;
  const starts = [...midnights(from, to, timeZone), end];
  return starts.slice(0, -1).map((start, at) => {
    const steps = Math.round(((starts[at + 1] ?? start) - start) / (minutes * MS_PER_MINUTE));
    const values = Array.from({ length: steps }, (_, step) => {
      const middle = start + (step + 0.5) * minutes * MS_PER_MINUTE - hoursAhead * 60 * MS_PER_MINUTE;
      const { altitude } = getPosition(new Date(middle), place.latitude, place.longitude);
      const height = Math.sin((Math.max(0, altitude) * Math.PI) / 180);
      return Math.round((watts * height * minutes) / 60);
    });
    return { channel, day: addDays(from, at), minutes, values, documentId: null };
  });
}
