import type { SourceTable } from '#shared/api/log.ts';
import type { Fault } from '#shared/problem.ts';

/** Rows a table shows at most; the file itself is kept whole. */
const MOST_ROWS = 400;

/**
 * A file's rows as they stand, up to 400: from the top, but rows with faults always find room, since they are what the owner looks for.
 */
export function sourceTable(
  header: string[],
  rows: { row: number; cells: string[] }[],
  faults: readonly Fault[],
): SourceTable {
  const byRow = new Map<number, Fault[]>();
  for (const fault of faults) {
    if (fault.row === null) continue;
    const known = byRow.get(fault.row);
    if (known) known.push(fault);
    else byRow.set(fault.row, [fault]);
  }
  let room = Math.max(0, MOST_ROWS - rows.filter((row) => byRow.has(row.row)).length);
  const shown: SourceTable['rows'] = [];
  for (const { row, cells } of rows) {
    const faultsHere = byRow.get(row);
    if (shown.length >= MOST_ROWS) break;
    if (faultsHere === undefined) {
      if (room <= 0) continue;
      room -= 1;
    }
    shown.push({ row, cells, faults: faultsHere ?? [] });
  }
  return { header, rows: shown, more: rows.length - shown.length };
}
