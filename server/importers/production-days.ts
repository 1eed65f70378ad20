import type { IntervalChannel, IntervalDay } from '#shared/facts/papers.ts';
import { dayFromNumber } from '#shared/units/day.ts';
import { type Wh, wh } from '#shared/units/energy.ts';
import type { DaySteps, Scale } from './production-energy.ts';
import type { Grid } from './production-grid.ts';

export type Days = {
  days: Omit<IntervalDay, 'documentId'>[];
  totalWh: Wh;
  missingSteps: number;
  clippedNegativeWh: Wh;
  /** Days after the last with any energy that held only zeros; they are left out as missing. */
  trailingZeroDays: number;
  /** Energy of steps whose stored step is not whole, in Wh; it is left out with them. */
  partialWh: Wh;
};

/** Whole Wh of an exact count, half up. */
function wholeWh(amount: number, scale: Scale): Wh {
  return wh(Math.floor((amount * scale.factor) / scale.divisor + 0.5));
}

/** Hours after local midnight at which the sun is up on any day of the year (common practice, no source). */
const MIDDAY_FROM = 10 * 3600;
const MIDDAY_TO = 14 * 3600;

/**
 * Drops the days after the last with any energy: a file made before its last days were uploaded fills them with zeros. Zeros of a night alone
 * are what a night gives, and stay.
 */
function dropTrailingZeros(days: Map<number, Float64Array>, grid: Grid): number {
  const order = [...days.keys()];
  const isZero = (amount: number) => amount === 0 || Number.isNaN(amount);
  let last = order.length - 1;
  while (last >= 0 && (days.get(order[last] ?? 0) ?? []).every(isZero)) last -= 1;
  const trailing = order.slice(last + 1);
  const atMidday = (amount: number, index: number) =>
    !Number.isNaN(amount) &&
    (grid.stepsIn(0) === 1 || (index * grid.step >= MIDDAY_FROM && index * grid.step < MIDDAY_TO));
  if (last < 0 || !trailing.some((day) => days.get(day)?.some(atMidday))) return 0;
  for (const day of trailing) days.delete(day);
  return trailing.length;
}

/**
 * Turns exact steps into whole Wh. Each stored value is the rounded running total less what was given before, so that the whole Wh add up to
 * the true total and no sum from the start is out by more than half a Wh. Negative amounts count as nothing and are summed apart.
 */
export function daysOf(
  steps: ReadonlyMap<number, DaySteps>,
  grid: Grid,
  scale: Scale,
  channel: IntervalChannel,
  zerosMayBeMissing: boolean,
): Days {
  const exact = new Map([...steps].sort(([a], [b]) => a - b).map(([day, { amounts }]) => [day, amounts]));
  const trailingZeroDays = zerosMayBeMissing ? dropTrailingZeros(exact, grid) : 0;
  const perStored = grid.storedStep / grid.step;
  const minutes = grid.storedStep / 60;
  const days: Days['days'] = [];
  let rest = 0;
  let total = 0;
  let clipped = 0;
  let partial = 0;
  let firstSlot = -1;
  let missing = 0;
  let missingSince = 0;
  let dayBefore = Number.NaN;
  for (const [day, amounts] of exact) {
    if (day > dayBefore + 1) missingSince += Math.ceil(grid.stepsBetween(dayBefore + 1, day) / perStored);
    const count = Math.ceil(amounts.length / perStored);
    const values: (number | null)[] = new Array(count).fill(null);
    let held = false;
    for (let slot = 0; slot < count; slot += 1) {
      let sum = 0;
      let read = 0;
      let negative = 0;
      const wanted = Math.min(perStored, amounts.length - slot * perStored);
      for (let part = 0; part < wanted; part += 1) {
        const amount = amounts[slot * perStored + part] ?? Number.NaN;
        if (Number.isNaN(amount)) continue;
        read += 1;
        if (amount < 0) negative -= amount;
        else sum += amount;
      }
      if (read < wanted) {
        partial += sum;
        missingSince += 1;
        continue;
      }
      clipped += negative;
      rest += sum * scale.factor;
      const whole = Math.floor((rest + scale.divisor / 2) / scale.divisor);
      rest -= whole * scale.divisor;
      values[slot] = whole;
      total += whole;
      held = true;
      if (firstSlot >= 0) missing += missingSince;
      firstSlot = slot;
      missingSince = 0;
    }
    if (held) days.push({ channel, day: dayFromNumber(day), minutes, values });
    dayBefore = day;
  }
  return {
    days,
    totalWh: wh(total),
    missingSteps: missing,
    clippedNegativeWh: wholeWh(clipped, scale),
    trailingZeroDays,
    partialWh: wholeWh(partial, scale),
  };
}
