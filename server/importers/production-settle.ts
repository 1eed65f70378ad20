import type { ProductionMapping } from '#shared/api/log.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { MICRO_DECIMALS } from './amount-text.ts';
import type { ProductionContext } from './contract.ts';
import type { SheetRow } from './production-dialect.ts';
import type { Scale } from './production-energy.ts';
import { betterUnit, guessQuantity, guessStamp, guessUnit, peakWatts, ratingFor } from './production-guess.ts';
import { commonStep, inOrder, newestFirst } from './production-instants.ts';
import type { Doubts, Plan } from './production-mapping.ts';
import { type Rows, readRows } from './production-rows.ts';
import type { Unit } from './production-words.ts';

const SECONDS_PER_DAY = 86_400;
/** A day may be an hour short or long. */
const NEAR_DAY = 3600;

export type Settled = Pick<ProductionMapping, 'unit' | 'quantity' | 'stamp'> & {
  rows: Rows;
  /** A running total that starts again every midnight. */
  resets: boolean;
  /** Seconds from one row to the next. */
  step: number;
  daily: boolean;
  backwards: boolean;
};

export const isPower = (unit: Unit) => unit === 'W' || unit === 'kW';
const keepFor = (unit: Unit) => (unit === 'kWh' || unit === 'kW' ? MICRO_DECIMALS + 3 : MICRO_DECIMALS);

/** How the exact counts of a unit become Wh. */
export function scaleFor(unit: Unit, step: number): Scale {
  return isPower(unit) ? { factor: step / 60, divisor: 60_000_000 } : { factor: 1, divisor: 1_000_000 };
}

/** The largest value of a step, in millionths of its unit: of the values, or of the differences of a running total. */
function peakOf(values: readonly number[], register: boolean, keep: number): number {
  let peak = 0;
  for (let at = 0; at < values.length; at += 1) {
    const value = values[at] ?? 0;
    const step = register ? (at === 0 ? 0 : value - (values[at - 1] ?? 0)) : value;
    if (step > peak) peak = step;
  }
  return peak / 10 ** (keep - MICRO_DECIMALS);
}

function quantityDoubt(register: boolean, resets: boolean): string {
  if (resets)
    return 'The values rise through each day and start again at midnight. They are read as a running total of the day.';
  return register
    ? 'The values hardly ever fall. They are read as a running total, and the energy is the difference between rows.'
    : 'There is too little to tell a running total from energy by step. The values are read as energy by step.';
}

function settleUnit(
  stated: Unit | null,
  peak: number,
  step: number,
  words: string,
  capacity: number | null,
  register: boolean,
  doubts: Doubts,
): Unit {
  let unit = stated;
  if (unit === null) {
    const found = guessUnit(peak, step, words, capacity);
    unit = found.unit;
    const why = found.fits
      ? `${unit} fits the size of its values.`
      : `No unit fits the size of its values; ${unit} is taken.`;
    doubts.push({ field: 'unit', message: `The file does not say its unit. ${why}` });
  } else {
    const better = betterUnit(peak, unit, step, capacity);
    if (better !== null && capacity !== null) {
      const reached = Math.round(peakWatts(peak, unit, step)) / 1000;
      const message = `In ${unit} the roof would reach ${reached} kW; it is rated ${capacity / 1000} kW. ${better} would fit.`;
      doubts.push({ field: 'unit', message });
    }
  }
  if (!register || !isPower(unit)) return unit;
  doubts.push({ field: 'unit', message: `A running total cannot be in ${unit}. It is read as ${unit}h.` });
  return unit === 'W' ? 'Wh' : 'kWh';
}

/**
 * Reads the rows and settles what only their values can tell: the step, running total or energy by step, the unit by its size, start or end
 * stamps. What the owner's mapping gives is taken as it is.
 */
export function settleValues(
  fileName: string,
  sheet: SheetRow[],
  plan: Plan,
  context: ProductionContext,
  doubts: Doubts,
): Result<Settled> {
  const { layout, given } = plan;
  const words = `${layout.columns[layout.energyColumn] ?? ''} ${layout.unitsRow?.[layout.energyColumn] ?? ''}`;
  const keep = layout.unit === null ? MICRO_DECIMALS : keepFor(layout.unit);
  const rows = readRows(fileName, sheet, { ...plan.rows, keep });
  if (!rows.value.some((value) => !Number.isNaN(value))) {
    return fail('file-unreadable', 'No row of this file could be read as a time with a value.', rows.faults);
  }
  const backwards = newestFirst(rows.local);
  const order = inOrder(rows.local, backwards);
  const locals = order.map((at) => rows.local[at] ?? 0);
  const apart = commonStep(locals) ?? (rows.dateOnly ? SECONDS_PER_DAY : null);
  if (apart === null)
    return fail('file-unreadable', 'The file holds one moment only, so the length of its steps is not known.');
  if (apart > SECONDS_PER_DAY + NEAR_DAY) {
    const days = Math.round(apart / SECONDS_PER_DAY);
    return fail(
      'file-unreadable',
      `The rows of this file stand ${days} days apart. A file by day, or finer, is needed.`,
    );
  }
  const daily = apart >= SECONDS_PER_DAY - NEAR_DAY;
  const step = daily ? SECONDS_PER_DAY : apart;

  const known = order.filter((at) => !Number.isNaN(rows.value[at] ?? Number.NaN));
  const values = known.map((at) => rows.value[at] ?? 0);
  const guessed = guessQuantity(
    values,
    known.map((at) => rows.local[at] ?? 0),
    words,
  );
  const quantity = given?.quantity ?? guessed.quantity;
  const register = quantity === 'register';
  const resets = register && guessed.resets;
  if (!given && !guessed.certain) doubts.push({ field: 'quantity', message: quantityDoubt(register, resets) });

  const capacity = ratingFor(context.channel, context);
  const unit = settleUnit(layout.unit, peakOf(values, register, keep), step, words, capacity, register, doubts);

  const first = locals[0] ?? 0;
  const ends = guessStamp(first, locals.at(-1) ?? first, step, {
    endWords: layout.endStamps,
    midnight24: rows.midnight24,
  });
  const stamp = given?.stamp ?? (register || rows.dateOnly ? 'start' : ends.stamp);
  if (!given && stamp === 'end' && !ends.certain) {
    const message =
      'The first time is one step after midnight and the last is midnight, so times are read as the end of their step.';
    doubts.push({ field: 'stamp', message });
  }
  if (!given && register && rows.dateOnly) {
    const message =
      'The running total is taken as read at the start of each day. Choose “end” if it was read in the evening.';
    doubts.push({ field: 'stamp', message });
  }
  const exact = keepFor(unit) === keep ? rows : readRows(fileName, sheet, { ...plan.rows, keep: keepFor(unit) });
  return succeed({ unit, quantity, stamp, rows: exact, resets, step, daily, backwards });
}
