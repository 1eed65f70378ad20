import type { ChartConfiguration, Plugin } from 'chart.js';
import type { Cents } from '#shared/units/cents.ts';
import { type Day, dayNumber, latestDay } from '#shared/units/day.ts';
import { money, monthYear } from '#src/lib/format.ts';
import { AXIS_WIDTH, dateOfTick, dayAxis, moneyAxis, niceStep, tooltipLook } from '#src/ui/chart/axes.ts';
import { marksPlugin, zeroLinePlugin } from '#src/ui/chart/marks.ts';
import { spreadMarks } from '#src/ui/chart/spread.ts';
import type { ChartTokens } from '#src/ui/chart/tokens.ts';
import type { TryLine } from './try-lines.ts';

/** The lines under one zero; the ring stands where the first of the changes, or else the base, comes even. */
export function tryChart(lines: readonly TryLine[], tokens: ChartTokens, phone: boolean): ChartConfiguration<'line'> {
  const values = lines.flatMap((line) => line.outcome.months.map((month) => month.settledTodayCents));
  const low = Math.min(0, ...values) / 100;
  const high = Math.max(0, ...values) / 100;
  const room = (high - low || 1) * 0.06;
  const span = lineSpan(lines);
  const marked = lines[1] ?? lines[0];
  const even = marked?.outcome.evenOn ?? null;
  const isDrawn = even !== null && span !== null && even >= span.first && even <= span.last;
  return {
    type: 'line',
    data: {
      datasets: lines.map(({ name, look, outcome }) => ({
        label: name,
        data: outcome.months.map((month) => ({ x: dayNumber(month.on), y: month.settledTodayCents / 100 })),
        borderColor: tokens.color(look.token),
        pointBackgroundColor: tokens.color(look.token),
        borderDash: [...look.dash],
        borderWidth: look.width,
        pointRadius: 0,
        pointHoverRadius: 4,
        pointHitRadius: 8,
        // The base is drawn last and thin, so that where two lines run together both are seen.
        order: look.letter === '' ? 0 : 1,
      })),
    },
    options: {
      animation: false,
      responsive: true,
      maintainAspectRatio: false,
      layout: { padding: { top: 8, right: lines.length > 2 ? 24 : 12, bottom: 0 } },
      interaction: { mode: 'index', axis: 'x', intersect: false },
      scales: {
        x: span ? dayAxis(span, tokens, 'years', phone ? 4 : 9) : { display: false },
        y: moneyAxis(tokens, {
          min: low - (low < 0 ? room : 0),
          max: high + room,
          step: niceStep(high - low, 4),
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
      marksPlugin(
        {
          now: null,
          even: isDrawn ? { x: dayNumber(even), y: 0, ...(phone ? {} : { label: `Even, ${monthYear(even)}` }) } : null,
        },
        tokens,
      ),
      lettersPlugin(lines, tokens),
    ],
  };
}

/** The letter of each line at its end, nudged apart, once there is more than one change. */
function lettersPlugin(lines: readonly TryLine[], tokens: ChartTokens): Plugin<'line'> {
  return {
    id: 'letters',
    afterDatasetsDraw(chart) {
      const { x, y } = chart.scales;
      if (!x || !y || lines.length < 3) return;
      const ends = lines
        .flatMap(({ look, outcome }) => {
          const last = outcome.months.at(-1);
          if (look.letter === '' || last === undefined) return [];
          return [
            { look, x: x.getPixelForValue(dayNumber(last.on)), y: y.getPixelForValue(last.settledTodayCents / 100) },
          ];
        })
        .sort((a, b) => a.y - b.y);
      const heights = spreadMarks(
        ends.map((end) => end.y),
        15,
        chart.chartArea.top,
        chart.chartArea.bottom,
      );
      const { ctx } = chart;
      ctx.save();
      ctx.font = `600 14px ${tokens.fontFamily}`;
      ctx.textAlign = 'left';
      ctx.textBaseline = 'middle';
      for (const [index, end] of ends.entries()) {
        ctx.fillStyle = tokens.color(end.look.token);
        ctx.fillText(end.look.letter, end.x + 7, heights[index] ?? end.y);
      }
      ctx.restore();
    },
  };
}

/** The days that the lines cover; null where there is none. */
export function lineSpan(lines: readonly TryLine[]): { first: Day; last: Day } | null {
  const first = lines[0]?.outcome.months[0]?.on;
  const ends = lines.flatMap((line) => line.outcome.months.at(-1)?.on ?? []);
  if (first === undefined) return null;
  return { first, last: latestDay(first, ...ends) };
}
