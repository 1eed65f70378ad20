import type { StatementBody } from '#shared/api/cycles.ts';
import type { SourceTable } from '#shared/api/log.ts';

type Row = SourceTable['rows'][number];

/** Columns whose cells are values that were read, by the names the statement layout gives them. */
const VALUE_COLUMNS = new Set([
  'service_from',
  'service_to',
  'amount',
  'quantity',
  'rate',
  'previous',
  'current',
  'statement_date',
  'due_date',
  'days',
]);
/** Columns whose words speak for themselves; any other is shown with its name. */
const WORD_COLUMNS = new Set(['record', 'item', 'label', 'unit', 'meter', 'read_type', 'note']);

export const plainName = (name: string) =>
  name
    .trim()
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '_');

export const isValueColumn = (name: string) => VALUE_COLUMNS.has(plainName(name));
export const isDatesColumn = (name: string) => /^service_/.test(plainName(name));

/** The rows of a file that belong to one statement: those its values name, and their neighbours with the same service dates. */
export function rowsOfStatement(table: SourceTable, statement: StatementBody): number[] {
  const named = [...statement.reads, ...statement.lines, ...statement.banks].flatMap((part) => part.row ?? []);
  const first = table.rows.find((row) => named.includes(row.row));
  if (!first) return [];
  const at = ['service_from', 'service_to'].map((name) => table.header.findIndex((cell) => plainName(cell) === name));
  const dates = (row: Row) => at.map((index) => row.cells[index] ?? '').join(' ');
  const own = dates(first);
  return table.rows.filter((row) => named.includes(row.row) || dates(row) === own).map((row) => row.row);
}

export type PaperRow = {
  row: number;
  words: string[];
  values: { column: string; text: string; dates: boolean }[];
};

/** Rows as a page: words on the left, values on the right. Service dates that every row repeats stand on the first alone. */
export function paperRows(table: SourceTable, own: number[]): PaperRow[] {
  const rows = table.rows.filter((row) => own.includes(row.row));
  return rows.map((row, place) => {
    const cells = table.header.map((column, index) => ({ column, text: (row.cells[index] ?? '').trim() }));
    const filled = cells.filter(({ text }) => text !== '');
    const repeated = (column: string, text: string) =>
      place > 0 && isDatesColumn(column) && rows[0]?.cells[table.header.indexOf(column)]?.trim() === text;
    return {
      row: row.row,
      words: filled
        .filter(({ column, text }) => !isValueColumn(column) && !(plainName(column) === 'in_due' && /^y/i.test(text)))
        .map(({ column, text }) =>
          WORD_COLUMNS.has(plainName(column)) ? text : `${column.replaceAll('_', ' ')} ${text}`,
        ),
      values: filled
        .filter(({ column, text }) => isValueColumn(column) && !repeated(column, text))
        .map(({ column, text }) => ({ column, text, dates: isDatesColumn(column) })),
    };
  });
}
