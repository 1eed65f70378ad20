import type { ProductionMapping } from '#shared/api/log.ts';
import type { Fault } from '#shared/problem.ts';
import { readScaled } from './amount-text.ts';
import { fileFault, shortened } from './faults.ts';
import type { Layout } from './production-columns.ts';
import type { SheetRow } from './production-dialect.ts';
import { clockText, leadingPair, type Stamp, stampReader } from './stamp-text.ts';

/** Faults listed one by one; all are counted in `rejected`. */
export const MOST_FAULTS = 50;
const SECONDS_PER_DAY = 86_400;

export type Rejected = { row: number; reason: string };

/** The readings of a file in file order, as parallel arrays. `local` is the wall clock in seconds; `value` counts 10^−keep units, NaN for missing. */
export type Rows = {
  row: number[];
  local: number[];
  /** Seconds east of UTC where the stamp states it, else NaN. */
  offset: number[];
  value: number[];
  dateOnly: boolean;
  midnight24: boolean;
  /** What a total row states, in the same scale; null when there is none. */
  statedTotal: number | null;
  rejected: Rejected[];
  faults: Fault[];
  faultCount: number;
};

const SUM_LABEL = /^(grand\s+)?(total|sum|subtotal)s?\b/i;
const OTHER_LABEL = /^(average|avg|mean|min|max|minimum|maximum)\b/i;

export type RowPlan = Pick<
  ProductionMapping,
  'timeColumn' | 'clockColumn' | 'energyColumn' | 'dateOrder' | 'decimalMark'
> & {
  layout: Pick<Layout, 'headerAt' | 'dataAt' | 'columns' | 'numbers' | 'unitsRow'>;
  /** Decimals kept of each value. */
  keep: number;
};

/** The cell's moment, with the clock of a second column where there is one. */
function momentReader(plan: RowPlan): (cells: string[]) => Stamp | null {
  const read = stampReader(plan.dateOrder, plan.layout.numbers);
  const { clockColumn, timeColumn } = plan;
  if (clockColumn === null) return (cells) => read(cells[timeColumn] ?? '');
  return (cells) => {
    const clock = clockText(cells[clockColumn] ?? '');
    return clock === null ? null : read(`${(cells[timeColumn] ?? '').trim()} ${clock}`);
  };
}

/**
 * Reads every row below the header. A row without a moment or with a value that is no number is a fault with its row and column; a total row
 * is left out and kept apart; a repeated header and blank rows are passed over.
 */
export function readRows(fileName: string, sheet: SheetRow[], plan: RowPlan): Rows {
  const { layout, energyColumn, timeColumn, clockColumn } = plan;
  const out: Rows = {
    row: [],
    local: [],
    offset: [],
    value: [],
    dateOnly: true,
    midnight24: false,
    statedTotal: null,
    rejected: [],
    faults: [],
    faultCount: 0,
  };
  const header = sheet[layout.headerAt]?.cells.map((cell) => cell.trim()).join('\u0000');
  const moment = momentReader(plan);
  let sum = 0;
  const reject = (row: number, column: number, found: string, code: string, wrong: string) => {
    const name = layout.columns[column] ?? `Column ${column + 1}`;
    const message = `Row ${row}, ${name}: ${wrong}`;
    out.rejected.push({ row, reason: message });
    out.faultCount += 1;
    if (out.faults.length < MOST_FAULTS)
      out.faults.push(fileFault(fileName, code, message, { row, column: name, found }));
  };
  for (let at = layout.headerAt + 1; at < sheet.length; at += 1) {
    const line = sheet[at];
    if (line === undefined) continue;
    const { row, cells } = line;
    if (at < layout.dataAt && cells === layout.unitsRow) continue;
    const stamp = moment(cells);
    const found = cells[energyColumn] ?? '';
    const value = readScaled(found, plan.decimalMark, plan.keep);
    if (stamp === null) {
      if (header !== undefined && cells.map((cell) => cell.trim()).join('\u0000') === header) continue;
      const label = cells.map((cell) => cell.trim()).find((cell) => cell !== '') ?? '';
      const nameless =
        (cells[timeColumn] ?? '').trim() === '' &&
        typeof value === 'number' &&
        sum > 0 &&
        Math.abs(value - sum) <= sum / 100;
      if (SUM_LABEL.test(label) || nameless) {
        if (typeof value === 'number') out.statedTotal = value;
        continue;
      }
      if (OTHER_LABEL.test(label)) continue;
      const when =
        `${(cells[timeColumn] ?? '').trim()}${clockColumn === null ? '' : ` ${(cells[clockColumn] ?? '').trim()}`}`.trim();
      const wrong =
        when === ''
          ? 'no date and time. Fill it in or take the row out.'
          : `“${shortened(when)}” is not a date and time as in the other rows.`;
      reject(row, timeColumn, when, 'not-date', wrong);
      continue;
    }
    if (value === undefined) {
      reject(row, energyColumn, found, 'not-number', `“${shortened(found)}” is not a number this column can hold.`);
      continue;
    }
    out.row.push(row);
    out.local.push(stamp.day * SECONDS_PER_DAY + stamp.second);
    out.offset.push(stamp.offset ?? Number.NaN);
    out.value.push(value ?? Number.NaN);
    if (value !== null) sum += value;
    if (!stamp.dateOnly) out.dateOnly = false;
    if (stamp.midnight24) out.midnight24 = true;
  }
  return out;
}

type DateOrder = ProductionMapping['dateOrder'];

/**
 * Settles the order of day and month over the whole column: a number over 12 decides; else the order in which the dates follow on day by
 * day; `certain` is false where no number decides.
 */
export function dateOrderOf(sheet: SheetRow[], from: number, column: number): { order: DateOrder; certain: boolean } {
  let firstOver = 0;
  let secondOver = 0;
  let pairs = 0;
  let mark = '/';
  const follows = { mdy: 0, dmy: 0 };
  let before: { mdy: number; dmy: number } | null = null;
  let last = '';
  for (let at = from; at < sheet.length; at += 1) {
    const text = (sheet[at]?.cells[column] ?? '').trim();
    const head = text.slice(0, 10);
    if (head === last) continue;
    last = head;
    const pair = leadingPair(text);
    if (pair === null) continue;
    pairs += 1;
    mark = pair.mark;
    if (pair.first > 12) firstOver += 1;
    if (pair.second > 12) secondOver += 1;
    const now = {
      mdy: Date.UTC(pair.year, pair.first - 1, pair.second) / 86_400_000,
      dmy: Date.UTC(pair.year, pair.second - 1, pair.first) / 86_400_000,
    };
    if (before) {
      if (Math.abs(now.mdy - before.mdy) <= 1) follows.mdy += 1;
      if (Math.abs(now.dmy - before.dmy) <= 1) follows.dmy += 1;
    }
    before = now;
  }
  if (pairs === 0) return { order: 'ymd', certain: true };
  if (firstOver !== secondOver) return { order: firstOver > secondOver ? 'dmy' : 'mdy', certain: true };
  // A dotted date is written day first; the days following on from one another bear it out.
  if (mark === '.' && follows.dmy > follows.mdy) return { order: 'dmy', certain: true };
  if (follows.mdy !== follows.dmy) return { order: follows.mdy > follows.dmy ? 'mdy' : 'dmy', certain: false };
  return { order: mark === '.' ? 'dmy' : 'mdy', certain: false };
}
