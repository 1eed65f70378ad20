import type { IntervalChannel } from '#shared/facts/papers.ts';
import { isMissingMark } from './amount-text.ts';
import { looksLikeClock, looksLikeNumber, looksLikeStamp, type SheetRow } from './production-dialect.ts';
import { energyScore, NOT_ENERGY, timeScore, type Unit, unitIn } from './production-words.ts';

/** What the words of a file say about its columns. Indexes count from 0; `headerAt` is the index in the sheet's rows, −1 for none. */
export type Layout = {
  headerAt: number;
  dataAt: number;
  columns: string[];
  timeColumn: number;
  clockColumn: number | null;
  /** Whether the time column holds bare numbers, and of which kind. */
  numbers: 'epoch' | 'serial' | null;
  energyColumn: number;
  /** Null where no word states it. */
  unit: Unit | null;
  unitsRow: string[] | null;
  /** Other columns that could have been meant. */
  rivals: number[];
  endStamps: boolean;
};

const PROBED_ROWS = 60;
const LONGEST_PREAMBLE = 120;
/** A column is one of times when so many of its first rows hold one; the rest are faults of their rows. */
const LEAST_SHARE = 0.2;

const EPOCH = /^(1\d{9}|1\d{12})(\.\d+)?$/;
const SERIAL = /^[34]\d{4}([.,]\d+)?$|^5\d{4}([.,]\d+)?$/;
const DATE_WORD = /date|time|stamp|period|interval|hour|day|start|\bts\b|epoch/i;

/** Whether a column holds its moments as bare numbers, by its first rows. */
export function numbersIn(rows: readonly SheetRow[], column: number): Layout['numbers'] {
  const cells = rows.slice(0, 20).map((row) => cellOf(row, column));
  if (cells.some(looksLikeStamp)) return null;
  const most = (pattern: RegExp) => cells.filter((cell) => pattern.test(cell)).length * 2 > cells.length;
  return most(EPOCH) ? 'epoch' : most(SERIAL) ? 'serial' : null;
}

const cellOf = (row: SheetRow | undefined, column: number) => (row?.cells[column] ?? '').trim();

type TimeColumn = { column: number; numbers: Layout['numbers'] };

/** Columns in which a row holds a moment: dates first, then epochs and spreadsheet serials, which look like any other number. */
function timeColumnsOf(row: SheetRow, headerName: (column: number) => string): TimeColumn[] {
  const found: TimeColumn[] = [];
  row.cells.forEach((cell, column) => {
    if (looksLikeStamp(cell)) found.push({ column, numbers: null });
  });
  if (found.length > 0) return found;
  row.cells.forEach((cell, column) => {
    if (EPOCH.test(cell.trim())) found.push({ column, numbers: 'epoch' });
    else if (SERIAL.test(cell.trim()) && DATE_WORD.test(headerName(column))) found.push({ column, numbers: 'serial' });
  });
  return found;
}

function isDataRow(row: SheetRow, headerName: (column: number) => string): boolean {
  const times = timeColumnsOf(row, headerName).map((time) => time.column);
  return times.length > 0 && row.cells.some((cell, column) => !times.includes(column) && looksLikeNumber(cell.trim()));
}

const isUnitsCell = (cell: string) => cell.trim() === '' || (cell.trim().length <= 12 && !/\d/.test(cell));

/** A row of units below the header: one cell is just a unit, and none is more than a short word. */
function isUnitsRow(row: SheetRow): boolean {
  return (
    row.cells.every(isUnitsCell) && row.cells.some((cell) => /^[[(]?\s*(kwh|wh|kw|w)\s*[\])]?$/i.test(cell.trim()))
  );
}

const textCells = (row: SheetRow) => row.cells.filter((cell) => /[a-z]/i.test(cell)).length;

function findHeader(rows: SheetRow[], dataAt: number): { headerAt: number; unitsRow: string[] | null } {
  let at = dataAt - 1;
  let unitsRow: string[] | null = null;
  const above = rows[at];
  if (above && isUnitsRow(above) && at > 0 && textCells(rows[at - 1] ?? above) >= 2) {
    unitsRow = above.cells;
    at -= 1;
  }
  const header = rows[at];
  return header && textCells(header) >= 2 ? { headerAt: at, unitsRow } : { headerAt: -1, unitsRow: null };
}

/** A column's words, with its unit's row below it, as one text. */
function wordsOf(columns: string[], unitsRow: string[] | null, column: number): string {
  return `${columns[column] ?? ''} ${unitsRow?.[column] ?? ''}`.trim();
}

export function columnNames(rows: SheetRow[], headerAt: number, width: number): string[] {
  const header = rows[headerAt];
  return Array.from({ length: width }, (_, column) => cellOf(header, column) || `Column ${column + 1}`);
}

