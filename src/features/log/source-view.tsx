import { type ReactNode, useEffect, useRef, useState } from 'react';
import type { SourceTable } from '#shared/api/log.ts';
import { isDatesColumn, isValueColumn, paperRows } from './source-rows.ts';

type Shown = {
  table: SourceTable;
  own: number[];
  /** Number of the doubt by row. */
  marks: Map<number, number>;
  active: number[];
};

/**
 * The file as it came, beside what was read: cells that were read are set off, doubtful ones marked, and the row of the value in hand is
 * outlined. One statement is laid out as a page; the whole file as the table it is. The box scrolls by itself, the page never sideways.
 */
export function SourceView({ fileName, ...shown }: Shown & { fileName: string }) {
  const { table, own, active } = shown;
  const [whole, setWhole] = useState(false);
  const box = useRef<HTMLElement>(null);
  const first = active[0];
  useEffect(() => {
    const frame = box.current;
    const row = first === undefined ? null : frame?.querySelector<HTMLElement>(`[data-row="${first}"]`);
    if (!frame || !row) return;
    const above = row.offsetTop - frame.scrollTop < 40;
    const below = row.offsetTop + row.offsetHeight > frame.scrollTop + frame.clientHeight;
    if (above || below) frame.scrollTop = row.offsetTop - frame.clientHeight / 3;
  }, [first]);
  const asTable = whole || own.length === 0;
  return (
    <div className="min-w-0">
      <p className="hint flex flex-wrap justify-between gap-x-5">
        <span>
          {fileName}
          {own.length > 0 && `, rows ${own[0]} to ${own.at(-1)}`}
        </span>
        {own.length > 0 && (
          <button type="button" className="link text-ink" aria-pressed={whole} onClick={() => setWhole(!whole)}>
            {whole ? 'this cycle' : 'whole file'}
          </button>
        )}
      </p>
      <section
        ref={box}
        // biome-ignore lint/a11y/noNoninteractiveTabindex: a box that scrolls must be reachable by keyboard
        tabIndex={0}
        aria-label="Rows of the file"
        className="relative mt-2 max-h-[60vh] overflow-auto border border-rule bg-field lg:max-h-[86vh]"
      >
        {asTable ? <WholeFile {...shown} /> : <Page {...shown} />}
      </section>
      {table.more > 0 && (
        <p className="hint mt-1">{table.more.toLocaleString('en-US')} more rows of the file are not shown.</p>
      )}
    </div>
  );
}

const ACTIVE = 'outline-2 -outline-offset-2 outline-accent';

function cellLook(doubtful: boolean): string {
  return doubtful ? 'bg-behind/15 outline outline-behind/60' : 'bg-doubt outline outline-doubt-rule/50';
}

function Page({ table, own, marks, active }: Shown) {
  return (
    <ol className="px-5 py-4 text-[14.5px]">
      {paperRows(table, own).map(({ row, words, values }) => {
        const mark = marks.get(row);
        return (
          <li
            key={row}
            data-row={row}
            className={`grid grid-cols-[30px_1fr_auto] items-baseline gap-x-2 py-1.5 ${active.includes(row) ? ACTIVE : ''}`}
          >
            <RowNumber row={row} mark={mark} />
            <span>{words.join(' · ')}</span>
            <span className="flex flex-wrap justify-end gap-x-2.5 gap-y-1">
              {values.map(({ column, text, dates }) => (
                <span
                  key={column}
                  title={column}
                  className={`px-1 whitespace-nowrap -outline-offset-1 ${cellLook(mark !== undefined && !dates)}`}
                >
                  <span className="visually-hidden">{column} </span>
                  {text}
                </span>
              ))}
            </span>
          </li>
        );
      })}
    </ol>
  );
}

function WholeFile({ table, own, marks, active }: Shown) {
  const columns = table.header
    .map((name, index) => ({ name, index }))
    .filter(({ index }) => table.rows.some((row) => (row.cells[index] ?? '').trim() !== ''));
  return (
    <table className="border-collapse text-[14px]">
      <thead>
        <tr>
          <Head corner>row</Head>
          {columns.map(({ name, index }) => (
            <Head key={index}>{name}</Head>
          ))}
        </tr>
      </thead>
      <tbody>
        {table.rows.map((row) => {
          const mark = marks.get(row.row);
          const mine = own.length === 0 || own.includes(row.row);
          const lookOf = (name: string, text: string) => {
            if (!mine || text.trim() === '' || !isValueColumn(name)) return '';
            return `text-right -outline-offset-1 ${cellLook(mark !== undefined && !isDatesColumn(name))}`;
          };
          return (
            <tr
              key={row.row}
              data-row={row.row}
              className={`border-t border-rule ${active.includes(row.row) ? ACTIVE : ''} ${mine ? '' : 'text-soft'}`}
            >
              <td className="sticky left-0 bg-field px-2 py-1">
                <RowNumber row={row.row} mark={mark} />
              </td>
              {columns.map(({ name, index }) => (
                <td key={index} className={`px-2.5 py-1 whitespace-nowrap ${lookOf(name, row.cells[index] ?? '')}`}>
                  {row.cells[index] ?? ''}
                </td>
              ))}
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

function Head({ children, corner = false }: { children: ReactNode; corner?: boolean }) {
  return (
    <th
      scope="col"
      className={`sticky top-0 bg-field px-2.5 py-1.5 text-left font-normal whitespace-nowrap text-soft ${corner ? 'left-0 z-2' : ''}`}
    >
      {children}
    </th>
  );
}

function RowNumber({ row, mark }: { row: number; mark: number | undefined }) {
  return mark === undefined ? <span className="text-soft">{row}</span> : <Mark number={mark} />;
}

/** The number that ties a doubtful value to its place in the file. */
export function Mark({ number }: { number: number }) {
  return (
    <span className="inline-grid size-[22px] place-items-center rounded-full bg-ink text-[12px] font-semibold text-sheet">
      {number}
    </span>
  );
}
