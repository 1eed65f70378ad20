import Papa from 'papaparse';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';
import type { Day } from '#shared/units/day.ts';
import type { FileInput, StatementOptions, StatementReading } from './contract.ts';
import { fileFault } from './faults.ts';
import { readFileText } from './file-text.ts';
import { sourceTable } from './source-table.ts';
import { decimalMarkOf } from './statement-cells.ts';
import { isStatementHeader, readStatementHeader } from './statement-columns.ts';
import { assembleCycle, type CycleRows, cycleDateFault } from './statement-cycles.ts';
import { readRecord } from './statement-records.ts';
import { type RowReader, rowReader } from './statement-row.ts';

const MOST_BYTES = 2_000_000;
const MOST_FAULTS = 200;
/** Within so much of a file its header is found, or it is none of ours. */
const HEAD_ROWS = 200;
const HEAD_LETTERS = 100_000;

type SheetRow = { row: number; cells: string[] };

const isBlank = (cells: string[]) => cells.every((cell) => cell.trim() === '');
const isComment = (cells: string[]) => (cells[0] ?? '').trimStart().startsWith('#');

/** The file as a sheet: its rows without blank and comment rows, cut by whichever mark its header row uses; null when it has no such header. */
function readSheet(
  text: string,
): { delimiter: string; header: SheetRow; rows: SheetRow[]; openQuote: number | null } | null {
  for (const delimiter of [',', ';', '\t']) {
    const head = Papa.parse<string[]>(text.slice(0, HEAD_LETTERS), { delimiter, preview: HEAD_ROWS });
    const first = head.data.find((cells) => !isBlank(cells) && !isComment(cells));
    if (!first || !isStatementHeader(first)) continue;
    const parsed = Papa.parse<string[]>(text, { delimiter });
    const rows: SheetRow[] = [];
    parsed.data.forEach((cells, index) => {
      if (!isBlank(cells) && !isComment(cells)) rows.push({ row: index + 1, cells });
    });
    const [header, ...rest] = rows;
    if (!header) continue;
    const open = parsed.errors.find((error) => error.type === 'Quotes');
    return { delimiter, header, rows: rest, openQuote: open ? (open.row ?? 0) + 1 : null };
  }
  return null;
}

type Dates = { from: Day; to: Day };

/** A row's cycle: its own two dates, or those of the row above where both cells are empty. */
function datesOf(cells: RowReader, above: Dates | null, fileName: string): Dates | null {
  if (cells.text('service_from') === '' && cells.text('service_to') === '') {
    if (above) return above;
    cells.need('service_from', 'service_from and service_to are empty, and no row above has good ones. Fill them in.');
    return null;
  }
  cells.need('service_from', 'service_from is empty. Fill in both dates, or leave both empty to mean the row above.');
  cells.need('service_to', 'service_to is empty. Fill in both dates, or leave both empty to mean the row above.');
  const from = cells.date('service_from');
  const to = cells.date('service_to');
  if (from === null || to === null) return null;
  const wrong = cycleDateFault(fileName, cells.row, from, to);
  if (wrong === null) return { from, to };
  cells.faults.push(wrong);
  return null;
}

function overlapFaults(fileName: string, cycles: CycleRows[]): Fault[] {
  const faults: Fault[] = [];
  const ordered = [...cycles].sort((a, b) => (a.from < b.from ? -1 : a.from > b.from ? 1 : 0));
  let last: CycleRows | null = null;
  for (const cycle of ordered) {
    if (last !== null && cycle.from < last.to) {
      const message = `Row ${cycle.firstRow}: the cycle ${cycle.from} to ${cycle.to} overlaps ${last.from} to ${last.to} (row ${last.firstRow}). Each cycle begins on the date the one before it ends.`;
      faults.push(
        fileFault(fileName, 'cycles-overlap', message, {
          row: cycle.firstRow,
          column: 'service_from',
          found: cycle.from,
        }),
      );
    }
    if (last === null || cycle.to > last.to) last = cycle;
  }
  return faults;
}

