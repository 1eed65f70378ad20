import Papa from 'papaparse';
import { isMissingMark, readScaled } from './amount-text.ts';
import { clockText, stampReader } from './stamp-text.ts';

export type Delimiter = ',' | ';' | '\t' | '|';
/** In order of preference where two divide a file equally well. */
const DELIMITERS: readonly Delimiter[] = [',', ';', '\t', '|'];
const PROBED_LINES = 120;
const MOST_SCORED_CELLS = 3000;

export type SheetRow = { row: number; cells: string[] };
export type Sheet = { delimiter: Delimiter; rows: SheetRow[]; openQuoteRow: number | null };

const anyStamp = (['ymd', 'mdy', 'dmy'] as const).map((order) => stampReader(order, null));

/** True for a date, with or without a time, in any order of day and month. */
export function looksLikeStamp(cell: string): boolean {
  return anyStamp.some((read) => read(cell) !== null);
}

export function looksLikeNumber(cell: string): boolean {
  return (
    /\d/.test(cell) && (typeof readScaled(cell, '.', 0) === 'number' || typeof readScaled(cell, ',', 0) === 'number')
  );
}

export function looksLikeClock(cell: string): boolean {
  return (
    /^\d{1,2}:\d{2}(:\d{2})?(\s*[ap]\.?m\.?)?$/i.test(cell.trim()) ||
    (/^\d{4}$/.test(cell.trim()) && clockText(cell) !== null)
  );
}

/**
 * How well a delimiter divides the probed lines: the share of lines with the commonest number of cells, times the share of their cells that
 * are each one thing (a date, a number, a mark for missing). A decimal comma taken for a delimiter leaves half dates and fails the second.
 */
function scoreOf(lines: string, delimiter: Delimiter): number {
  const rows = Papa.parse<string[]>(lines, { delimiter }).data.filter((cells) =>
    cells.some((cell) => cell.trim() !== ''),
  );
  const counts = new Map<number, number>();
  for (const cells of rows) counts.set(cells.length, (counts.get(cells.length) ?? 0) + 1);
  let width = 0;
  let most = 0;
  for (const [count, times] of counts) {
    if (count > 1 && times > most) {
      most = times;
      width = count;
    }
  }
  if (width === 0) return 0;
  let whole = 0;
  let cells = 0;
  for (const row of rows) {
    if (row.length !== width || cells > MOST_SCORED_CELLS) continue;
    for (const cell of row) {
      cells += 1;
      if (isMissingMark(cell) || looksLikeStamp(cell) || looksLikeClock(cell) || looksLikeNumber(cell)) whole += 1;
    }
  }
  return (most / rows.length) * (whole / cells);
}

function firstLines(text: string, count: number): string {
  let at = 0;
  for (let line = 0; line < count; line += 1) {
    const next = text.indexOf('\n', at);
    if (next < 0)
      return text.includes('\n') || !text.includes('\r') ? text : text.split('\r').slice(0, count).join('\r');
    at = next + 1;
  }
  return text.slice(0, at);
}

/** Cuts a file into rows of cells by the delimiter that divides it best; blank rows are left out. Null when none divides it. */
export function readSheet(text: string): Sheet | null {
  const lines = firstLines(text, PROBED_LINES).slice(0, 64_000);
  let best: Delimiter | null = null;
  let bestScore = 0;
  for (const delimiter of DELIMITERS) {
    const score = scoreOf(lines, delimiter);
    if (score > bestScore + 0.01) {
      bestScore = score;
      best = delimiter;
    }
  }
  if (best === null) return null;
  const parsed = Papa.parse<string[]>(text, { delimiter: best });
  const rows: SheetRow[] = [];
  parsed.data.forEach((cells, index) => {
    if (cells.some((cell) => cell !== '' && cell.trim() !== '')) rows.push({ row: index + 1, cells });
  });
  const open = parsed.errors.find((error) => error.type === 'Quotes');
  return { delimiter: best, rows, openQuoteRow: open ? (open.row ?? 0) + 1 : null };
}
