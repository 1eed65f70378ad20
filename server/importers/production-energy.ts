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

export type Source = {
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

export function emptySteps(): Steps {
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

/** Notes a row that does not count, as a fault while there is room to list it. */
export function reject(out: Steps, source: Source, row: number, code: string, column: string, reason: string) {
  out.rejected.push({ row, reason });
  out.faultCount += 1;
  if (out.faults.length < MOST_FAULTS) out.faults.push(fileFault(source.fileName, code, reason, { row, column }));
}

/** A step of more than 1 MWh, or 1 MW, is no home's; in millionths of a Wh or W. */
export const LARGEST_INTERVAL = 1e12;

export const minutesOf = (seconds: number) => Math.round(seconds / 60);

/** Opens days as they are first written to; the day written last is at hand, since rows of a day stand together. */
export function dayOpener(out: Steps, grid: Grid): (day: number) => DaySteps {
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
