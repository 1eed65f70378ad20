import type { PaperSource } from '../facts/papers.ts';
import { decimalTextOf, type Exact } from '../units/rate.ts';
import type { Source, WorkingInput } from '../working.ts';

/** Where a value of a statement was read: its row of the file (or the statement's rows), or who typed it. */
export function paperSourceOf(source: PaperSource, row: number | null): Source {
  if (source.kind === 'typed') return { kind: 'typed', by: source.by, on: source.on };
  const rows =
    source.firstRow === source.lastRow ? `row ${source.firstRow}` : `rows ${source.firstRow}–${source.lastRow}`;
  return {
    kind: 'document',
    documentId: source.documentId,
    fileName: source.fileName,
    place: row === null ? rows : `row ${row}`,
  };
}

/** An input of a working, from text or an exact number. */
export function input(
  name: string,
  label: string,
  value: string | string[] | Exact,
  unit: string,
  source: Source,
): WorkingInput {
  const text = typeof value === 'string' || Array.isArray(value) ? value : decimalTextOf(value);
  return { name, label, value: text, unit, source };
}

/** A figure of this ledger, named as a source. */
export function ownFigure(name: string): Source {
  return { kind: 'figure', name };
}
