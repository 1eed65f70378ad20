import type { ChartConfiguration, ChartDataset } from 'chart.js';
import type { Cents } from '#shared/units/cents.ts';
import { money } from '#src/lib/format.ts';
import { AXIS_WIDTH, moneyAxis, niceStep, RIGHT_EDGE, tooltipLook } from '#src/ui/chart/axes.ts';
import { hatch } from '#src/ui/chart/hatch.ts';
import { zeroLinePlugin } from '#src/ui/chart/marks.ts';
import type { ChartTokens } from '#src/ui/chart/tokens.ts';
import type { LoanYear } from './loan-years.ts';

type Point = { x: number; y: number };

/** Principal and interest paid in each year, one on the other; years to come are hatched. */
export function yearsChart(
  years: readonly LoanYear[],
  tokens: ChartTokens,
  context: CanvasRenderingContext2D,
  phone: boolean,
): ChartConfiguration<'bar', Point[]> {
  const numbers = years.map(({ year }) => Number(year));
  const high = Math.max(1, ...years.map((year) => year.paidCents / 100));
  const low = Math.min(0, ...years.map((year) => year.principalCents / 100));
  const every = Math.max(1, Math.ceil(years.length / (phone ? 5 : 14)));
  return {
    type: 'bar',
    data: {
      datasets: [
        bars('principal', years, 'principalCents', tokens, context, '--color-loan'),
        bars('interest', years, 'interestCents', tokens, context, '--color-doubt-rule'),
      ],
    },
    options: {
      animation: false,
      responsive: true,
      maintainAspectRatio: false,
      layout: { padding: { top: 10, right: phone ? 4 : RIGHT_EDGE } },
      interaction: { mode: 'nearest', axis: 'x', intersect: false },
      scales: {
        x: {
          type: 'linear',
          stacked: true,
          min: Math.min(...numbers) - 0.6,
          max: Math.max(...numbers) + 0.6,
          border: { display: false },
          grid: { display: false },
          afterBuildTicks: (scale) => {
            scale.ticks = numbers.filter((_, index) => index % every === 0).map((value) => ({ value }));
          },
          ticks: {
            autoSkip: false,
            maxRotation: 0,
            color: tokens.color('--color-soft'),
            font: { family: tokens.fontFamily, size: 14 },
            callback: (value) => String(value),
          },
        },
        y: {
          stacked: true,
          ...moneyAxis(tokens, {
            min: low,
            max: high * 1.05,
            step: niceStep(high - low, 4),
            zero: '$0',
            width: phone ? 52 : AXIS_WIDTH,
            grid: true,
          }),
        },
      },
      plugins: {
        tooltip: {
          ...tooltipLook(tokens),
          callbacks: {
            title: (items) => String(items[0]?.parsed.x ?? ''),
            label: (item) => ` ${item.dataset.label ?? ''} ${money(Math.round((item.parsed.y ?? 0) * 100) as Cents)}`,
          },
        },
      },
    },
    plugins: [zeroLinePlugin(tokens)],
  };
}

function bars(
  label: string,
  years: readonly LoanYear[],
  key: 'principalCents' | 'interestCents',
  tokens: ChartTokens,
  context: CanvasRenderingContext2D,
  token: string,
): ChartDataset<'bar', Point[]> {
  const solid = tokens.color(token);
  const ahead = hatch(context, solid, tokens.color('--color-sheet'));
  return {
    label,
    data: years.map((year) => ({ x: Number(year.year), y: year[key] / 100 })),
    backgroundColor: years.map((year) => (year.past ? solid : ahead)),
    barPercentage: 0.82,
    categoryPercentage: 1,
  };
}
