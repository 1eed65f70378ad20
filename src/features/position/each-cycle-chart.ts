import type { ChartConfiguration, ChartDataset, Plugin } from 'chart.js';
import type { BookId } from '#shared/books/book.ts';
import type { Cents } from '#shared/units/cents.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { BOOK_NAMES, BOOK_TOKENS } from '#src/ui/book-key.tsx';
import { AXIS_WIDTH, dayAxis, moneyAxis, niceStep, RIGHT_EDGE, tooltipLook } from '#src/ui/chart/axes.ts';
import { hatch } from '#src/ui/chart/hatch.ts';
import { zeroLinePlugin } from '#src/ui/chart/marks.ts';
import type { ChartTokens } from '#src/ui/chart/tokens.ts';
import { BAR_BOOKS, barHeights, barMiddle, barScale, type CycleBar, type Series } from './chart-series.ts';

/** What each cycle added by book: above zero kept or received, below it paid. Past solid, projected hatched, tax credits as triangles. */
export function eachCycleChart(
  series: Series,
  tokens: ChartTokens,
  context: CanvasRenderingContext2D,
): ChartConfiguration<'bar', { x: number; y: number }[]> {
  const { bars } = series;
  const scale = barScale(bars);
  const up = (scale.upCents / 100) * 1.06 || 1;
  const down = (scale.downCents / 100) * 1.06;
  return {
    type: 'bar',
    data: { datasets: BAR_BOOKS.flatMap((book) => bookDataset(book, bars, tokens, context)) },
    options: {
      animation: false,
      responsive: true,
      maintainAspectRatio: false,
      layout: { padding: { top: 18, right: RIGHT_EDGE } },
      interaction: { mode: 'index', axis: 'x', intersect: false },
      scales: {
        x: { ...dayAxis(series, tokens, 'years', 20), stacked: true, offset: false },
        y: {
          ...moneyAxis(tokens, {
            min: -down,
            max: up,
            step: niceStep(up + down, 4),
            zero: '$0',
            width: AXIS_WIDTH,
            grid: false,
          }),
          stacked: true,
        },
      },
      plugins: {
        tooltip: {
          ...tooltipLook(tokens),
          filter: (item) => (item.parsed.y ?? 0) !== 0,
          callbacks: {
            title: (items) => {
              const bar = bars[items[0]?.dataIndex ?? -1];
              return bar
                ? `${bar.projected ? 'Month' : 'Cycle'} to ${fullDate(bar.on)}${bar.projected ? ', projected' : ''}`
                : '';
            },
            label: (item) => `${item.dataset.label ?? ''} ${money(Math.round((item.parsed.y ?? 0) * 100) as Cents)}`,
            footer: (items) => {
              const bar = bars[items[0]?.dataIndex ?? -1];
              if (!bar) return '';
              const added = `Added ${money(bar.addedCents)}`;
              return bar.books.credit === 0 ? added : [`${BOOK_NAMES.credit} ${money(bar.books.credit)}`, added];
            },
          },
        },
      },
    },
    plugins: [zeroLinePlugin(tokens) as Plugin<'bar'>, trianglesPlugin(bars, up, down, tokens)],
  };
}

function bookDataset(
  book: BookId,
  bars: readonly CycleBar[],
  tokens: ChartTokens,
  context: CanvasRenderingContext2D,
): ChartDataset<'bar', { x: number; y: number }[]>[] {
  if (bars.every((bar) => bar.books[book] === 0)) return [];
  const color = tokens.color(BOOK_TOKENS[book]);
  const light = hatch(context, color, tokens.color('--color-sheet'));
  return [
    {
      label: BOOK_NAMES[book],
      data: bars.map((bar) => ({ x: barMiddle(bar), y: bar.books[book] / 100 })),
      backgroundColor: bars.map((bar) => (bar.projected ? light : color)),
      barThickness: 'flex',
      maxBarThickness: 14,
      barPercentage: 0.92,
      categoryPercentage: 1,
      stack: 'all',
    },
  ];
}

/** A triangle over each bar with a tax credit, and one at the edge where a bar was cut. */
function trianglesPlugin(bars: readonly CycleBar[], up: number, down: number, tokens: ChartTokens): Plugin<'bar'> {
  return {
    id: 'triangles',
    afterDatasetsDraw(chart) {
      const { x, y } = chart.scales;
      if (!x || !y) return;
      const { ctx, chartArea } = chart;
      const triangle = (at: number, tip: number, height: number, color: string) => {
        ctx.fillStyle = color;
        ctx.beginPath();
        ctx.moveTo(at, tip);
        ctx.lineTo(at + 5, tip + height);
        ctx.lineTo(at - 5, tip + height);
        ctx.fill();
      };
      ctx.save();
      for (const bar of bars) {
        const heights = barHeights(bar);
        const at = x.getPixelForValue(barMiddle(bar));
        const top = y.getPixelForValue(Math.min(heights.upCents / 100, up));
        if (bar.books.credit > 0) triangle(at, top - 14, 9, tokens.color('--color-credit'));
        if (heights.downCents / 100 > down) triangle(at, chartArea.bottom + 1, -8, tokens.color('--color-sheet'));
        if (heights.upCents / 100 > up) triangle(at, chartArea.top - 1, 8, tokens.color('--color-sheet'));
      }
      ctx.restore();
    },
  };
}
