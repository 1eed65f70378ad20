import { type Cents, dollarsText } from '#shared/units/cents.ts';

/** A cell: words (never taken for a formula), an amount in dollars, a whole number, or nothing. */
export type Cell = string | number | { cents: Cents } | null;

/** What makes a spreadsheet take a text for a formula (OWASP, CSV injection), and the NUL that some stop at. */
const FORMULA = /^[=+\-@\t\r\n\0]/;

function cellText(cell: Cell): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return String(cell);
  if (typeof cell === 'object') return dollarsText(cell.cents);
  const safe = FORMULA.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** Rows as CSV (RFC 4180), with a mark at the start by which spreadsheets know UTF-8. */
export function csvText(rows: readonly (readonly Cell[])[]): string {
  return `\ufeff${rows.map((row) => row.map(cellText).join(',')).join('\r\n')}\r\n`;
}
