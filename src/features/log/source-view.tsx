import { useEffect, useRef, useState } from 'react';
import type { StatementBody } from '#shared/api/cycles.ts';
import type { SourceTable } from '#shared/api/log.ts';

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
const plainName = (name: string) =>
  name
    .trim()
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '_');

/** The rows of a file that belong to one statement: those its values name, and their neighbours with the same service dates. */
export function rowsOfStatement(table: SourceTable, statement: StatementBody): number[] {
  const named = [...statement.reads, ...statement.lines, ...statement.banks].flatMap((part) => part.row ?? []);
  const first = table.rows.find((row) => named.includes(row.row));
  if (!first) return [];
  const at = ['service_from', 'service_to'].map((name) => table.header.findIndex((cell) => plainName(cell) === name));
  const dates = (row: SourceTable['rows'][number]) => at.map((index) => row.cells[index] ?? '').join(' ');
  const own = dates(first);
  return table.rows.filter((row) => named.includes(row.row) || dates(row) === own).map((row) => row.row);
}

/**
 * The file as it came, beside what was read: cells that were read are set off, doubtful ones marked, and the row of the value in hand is
 * outlined. The box scrolls by itself; the page never does sideways.
 */
export function SourceView({
  fileName,
  table,
  own,
  marks,
  active,
}: {
  fileName: string;
  table: SourceTable;
  own: number[];
  /** Number of the doubt by row. */
  marks: Map<number, number>;
  active: number[];
}) {
  const [whole, setWhole] = useState(false);
  const box = useRef<HTMLElement>(null);
  const rows = whole || own.length === 0 ? table.rows : table.rows.filter((row) => own.includes(row.row));
  const columns = table.header
    .map((name, index) => ({ name, index }))
    .filter(({ index }) => rows.some((row) => (row.cells[index] ?? '').trim() !== ''));
  const first = active[0];
  useEffect(() => {
    const frame = box.current;
    const row = first === undefined ? null : frame?.querySelector<HTMLElement>(`[data-row="${first}"]`);
    if (!frame || !row) return;
    const above = row.offsetTop - frame.scrollTop < 40;
    const below = row.offsetTop + row.offsetHeight > frame.scrollTop + frame.clientHeight;
    if (above || below) frame.scrollTop = row.offsetTop - frame.clientHeight / 3;
  }, [first]);
  return (
    <div className="min-w-0">
      <p className="hint flex flex-wrap justify-between gap-x-5">
        <span>
          {fileName}
          {own.length > 0 && `, rows ${own[0]} to ${own.at(-1)}`}
        </span>
        {own.length > 0 && own.length < table.rows.length && (
          <button type="button" className="link text-ink" aria-pressed={whole} onClick={() => setWhole(!whole)}>
            {whole ? 'this cycle only' : 'whole file'}
          </button>
        )}
      </p>
      <section
        ref={box}
        // biome-ignore lint/a11y/noNoninteractiveTabindex: a box that scrolls must be reachable by keyboard
        tabIndex={0}
        aria-label="Rows of the file"
        className="relative mt-2 max-h-[70vh] overflow-auto border border-rule bg-field"
      >
        <table className="border-collapse text-[14px]">
          <thead>
            <tr>
              <th className="sticky top-0 left-0 z-2 bg-field px-2 py-1.5 text-left font-normal text-soft">row</th>
              {columns.map(({ name, index }) => (
                <th
                  key={index}
                  className="sticky top-0 bg-field px-2.5 py-1.5 text-left font-normal whitespace-nowrap text-soft"
                >
                  {name}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => {
              const mark = marks.get(row.row);
              const mine = own.length === 0 || own.includes(row.row);
              return (
                <tr
                  key={row.row}
                  data-row={row.row}
                  className={`border-t border-rule ${active.includes(row.row) ? 'outline-2 -outline-offset-2 outline-accent' : ''} ${mine ? '' : 'text-soft'}`}
                >
                  <td className="sticky left-0 bg-field px-2 py-1 text-soft">
                    {mark === undefined ? row.row : <Mark number={mark} />}
                  </td>
                  {columns.map(({ name, index }) => {
                    const cell = row.cells[index] ?? '';
                    const read = mine && cell.trim() !== '' && VALUE_COLUMNS.has(plainName(name));
                    const look = !read
                      ? ''
                      : mark !== undefined && !/^service/.test(plainName(name))
                        ? 'bg-behind/15 outline outline-behind/60 -outline-offset-1'
                        : 'bg-doubt';
                    return (
                      <td key={index} className={`px-2.5 py-1 whitespace-nowrap ${read ? 'text-right' : ''} ${look}`}>
                        {cell}
                      </td>
                    );
                  })}
                </tr>
              );
            })}
          </tbody>
        </table>
      </section>
      {table.more > 0 && (
        <p className="hint mt-1">{table.more.toLocaleString('en-US')} more rows of the file are not shown.</p>
      )}
    </div>
  );
}

/** The number that ties a doubtful value to its place in the file. */
export function Mark({ number }: { number: number }) {
  return (
    <span className="inline-grid size-[22px] place-items-center rounded-full bg-ink text-[12px] font-semibold text-sheet">
      {number}
    </span>
  );
}
