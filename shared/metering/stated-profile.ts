/**
 * When a house uses and a roof makes electricity, where no reading says so: hours of a day, January to December and weekday to weekend alike. Common
 * practice, no source: what is worked out with these shapes is an estimate and called one.
 */
const HOURS = 24;

/** Parts of a day's use in each hour: low at night, a rise in the morning, most of it in the evening. */
const USE_OF_DAY = [30, 27, 25, 25, 26, 30, 38, 45, 44, 40, 38, 38, 38, 38, 39, 42, 48, 58, 65, 65, 60, 54, 45, 42];

/** A half sine from 6:00 to 18:00, in thousandths of a day's production. */
const SUN_OF_DAY = Array.from({ length: HOURS }, (_, hour) =>
  hour < 6 || hour >= 18
    ? 0
    : Math.round(500 * (Math.cos(((hour - 6) / 12) * Math.PI) - Math.cos(((hour - 5) / 12) * Math.PI))),
);

/** Weekday hours, then those of a day of the weekend. */
export const STATED_USE: readonly number[] = [...USE_OF_DAY, ...USE_OF_DAY];
export const STATED_SUN: readonly number[] = [...SUN_OF_DAY, ...SUN_OF_DAY];

export const STATED_PROFILE_WORDS =
  'an assumed shape of the day: use highest in the evening, the roof from 6:00 to 18:00';
