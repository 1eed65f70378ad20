import type { IntervalChannel } from '#shared/facts/papers.ts';
import { MICRO_DECIMALS } from './amount-text.ts';
import type { Unit } from './production-words.ts';

const SECONDS_PER_DAY = 86_400;
const RUNNING_WORDS = /lifetime|cumulat|register|reading|counter|running/i;

/** How the values run: `resets` marks a running total that starts again every midnight. */
export type Quantity = { quantity: 'interval' | 'register'; resets: boolean; certain: boolean };

/**
 * Tells a running total from energy by step, from values in time order (missing ones left out) and their wall clocks. Energy falls every
 * evening; a running total never falls, or only at midnight.
 */
export function guessQuantity(values: readonly number[], locals: readonly number[], words: string): Quantity {
  let drops = 0;
  let dropsAtMidnight = 0;
  let rises = 0;
  let nights = 0;
  for (let at = 1; at < values.length; at += 1) {
    const step = (values[at] ?? 0) - (values[at - 1] ?? 0);
    const local = locals[at] ?? 0;
    const newDay = Math.floor(local / SECONDS_PER_DAY) !== Math.floor((locals[at - 1] ?? 0) / SECONDS_PER_DAY);
    if (newDay) nights += 1;
    if (step > 0) rises += 1;
    if (step < 0) {
      drops += 1;
      if (newDay || local % SECONDS_PER_DAY <= 3600) dropsAtMidnight += 1;
    }
  }
  const named = RUNNING_WORDS.test(words);
  const span = (locals.at(-1) ?? 0) - (locals[0] ?? 0);
  const perDay = values.length / Math.max(1, span / SECONDS_PER_DAY);
  const interval: Quantity = { quantity: 'interval', resets: false, certain: !named };
  if (rises < 3) return interval;
  if (perDay > 3 && nights >= 1 && drops >= 1 && drops === dropsAtMidnight && dropsAtMidnight >= nights * 0.6) {
    return { quantity: 'register', resets: true, certain: false };
  }
  const mostDrops = values.length >= 48 ? Math.max(1, Math.floor(values.length / 500)) : 0;
  if (drops > mostDrops) return interval;
  const enough = perDay > 3 ? span > SECONDS_PER_DAY : values.length >= 8;
  if (named || enough) return { quantity: 'register', resets: false, certain: named && drops === 0 };
  return { ...interval, certain: false };
}

/** Whether stamps mark the start or the end of their step, from the first and last wall clock in time order. */
export function guessStamp(
  firstLocal: number,
  lastLocal: number,
  step: number,
  said: { endWords: boolean; midnight24: boolean },
): { stamp: 'start' | 'end'; certain: boolean } {
  if (said.endWords || said.midnight24) return { stamp: 'end', certain: true };
  const first = firstLocal % SECONDS_PER_DAY;
  const last = lastLocal % SECONDS_PER_DAY;
  if (step < SECONDS_PER_DAY && first === step && last === 0) return { stamp: 'end', certain: false };
  return { stamp: 'start', certain: true };
}

/** Bounds of a home's peak where no rating is known, in watts (common practice, no source). */
const LEAST_PEAK = 300;
const MOST_PEAK = 25_000;
/** Rule of thumb (common practice, no source): clouds' edges lift output somewhat over the rating; a sunny day gives up to 9 kWh per kW. */
const OVER_RATING = 1.2;
const UNDER_RATING = 0.1;
const DAY_HOURS = 9;

/** Mean watts over a step, were the peak value of that step in this unit. For judging magnitudes only; no figure comes from it. */
export function peakWatts(peakMicro: number, unit: Unit, step: number): number {
  const peak = peakMicro / 10 ** MICRO_DECIMALS;
  const hours = step >= SECONDS_PER_DAY ? DAY_HOURS : step / 3600;
  switch (unit) {
    case 'W':
      return peak;
    case 'kW':
      return peak * 1000;
    case 'Wh':
      return peak / hours;
    case 'kWh':
      return (peak * 1000) / hours;
  }
}

export type Rating = { acWatts: number | null; dcWatts: number | null };

/** Watts a channel can reach: a roof's rating for what it makes and sends out; an import has none. */
export function ratingFor(channel: IntervalChannel, rating: Rating): number | null {
  return channel === 'import' ? null : (rating.acWatts ?? rating.dcWatts);
}

function fits(watts: number, capacity: number | null): boolean {
  return capacity === null
    ? watts >= LEAST_PEAK && watts <= MOST_PEAK
    : watts >= capacity * UNDER_RATING && watts <= capacity * OVER_RATING;
}

/** The unit by magnitude: the first whose peak a home's roof could reach, powers first where the words say power. `fits` is false if none can. */
export function guessUnit(
  peakMicro: number,
  step: number,
  words: string,
  capacity: number | null,
): { unit: Unit; fits: boolean } {
  const power: Unit[] = ['W', 'kW'];
  const energy: Unit[] = ['kWh', 'Wh'];
  const order = /power|watt|\bac\b|\bdc\b/i.test(words) ? [...power, ...energy] : [...energy, ...power];
  const found = order.find((unit) => fits(peakWatts(peakMicro, unit, step), capacity));
  return { unit: found ?? order[0] ?? 'kWh', fits: found !== undefined };
}

/** Factors by which a stated unit must be out before it is doubted: a thousandfold slip, not a weak day. */
const FAR_OVER = 5;
const FAR_UNDER = 0.005;

/** The unit that would fit where the stated one is out by about a thousand; null where the stated one may stand. */
export function betterUnit(peakMicro: number, unit: Unit, step: number, capacity: number | null): Unit | null {
  if (capacity === null || peakMicro === 0) return null;
  const watts = peakWatts(peakMicro, unit, step);
  const swaps: Record<Unit, Unit> = { W: 'kW', kW: 'W', Wh: 'kWh', kWh: 'Wh' };
  const other = swaps[unit];
  const out = watts > capacity * FAR_OVER || watts < capacity * FAR_UNDER;
  return out && fits(peakWatts(peakMicro, other, step), capacity) ? other : null;
}
