import { BOOKS } from '#shared/books/book.ts';
import { fullDate } from '#src/lib/format.ts';
import { BOOK_NAMES } from '#src/ui/book-key.tsx';
import { Money } from '#src/ui/money.tsx';
import type { BandPoint, Series } from './chart-series.ts';

/** The figures the charts draw, cycle by cycle and month by month. */
export function ChartTable({ series }: { series: Series }) {
  const [start] = series.past;
  const points = new Map(series.past.map((point) => [point.on, point]));
  const ahead = new Map(series.projected.map((point) => [point.on, point]));
  const past = series.bars.filter((bar) => !bar.projected);
  const rows = [...past, ...(series.since ? [series.since] : []), ...series.bars.filter((bar) => bar.projected)];
  const banded = new Map(series.band.slice(1).map((point) => [point.on, point]));
  const books = BOOKS.filter((book) => series.bars.some((bar) => bar.books[book] !== 0));
  return (
    <section
      className="mt-4 max-h-[460px] overflow-auto border-t border-rule"
      // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable by keyboard
      tabIndex={0}
      aria-label="The charts as a table"
    >
      <table className="ruled text-[15px] whitespace-nowrap">
        <caption className="visually-hidden">Running net position and what each cycle added</caption>
        <thead className="sticky top-0 bg-sheet">
          <tr>
            <th scope="col">To</th>
            <th scope="col">Settled today</th>
            {banded.size > 0 && <th scope="col">8 of 10 futures between</th>}
            <th scope="col">Cash so far</th>
            {books.map((book) => (
              <th key={book} scope="col">
                {BOOK_NAMES[book]}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {start && (
            <tr>
              <th scope="row">{fullDate(start.on)}, the start</th>
              <td>
                <Money cents={start.settledCents} />
              </td>
              {banded.size > 0 && <td />}
              <td>
                <Money cents={start.cashCents} />
              </td>
              {books.map((book) => (
                <td key={book} />
              ))}
            </tr>
          )}
          {rows.map((bar) => {
            const point = (bar.projected ? ahead : points).get(bar.on);
            return (
              <tr key={`${bar.on} ${bar.projected}`}>
                <th scope="row">
                  {fullDate(bar.on)}
                  {bar.projected && <span className="text-soft">, projected</span>}
                  {bar === series.since && <span className="text-soft">, since the last cycle</span>}
                </th>
                <td>
                  <Money cents={point?.settledCents ?? null} />
                </td>
                {banded.size > 0 && <td>{bar.projected && <Between point={banded.get(bar.on)} />}</td>}
                <td>
                  <Money cents={point?.cashCents ?? null} />
                </td>
                {books.map((book) => (
                  <td key={book}>
                    <Money cents={bar.books[book]} />
                  </td>
                ))}
              </tr>
            );
          })}
        </tbody>
      </table>
    </section>
  );
}

function Between({ point }: { point: BandPoint | undefined }) {
  if (point === undefined) return null;
  return (
    <>
      <Money cents={point.lowCents} /> to <Money cents={point.highCents} />
    </>
  );
}