/**
 * Finds the header, the time column and the column of energy or power of the wanted channel: the first row with a moment and a number whose
 * next rows are like it starts the data, and the header stands above it. Null when there is no such row; `'pivoted'` when each row is a day
 * with its hours across.
 */
export function findLayout(rows: SheetRow[], channel: IntervalChannel): Layout | null | 'pivoted' {
  let dataAt = -1;
  for (let at = 0; at < Math.min(rows.length, LONGEST_PREAMBLE) && dataAt < 0; at += 1) {
    const above = rows[at - 1];
    const headerName = (column: number) => cellOf(above && isUnitsRow(above) ? rows[at - 2] : above, column);
    const next = rows.slice(at, at + 3);
    if (next.length > 0 && next.every((row) => isDataRow(row, headerName))) dataAt = at;
  }
  // A file of few rows, some of them bad, still has one good row somewhere.
  if (dataAt < 0)
    dataAt = rows
      .slice(0, LONGEST_PREAMBLE)
      .findIndex((row, at) => isDataRow(row, (column) => cellOf(rows[at - 1], column)));
  if (dataAt < 0) return null;
  const { headerAt, unitsRow } = findHeader(rows, dataAt);
  const probe = rows.slice(dataAt, dataAt + PROBED_ROWS);
  const width = Math.max(...probe.map((row) => row.cells.length), rows[headerAt]?.cells.length ?? 0);
  const columns = columnNames(rows, headerAt, width);
  const header = rows[headerAt];
  if ((rows[dataAt - 1]?.cells ?? []).filter((cell) => looksLikeClock(cell)).length >= 12) return 'pivoted';

  const share = (test: (cell: string) => boolean, column: number) =>
    probe.filter((row) => test(cellOf(row, column))).length / probe.length;
  const first = rows[dataAt];
  const times = (first ? timeColumnsOf(first, (column) => cellOf(header, column)) : [])
    .filter(
      ({ column, numbers }) =>
        share(numbers === null ? looksLikeStamp : (cell) => EPOCH.test(cell) || SERIAL.test(cell), column) >
        LEAST_SHARE,
    )
    .map((time) => ({ ...time, score: timeScore(columns[time.column] ?? '') }))
    .sort((a, b) => b.score - a.score || a.column - b.column);
  const time = times[0];
  if (!time) return null;
  const timeColumns = times.map((other) => other.column);

  const dateOnly =
    time.numbers === null && share((cell) => cell.includes(':') || /T\d{4}/.test(cell), time.column) === 0;
  let clockColumn: number | null = null;
  if (dateOnly) {
    for (let column = 0; column < width && clockColumn === null; column += 1) {
      if (timeColumns.includes(column)) continue;
      const clockish = (cell: string) =>
        (/^\d{1,2}$/.test(cell) && Number(cell) <= 24) || /^([01]\d|2[0-4])[0-5]\d$/.test(cell);
      const hours = /^\s*(hour|time|clock)/i.test(columns[column] ?? '') && share(clockish, column) > 0.8;
      if (hours || share((cell) => /:/.test(cell) && looksLikeClock(cell), column) > 0.8) clockColumn = column;
    }
  }

  const candidates: { column: number; score: number }[] = [];
  for (let column = 0; column < width; column += 1) {
    if (timeColumns.includes(column) || column === clockColumn) continue;
    const words = wordsOf(columns, unitsRow, column);
    if (NOT_ENERGY.test(words)) continue;
    const numbers = share(looksLikeNumber, column);
    if (numbers === 0 || numbers + share(isMissingMark, column) < 0.5) continue;
    candidates.push({ column, score: energyScore(words, channel) });
  }
  candidates.sort((a, b) => b.score - a.score || a.column - b.column);
  const energy = candidates[0];
  if (!energy) return null;
  const words = wordsOf(columns, unitsRow, energy.column);
  const inCells = probe.map((row) => unitIn(cellOf(row, energy.column))).find((unit) => unit !== null) ?? null;
  const inPreamble = rows
    .slice(0, Math.max(0, headerAt))
    .filter((row) => row.cells.some((cell) => /unit/i.test(cell)))
    .map((row) => unitIn(row.cells.join(' ')))
    .find((unit) => unit !== null);
  const timeWords = `${columns[time.column]} ${clockColumn === null ? '' : columns[clockColumn]}`;
  return {
    headerAt,
    dataAt,
    columns,
    timeColumn: time.column,
    clockColumn,
    numbers: time.numbers,
    energyColumn: energy.column,
    unit: unitIn(words) ?? inCells ?? inPreamble ?? null,
    unitsRow,
    rivals: candidates
      .slice(1)
      .filter((other) => other.score >= energy.score - 2)
      .map((other) => other.column),
    endStamps: /\bend|ending|until/i.test(timeWords) && !/start|begin/i.test(timeWords),
  };
}
