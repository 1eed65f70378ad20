import type { ChartConfiguration, ChartDataset } from 'chart.js';
import type { Cents } from '#shared/units/cents.ts';
import { dayNumber } from '#shared/units/day.ts';
import { money, monthYear } from '#src/lib/format.ts';
import { AXIS_WIDTH, dateOfTick, dayAxis, moneyAxis, niceStep, RIGHT_EDGE, tooltipLook } from '#src/ui/chart/axes.ts';
import { flagsPlugin } from '#src/ui/chart/flags.ts';
import { marksPlugin, zeroLinePlugin } from '#src/ui/chart/marks.ts';
import type { ChartTokens } from '#src/ui/chart/tokens.ts';
import type { RunningPoint, Series } from './chart-series.ts';

/** Settled today and cash so far: past solid, projection dashed. The phone's has settled today alone, without flags. */
export function runningChart(series: Series, tokens: ChartTokens, phone: boolean): ChartConfiguration<'line'> {
  const lines = [...series.past, ...series.projected];
  const values = [
    ...lines.flatMap((point) => (phone ? [point.settledCents] : [point.settledCents, point.cashCents])),
    ...series.band.flatMap((point) => [point.lowCents, point.highCents]),
  ];
  const low = Math.min(0, ...values) / 100;
  const high = Math.max(0, ...values) / 100;
  const step = niceStep(high - low, 4);
  const room = (high - low || 1) * 0.06;
  const now = series.past.at(-1);
  const flags = phone ? [] : series.events.map((event) => ({ x: dayNumber(event.on), number: event.number }));
  const evenMark =
    series.even && series.even <= series.last
      ? { x: dayNumber(series.even), y: 0, ...(phone ? {} : { label: `Even, ${monthYear(series.even)}` }) }
      : null;
  return {
    type: 'line',
    data: { datasets: datasets(series, tokens, phone) },
    options: {
      animation: false,
      responsive: true,
      maintainAspectRatio: false,
      layout: { padding: { top: flags.length > 0 ? 36 : 8, right: phone ? 4 : RIGHT_EDGE, bottom: 0 } },
      interaction: { mode: 'nearest', axis: 'x', intersect: false },
      scales: {
        x: dayAxis(series, tokens, phone ? 'years' : 'none', phone ? 4 : 20),
        y: moneyAxis(tokens, {
          min: low - (low < 0 ? room : 0),
          max: high + room,
          step,
          zero: 'even',
          width: phone ? 52 : AXIS_WIDTH,
          grid: true,
        }),
      },
      plugins: {
        tooltip: {
          ...tooltipLook(tokens),
          callbacks: {
            title: (items) => dateOfTick(items[0]?.parsed.x ?? 0),
            label: (item) => ` ${item.dataset.label ?? ''} ${money(Math.round((item.parsed.y ?? 0) * 100) as Cents)}`,
          },
        },
      },
    },
    plugins: [
      zeroLinePlugin(tokens),
      flagsPlugin(flags, tokens),
      marksPlugin({ now: now ? { x: dayNumber(now.on), y: now.settledCents / 100 } : null, even: evenMark }, tokens),
    ],
  };
}

function datasets(series: Series, tokens: ChartTokens, phone: boolean): ChartDataset<'line'>[] {
  const points = (of: RunningPoint[], key: 'settledCents' | 'cashCents') =>
    of.map((point) => ({ x: dayNumber(point.on), y: point[key] / 100 }));
  const plain = { pointRadius: 0, pointHoverRadius: 4, pointHitRadius: 8, borderCapStyle: 'round' as const };
  const settled = {
    ...plain,
    borderColor: tokens.color('--color-ink'),
    pointBackgroundColor: tokens.color('--color-ink'),
  };
  const cash = {
    ...plain,
    borderColor: tokens.color('--color-credit'),
    pointBackgroundColor: tokens.color('--color-credit'),
  };
  const dashed = { borderDash: [2, 5] };
  const shade = {
    target: { value: 0 },
    above: tokens.tint('--color-ahead', 0.08),
    below: tokens.tint('--color-behind', 0.08),
  };
  const settledLines: ChartDataset<'line'>[] = [
    {
      ...settled,
      label: 'settled',
      data: points(series.past, 'settledCents'),
      borderWidth: 3,
      fill: phone ? false : shade,
    },
    {
      ...settled,
      ...dashed,
      label: 'settled, projected',
      data: points(series.projected, 'settledCents'),
      borderWidth: 2.2,
    },
  ];
  const band = bandLines(series, tokens);
  if (phone) return [...settledLines, ...band];
  return [
    { ...cash, label: 'cash so far', data: points(series.past, 'cashCents'), borderWidth: 1.8 },
    {
      ...cash,
      ...dashed,
      label: 'cash so far, projected',
      data: points(series.projected, 'cashCents'),
      borderWidth: 1.6,
    },
    ...settledLines,
    ...band,
  ];
}

/** What eight of ten futures lie between: a shade from the lower line to the upper, drawn under the others. */
function bandLines(series: Series, tokens: ChartTokens): ChartDataset<'line'>[] {
  if (series.band.length === 0) return [];
  const plain = { pointRadius: 0, pointHitRadius: 0, pointHoverRadius: 0, borderWidth: 0, order: 1 };
  const points = (key: 'lowCents' | 'highCents') =>
    series.band.map((point) => ({ x: dayNumber(point.on), y: point[key] / 100 }));
  return [
    { ...plain, label: 'nine of ten futures above', data: points('lowCents'), fill: false },
    {
      ...plain,
      label: 'nine of ten futures below',
      data: points('highCents'),
      fill: '-1',
      backgroundColor: tokens.tint('--color-ink', 0.16),
    },
  ];
}
