import {
  dayOpener,
  emptySteps,
  LARGEST_INTERVAL,
  minutesOf,
  reject,
  type Source,
  type Steps,
} from './production-energy.ts';

/** A wait between two readings longer than this many steps is a gap. */
const GAP_STEPS = 1.5;

/**
 * A register that stands still for longer, in seconds, is rather a wrong date than a roof without sun: its steps stay missing, never zero
 * (common practice, no source).
 */
const LONGEST_STILL = 366 * 86_400;

/**
 * Energy as differences of a running total. Over a gap the difference is real but belongs to no known step: it is kept apart. A gap without
 * any difference held no energy, so its steps are zero, unless it is longer than a year. A fall starts a new segment; under `resets` (a total that starts again at midnight)
 * the first reading of a day counts from zero.
 */
export function registerSteps(source: Source, resets: boolean): Steps {
  const out = emptySteps();
  const { grid } = source;
  const open = dayOpener(out, grid);
  const add = (at: number, amount: number, row: number) => {
    const place = grid.place(at);
    if (place === null) return false;
    const { amounts, rows } = open(place.day);
    const known = amounts[place.index] ?? Number.NaN;
    amounts[place.index] = Number.isNaN(known) ? amount : known + amount;
    rows[place.index] = row;
    return true;
  };
  let before: { at: number; value: number; row: number } | null = null;
  for (const position of source.order) {
    const now = {
      at: source.at[position] ?? 0,
      value: source.value[position] ?? Number.NaN,
      row: source.row[position] ?? 0,
    };
    if (Number.isNaN(now.value)) continue;
    if (before === null) {
      before = now;
      continue;
    }
    const wait = now.at - before.at;
    if (wait === 0) {
      if (now.value === before.value) {
        out.sameTwice += 1;
        out.rejected.push({ row: now.row, reason: `Row ${now.row} repeats row ${before.row}: same time, same value.` });
      } else {
        reject(
          out,
          source,
          now.row,
          'two-values',
          source.column.energy,
          `Row ${now.row}, ${source.column.energy}: another reading than row ${before.row} at the same time. Keep one.`,
        );
      }
      continue;
    }
    const fell = now.value < before.value;
    if (fell && !resets) out.resets.push(now.row);
    else {
      const amount = fell ? now.value : now.value - before.value;
      const gap = wait > grid.step * GAP_STEPS;
      if (!gap && amount > LARGEST_INTERVAL) {
        const { energy } = source.column;
        const message = `Row ${now.row}, ${energy}: rises by more in one step than any roof can give.`;
        reject(out, source, now.row, 'too-large', energy, message);
      } else if (!gap) {
        if (!add(before.at, amount, now.row)) {
          reject(
            out,
            source,
            now.row,
            'off-step',
            source.column.time,
            `Row ${now.row}, ${source.column.time}: does not fall on the file’s steps of ${minutesOf(grid.step)} minutes.`,
          );
        }
      } else if (amount === 0 && !fell && wait <= LONGEST_STILL) {
        for (let at = before.at; at < now.at - grid.step / 2; at += grid.step) add(at, 0, now.row);
      } else {
        out.unallocated += amount;
        out.gaps += 1;
      }
    }
    before = now;
  }
  return out;
}
