import { useCallback } from 'react';
import type { BookId } from '#shared/books/book.ts';
import { BOOK_NAMES, BookKey } from '#src/ui/book-key.tsx';
import { CanvasChart } from '#src/ui/chart/canvas-chart.tsx';
import type { ChartTokens } from '#src/ui/chart/tokens.ts';
import { type Series, stackedBooks } from './chart-series.ts';
import { eachCycleChart } from './each-cycle-chart.ts';
import { runningChart } from './running-chart.ts';

/** The drawn charts. A chunk of its own: Chart.js loads after the sentence and the table stand on the page. */
export default function Charts({ series, summary, phone }: { series: Series; summary: string; phone: boolean }) {
  const running = useCallback((tokens: ChartTokens) => runningChart(series, tokens, phone), [series, phone]);
  const each = useCallback(
    (tokens: ChartTokens, context: CanvasRenderingContext2D) => eachCycleChart(series, tokens, context),
    [series],
  );
  if (phone) return <CanvasChart label={summary} build={running} className="h-[230px]" />;
  return (
    <>
      <CanvasChart label={summary} build={running} className="h-[296px]" />
      <div className="mt-5 flex flex-wrap items-baseline gap-x-5 pl-16">
        <h3 className="text-[15px]!">Each cycle</h3>
        {keysOf(stackedBooks(series)).map(({ book, name }) => (
          <span key={book} className="hint text-sm!">
            <BookKey book={book} />
            {name}
          </span>
        ))}
        {series.bars.some((bar) => bar.books.credit > 0) && (
          <span className="hint text-sm!">
            <i className="mr-1.5 text-credit not-italic" aria-hidden="true">
              ▲
            </i>
            {BOOK_NAMES.credit}
          </span>
        )}
      </div>
      <CanvasChart
        label={`What each cycle added and cost, by book, from ${series.first} to ${series.last}. The figures are in the table.`}
        build={each}
        className="h-[190px]"
      />
    </>
  );
}

/** The books' keys; upkeep and other costs share a colour and so a key. */
function keysOf(books: readonly BookId[]): { book: BookId; name: string }[] {
  const both = books.includes('upkeep') && books.includes('costs');
  return books
    .filter((book) => !(both && book === 'costs'))
    .map((book) => ({ book, name: both && book === 'upkeep' ? 'Upkeep and other costs' : BOOK_NAMES[book] }));
}
