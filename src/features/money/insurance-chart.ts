import type { ChartConfiguration, ChartDataset } from 'chart.js';
import type { MortgageScheduleRow, MortgageView } from '#shared/api/money-mortgage.ts';
import { type Day, dayFromNumber, dayNumber, yearOf } from '#shared/units/day.ts';
import { fullDate } from '#src/lib/format.ts';
import { flagsPlugin } from '#src/ui/chart/flags.ts';
import type { ChartTokens } from '#src/ui/chart/tokens.ts';
import type { LtvFlag } from './insurance-days.ts';

/** What is drawn: put together by the page, so that the chart's own chunk needs nothing of the page's. */
export type LtvDrawn = { view: MortgageView; rows: MortgageScheduleRow[]; flags: LtvFlag[] };

/** Loan-to-value over time: of the original value, by the initial schedule, and of the last value stated, under the two thresholds. */
export function ltvChart(
  { view, rows, flags: given }: LtvDrawn,
  tokens: ChartTokens,
  phone: boolean,
): ChartConfiguration<'line'> {
  const first = rows[0];
  const last = rows.at(-1);
  const percents = rows.map((row) => (row.balanceCents / view.facts.originalValueCents) * 100);
  const latest = view.latest;
  const ofLatest = latest ? rows.filter((row) => row.on >= latest.on) : [];
  const all = [...percents, ...ofLatest.map((row) => (row.balanceCents / (latest?.valueCents ?? 1)) * 100), 80, 78];
  const flags = phone ? [] : given;
  const min = Math.floor((Math.min(...all) - 1) / 5) * 5;
  const max = Math.ceil((Math.max(...all) + 1) / 5) * 5;
  return {
    type: 'line',
    data: { datasets: datasets(view, rows, tokens) },
    options: {
      animation: false,
      responsive: true,
      maintainAspectRatio: false,
      layout: { padding: { top: flags.length > 0 ? 36 : 8, right: 12 } },
      interaction: { mode: 'nearest', axis: 'x', intersect: false },
      scales: {
        x: {
          type: 'linear',
          min: first ? dayNumber(first.on) : 0,
          max: last ? dayNumber(last.on) : 1,
          border: { display: false },
          grid: { display: false },
          afterBuildTicks: (scale) => {
            scale.ticks = yearTicks(rows, phone ? 4 : 7).map((value) => ({ value }));
          },
          ticks: {
            autoSkip: false,
            maxRotation: 0,
            color: tokens.color('--color-soft'),
            font: { family: tokens.fontFamily, size: 14 },
            callback: (value) => dayFromNumber(Math.round(Number(value))).slice(0, 4),
          },
        },
        y: {
          type: 'linear',
          min,
          max,
          border: { display: false },
          grid: {
            drawTicks: false,
            color: (context) => tokens.color(isThreshold(context.tick?.value) ? '--color-insurance' : '--color-rule'),
            lineWidth: (context) => (isThreshold(context.tick?.value) ? 1.6 : 1),
          },
          afterBuildTicks: (scale) => {
            const values = [78, 80];
            for (let value = min; value <= max; value += 5) if (Math.abs(value - 79) > 2) values.push(value);
            scale.ticks = values.sort((a, b) => a - b).map((value) => ({ value }));
          },
          ticks: {
            autoSkip: false,
            padding: 8,
            color: (context) => tokens.color(isThreshold(context.tick?.value) ? '--color-ink' : '--color-soft'),
            font: (context) => ({
              family: tokens.fontFamily,
              size: 14,
              weight: isThreshold(context.tick?.value) ? 600 : 400,
            }),
            // Where both thresholds would stand on each other, the upper one is named.
            callback: (value) => (value === 78 && (phone || max - min > 34) ? '' : `${value} %`),
          },
        },
      },
      plugins: {
        tooltip: {
          backgroundColor: tokens.color('--color-ink'),
          titleColor: tokens.color('--color-sheet'),
          bodyColor: tokens.color('--color-sheet'),
          titleFont: { family: tokens.fontFamily, size: 14, weight: 600 },
          bodyFont: { family: tokens.fontFamily, size: 14 },
          displayColors: false,
          callbacks: {
            title: (items) => fullDate(dayFromNumber(Math.round(items[0]?.parsed.x ?? 0))),
            label: (item) => ` ${item.dataset.label ?? ''} ${Math.ceil((item.parsed.y ?? 0) * 100) / 100} %`,
          },
        },
      },
    },
    plugins: [
      flagsPlugin(
        flags.map(({ on, number }) => ({ x: dayNumber(on), number })),
        tokens,
      ),
    ],
  };
}

function isThreshold(value: number | undefined): boolean {
  return value === 80 || value === 78;
}

function datasets(view: MortgageView, rows: MortgageScheduleRow[], tokens: ChartTokens): ChartDataset<'line'>[] {
  const { latest } = view;
  const original = view.facts.originalValueCents;
  const points = (from: MortgageScheduleRow[], cents: (row: MortgageScheduleRow) => number, value: number) =>
    from.map((row) => ({ x: dayNumber(row.on), y: (cents(row) / value) * 100 }));
  const now = rows.findLastIndex((row) => row.past);
  const past = rows.slice(0, now + 1);
  const ahead = rows.slice(Math.max(0, now));
  const plain = { pointRadius: 0, pointHoverRadius: 4, pointHitRadius: 8 };
  const ink = { ...plain, borderColor: tokens.color('--color-ink'), pointBackgroundColor: tokens.color('--color-ink') };
  const credit = {
    ...plain,
    borderColor: tokens.color('--color-credit'),
    pointBackgroundColor: tokens.color('--color-credit'),
  };
  const soft = {
    ...plain,
    borderColor: tokens.color('--color-soft'),
    pointBackgroundColor: tokens.color('--color-soft'),
  };
  const lines: ChartDataset<'line'>[] = [
    {
      ...ink,
      label: 'of the original value',
      data: points(past, (row) => row.balanceCents, original),
      borderWidth: 2.8,
    },
    {
      ...ink,
      label: 'of the original value, to come',
      data: points(ahead, (row) => row.balanceCents, original),
      borderWidth: 2.2,
      borderDash: [2, 5],
    },
  ];
  if (rows.some((row) => row.balanceCents !== row.initialCents)) {
    lines.push({
      ...soft,
      label: 'by the initial schedule',
      data: points(rows, (row) => row.initialCents, original),
      borderWidth: 1.4,
      borderDash: [7, 4],
    });
  }
  if (latest) {
    lines.push({
      ...credit,
      label: 'of the last value stated',
      data: points(
        rows.filter((row) => row.on >= latest.on),
        (row) => row.balanceCents,
        latest.valueCents,
      ),
      borderWidth: 1.8,
    });
  }
  return lines;
}

/** First of July of every so many years, about `most` of them. */
function yearTicks(rows: readonly MortgageScheduleRow[], most: number): number[] {
  const first = rows[0];
  const last = rows.at(-1);
  if (!first || !last) return [];
  const step = Math.max(1, Math.ceil((yearOf(last.on) - yearOf(first.on) + 1) / most));
  const ticks: number[] = [];
  for (let year = yearOf(first.on); year <= yearOf(last.on); year += step) {
    const x = dayNumber(`${year}-07-01` as Day);
    if (x >= dayNumber(first.on) && x <= dayNumber(last.on) - 90) ticks.push(x);
  }
  return ticks;
}
