import type { PaperSource } from '#shared/facts/papers.ts';
import { fullDate } from '#src/lib/format.ts';

/** Where the statement stands: its file and rows, or who typed it. */
export function placeWords(source: PaperSource): string {
  if (source.kind === 'typed') return `typed by ${source.by} on ${fullDate(source.on)}`;
  const rows =
    source.firstRow === source.lastRow ? `row ${source.firstRow}` : `rows ${source.firstRow}–${source.lastRow}`;
  return `${source.fileName}, ${rows}`;
}
