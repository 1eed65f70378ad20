import type { CycleRow } from '#shared/api/cycles.ts';
import type { CycleState } from '#shared/ledger/cycle.ts';
import { fullDate } from '#src/lib/format.ts';
import { stateWords } from './state-words.ts';

export type CycleFilter = { state: CycleState | null; year: string | null; text: string };

/** The rows a filter lets through. A text is looked for in the dates in words, the state and what differs. */
export function filterCycles(rows: readonly CycleRow[], filter: CycleFilter): CycleRow[] {
  const words = filter.text.trim().toLowerCase();
  return rows.filter(
    (row) =>
      (filter.state === null || row.state === filter.state) &&
      (filter.year === null || row.to.startsWith(filter.year)) &&
      (words === '' || searchable(row).includes(words)),
  );
}

function searchable(row: CycleRow): string {
  return [fullDate(row.from), fullDate(row.to), row.from, row.to, stateWords(row), row.differs ?? '']
    .join(' ')
    .toLowerCase();
}

/** The years the cycles end in, newest first. */
export function yearsOf(rows: readonly CycleRow[]): string[] {
  return [...new Set(rows.map((row) => row.to.slice(0, 4)))].sort().reverse();
}

/** A sum over rows, and how many of them had nothing to add. */
export function sumOf(
  rows: readonly CycleRow[],
  of: (row: CycleRow) => number | null,
): { total: number; missing: number } {
  let total = 0;
  let missing = 0;
  for (const row of rows) {
    const value = of(row);
    if (value === null) missing += 1;
    else total += value;
  }
  return { total, missing };
}

/** "26 cycles, 24 balanced, 1 differs" as its parts. */
export function countByState(rows: readonly CycleRow[]): { head: string; rest: string } {
  const count = (state: CycleState) => rows.filter((row) => row.state === state).length;
  const parts: string[] = [];
  const balanced = count('balanced');
  const accepted = count('accepted');
  const differs = count('differs');
  const open = count('open');
  if (balanced > 0) parts.push(`${balanced === rows.length ? 'all' : balanced} balanced`);
  if (accepted > 0) parts.push(`${accepted} accepted`);
  if (differs > 0) parts.push(`${differs} ${differs === 1 ? 'differs' : 'differ'}`);
  if (open > 0) parts.push(`${open} open`);
  return { head: `${rows.length} ${rows.length === 1 ? 'cycle' : 'cycles'}`, rest: parts.join(', ') };
}
