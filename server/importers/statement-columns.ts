import type { Fault } from '#shared/problem.ts';
import { fileFault, nearestName } from './faults.ts';

/** The columns of the statement layout, in the template's order. */
export const STATEMENT_COLUMNS = [
  'service_from',
  'service_to',
  'record',
  'item',
  'label',
  'amount',
  'quantity',
  'unit',
  'rate',
  'in_due',
  'meter',
  'previous',
  'current',
  'dials',
  'multiplier',
  'read_type',
  'read_from',
  'read_to',
  'statement_date',
  'due_date',
  'days',
  'component',
  'note',
] as const;
export type StatementColumn = (typeof STATEMENT_COLUMNS)[number];

export const REQUIRED_COLUMNS: readonly StatementColumn[] = ['service_from', 'service_to', 'record', 'item', 'amount'];

/** Other names a column goes by. */
const ALIASES: Record<string, StatementColumn> = {
  from: 'service_from',
  service_start: 'service_from',
  to: 'service_to',
  service_end: 'service_to',
  description: 'label',
  kwh: 'quantity',
  amount_usd: 'amount',
  previous_read: 'previous',
  current_read: 'current',
  meter_number: 'meter',
  billing_days: 'days',
  notes: 'note',
};

function plainName(cell: string): string {
  return cell
    .trim()
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '_')
    .replace(/^_+|_+$/g, '');
}

/** The layout's name for a header cell; null when it is none of them. Case, spaces and punctuation do not matter. */
export function statementColumn(cell: string): StatementColumn | null {
  const name = plainName(cell);
  return STATEMENT_COLUMNS.find((column) => column === name) ?? ALIASES[name] ?? null;
}

/** True where a header row is that of a statement file, well or badly written: most of what sets the layout apart is there. */
export function isStatementHeader(cells: readonly string[]): boolean {
  const names = new Set(cells.map(plainName));
  const found = new Set(cells.map(statementColumn));
  const needed = REQUIRED_COLUMNS.filter((column) => found.has(column)).length;
  return (names.has('record') && needed >= 3) || (names.has('service_from') && names.has('service_to') && needed >= 3);
}

export type StatementHeader = { at: Map<StatementColumn, number>; cells: string[] };

/** Places the columns of a header row, with a fault for every unknown, doubled or missing one. */
export function readStatementHeader(
  fileName: string,
  cells: string[],
  row: number,
): { header: StatementHeader; faults: Fault[]; complete: boolean } {
  const at = new Map<StatementColumn, number>();
  const faults: Fault[] = [];
  cells.forEach((cell, index) => {
    if (cell.trim() === '') return;
    const column = statementColumn(cell);
    if (column === null) {
      const near = nearestName(plainName(cell), STATEMENT_COLUMNS);
      const advice = near ? `Did you mean “${near}”?` : 'Take it out, or put its words into “note”.';
      const message = `Row ${row}: “${cell.trim().slice(0, 60)}” is not a column of this layout. ${advice}`;
      faults.push(fileFault(fileName, 'unknown-column', message, { row, column: cell.trim(), found: cell }));
    } else if (at.has(column)) {
      const message = `Row ${row}: the column “${column}” stands twice. Keep one of them.`;
      faults.push(fileFault(fileName, 'column-twice', message, { row, column: cell.trim(), found: cell }));
    } else {
      at.set(column, index);
    }
  });
  const missing = REQUIRED_COLUMNS.filter((column) => !at.has(column));
  for (const column of missing) {
    const message = `The column “${column}” is missing from row ${row}. Add it, as in the template.`;
    faults.push(fileFault(fileName, 'missing-column', message, { row, column }));
  }
  return { header: { at, cells: cells.map((cell) => cell.trim()) }, faults, complete: missing.length === 0 };
}