function capped(fileName: string, faults: Fault[]): Fault[] {
  if (faults.length <= MOST_FAULTS) return faults;
  const message = `${faults.length - MOST_FAULTS} more faults are not listed.`;
  return [...faults.slice(0, MOST_FAULTS), fileFault(fileName, 'more-faults', message)];
}

/**
 * Reads a statement file in our documented layout (`statement-template.ts`): one row per item, several cycles per file. Every row that
 * cannot be read is a fault with row, column and what to write; while there are faults, statements are given only with `keepGoodRows`, and
 * then without the faulty rows. Refuses files that are no such CSV: `file-empty`, `file-too-large`, `file-wrong-kind`, `file-unreadable`.
 */
export function readStatementCsv(file: FileInput, options: StatementOptions): Result<StatementReading> {
  const text = readFileText(file, MOST_BYTES);
  if (!text.ok) return text;
  const sheet = readSheet(text.value.text);
  if (sheet === null) {
    return fail(
      'file-unreadable',
      'This is not a statement file in our layout: its first row does not name the columns. Start from the template.',
    );
  }
  const { fileName } = file;
  const { header, faults, complete } = readStatementHeader(fileName, sheet.header.cells, sheet.header.row);
  if (sheet.openQuote !== null) {
    const message = `Row ${sheet.openQuote}: a quotation mark is opened and not closed as it should be. Take it out or double it.`;
    faults.push(fileFault(fileName, 'quotes', message, { row: sheet.openQuote }));
  }
  const table = () => sourceTable(header.cells, sheet.rows, faults);
  if (!complete) return succeed({ statements: [], table: table(), faults: capped(fileName, faults) });
  if (sheet.rows.length === 0)
    faults.push(fileFault(fileName, 'no-rows', 'The file names its columns and holds no rows.'));

  const mark = decimalMarkOf(
    sheet.delimiter,
    sheet.rows.flatMap((row) => row.cells),
  );
  const cycles = new Map<string, CycleRows>();
  let above: Dates | null = null;
  for (const { row, cells: found } of sheet.rows) {
    const cells = rowReader(fileName, row, found, header, mark);
    const beyond = found.slice(header.cells.length).some((cell) => cell.trim() !== '');
    if (beyond) {
      const message = `Row ${row} has more cells than the header has columns. Put a text that holds a comma in quotation marks.`;
      cells.faults.push(fileFault(fileName, 'too-many-cells', message, { row }));
    }
    const dates: Dates | null = datesOf(cells, above, fileName);
    above = dates;
    if (dates !== null) {
      const key = `${dates.from} ${dates.to}`;
      const cycle: CycleRows = cycles.get(key) ?? { ...dates, rows: [], firstRow: row, lastRow: row, lostRows: 0 };
      cycles.set(key, cycle);
      cycle.lastRow = row;
      const what = readRecord(cells, dates.from, dates.to);
      const facts = {
        statementOn: cells.date('statement_date'),
        dueOn: cells.date('due_date'),
        printedDays: cells.whole('days', 1, 400),
      };
      if (what !== null && cells.faults.length === 0) cycle.rows.push({ row, what, facts });
      else cycle.lostRows += 1;
    }
    faults.push(...cells.faults);
  }

  faults.push(...overlapFaults(fileName, [...cycles.values()]));
  const statements: StatementReading['statements'] = [];
  for (const cycle of cycles.values()) {
    const made = assembleCycle(fileName, cycle);
    faults.push(...made.faults);
    if (made.statement)
      statements.push({ statement: made.statement, firstRow: cycle.firstRow, lastRow: cycle.lastRow });
  }
  statements.sort((a, b) => (a.statement.from < b.statement.from ? -1 : 1));
  faults.sort((a, b) => (a.row ?? 0) - (b.row ?? 0));
  const kept = faults.length === 0 || options.keepGoodRows ? statements : [];
  return succeed({ statements: kept, table: table(), faults: capped(fileName, faults) });
}
