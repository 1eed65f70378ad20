import type { Fault } from '#shared/problem.ts';
import { fileFault } from './faults.ts';
import type { Grid } from './production-grid.ts';
import { MOST_FAULTS, type Rejected } from './production-rows.ts';

/** A local day's steps in the file's own exact count (see `Scale`): NaN where nothing was read. `rows` says where each was read, 0 for nowhere. */
export type DaySteps = { amounts: Float64Array; rows: Int32Array };

/** Energy as whole numbers: `amount × factor ÷ divisor` is Wh, with no float in between. */
export type Scale = { factor: number; divisor: number };

export type Steps = {
  /** By days since 1970. */
  days: Map<number, DaySteps>;
  rejected: Rejected[];
  faults: Fault[];
  faultCount: number;
  /** A running total's energy over gaps, in the same count. */
  unallocated: number;
  gaps: number;
  /** Rows at which a running total started afresh. */
  resets: number[];
  sameTwice: number;
};

type Source = {
  fileName: string;
  grid: Grid;
  column: { time: string; energy: string };
  /** Positions into the arrays below in time order. */
  order: number[];
  /** Where each row's step begins (interval) or the moment of each reading (register). */
  at: number[];
  row: number[];
  value: number[];
};

function emptySteps(): Steps {
  return {
    days: new Map(),
    rejected: [],
    faults: [],
    faultCount: 0,
    unallocated: 0,
    gaps: 0,
    resets: [],
    sameTwice: 0,
  };
}

function reject(out: Steps, source: Source, row: number, code: string, column: string, reason: string) {
  out.rejected.push({ row, reason });
  out.faultCount += 1;
  if (out.faults.length < MOST_FAULTS) out.faults.push(fileFault(source.fileName, code, reason, { row, column }));
}

/** A step of more than 1 MWh, or 1 MW, is no home's; in millionths of a Wh or W. */
const LARGEST_INTERVAL = 1e12;

const minutesOf = (seconds: number) => Math.round(seconds / 60);

/** Opens days as they are first written to; the day written last is at hand, since rows of a day stand together. */
function dayOpener(out: Steps, grid: Grid): (day: number) => DaySteps {
  let last: DaySteps | undefined;
  let lastDay = Number.NaN;
  return (day) => {
    if (last !== undefined && day === lastDay) return last;
    let found = out.days.get(day);
    if (found === undefined) {
      const count = grid.stepsIn(day);
      found = { amounts: new Float64Array(count).fill(Number.NaN), rows: new Int32Array(count) };
      out.days.set(day, found);
    }
    last = found;
    lastDay = day;
    return found;
  };
}

/** Stands in `rows` for a step that rows disagree about. */
const DISPUTED = -1;

/**
 * Energy given step by step. A second row for a step with the same value changes nothing; with another value neither counts, since which is
 * right cannot be known here. A row that falls on no step is a fault.
 */
export function intervalSteps(source: Source): Steps {
  const out = emptySteps();
  const open = dayOpener(out, source.grid);
  const { time, energy } = source.column;
  for (const position of source.order) {
    const row = source.row[position] ?? 0;
    const amount = source.value[position] ?? Number.NaN;
    const place = source.grid.place(source.at[position] ?? 0);
    if (place === null) {
      const step = minutesOf(source.grid.step);
      const message = `Row ${row}, ${time}: does not fall on the file’s steps of ${step} minutes.`;
      reject(out, source, row, 'off-step', time, message);
      continue;
    }
    if (Number.isNaN(amount)) continue;
    if (Math.abs(amount) > LARGEST_INTERVAL) {
      reject(
        out,
        source,
        row,
        'too-large',
        energy,
        `Row ${row}, ${energy}: larger than any roof can give in one step.`,
      );
      continue;
    }
    const { amounts, rows } = open(place.day);
    const known = rows[place.index] ?? DISPUTED;
    if (known === 0) {
      amounts[place.index] = amount;
      rows[place.index] = row;
    } else if (known !== DISPUTED && amounts[place.index] === amount) {
      out.sameTwice += 1;
      out.rejected.push({ row, reason: `Row ${row} repeats row ${known}: same time, same value.` });
    } else {
      const other = known === DISPUTED ? 'an earlier row' : `row ${known}`;
      const message = `Row ${row}, ${energy}: another value than ${other} for the same time. Neither is counted; keep one.`;
      reject(out, source, row, 'two-values', energy, message);
      if (known === DISPUTED) continue;
      out.rejected.push({ row: known, reason: `Row ${known}: row ${row} gives another value for the same time.` });
      amounts[place.index] = Number.NaN;
      rows[place.index] = DISPUTED;
    }
  }
  return out;
}

/** A wait between two readings longer than this many steps is a gap. */
const GAP_STEPS = 1.5;

/**
 * Energy as differences of a running total. Over a gap the difference is real but belongs to no known step: it is kept apart. A gap without
 * any difference held no energy, so its steps are zero. A fall starts a new segment; under `resets` (a total that starts again at midnight)
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
      if (!gap) {
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
      } else if (amount === 0 && !fell) {
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
