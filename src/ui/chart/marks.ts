import type { Chart, Plugin } from 'chart.js';
import type { ChartTokens } from './tokens.ts';

/** The heavy line at zero, over the grid and under the data. */
export function zeroLinePlugin(tokens: ChartTokens): Plugin {
  return {
    id: 'zeroLine',
    beforeDatasetsDraw(chart) {
      const y = chart.scales.y?.getPixelForValue(0);
      if (y === undefined || y < chart.chartArea.top || y > chart.chartArea.bottom + 1) return;
      const { ctx, chartArea } = chart;
      ctx.save();
      ctx.strokeStyle = tokens.color('--color-ink');
      ctx.lineWidth = 1.6;
      ctx.beginPath();
      ctx.moveTo(chartArea.left, y);
      ctx.lineTo(chartArea.right, y);
      ctx.stroke();
      ctx.restore();
    },
  };
}

type Mark = { x: number; y: number; label?: string };

/** The dot where the past ends, and the ring where the projection comes even. */
export function marksPlugin(marks: { now: Mark | null; even: Mark | null }, tokens: ChartTokens): Plugin {
  return {
    id: 'marks',
    afterDatasetsDraw(chart) {
      if (marks.now) drawDot(chart, marks.now, tokens);
      if (marks.even) drawRing(chart, marks.even, tokens);
    },
  };
}

function place(chart: Chart, mark: Mark): { x: number; y: number } {
  return { x: chart.scales.x?.getPixelForValue(mark.x) ?? 0, y: chart.scales.y?.getPixelForValue(mark.y) ?? 0 };
}

function drawDot(chart: Chart, mark: Mark, tokens: ChartTokens): void {
  const { x, y } = place(chart, mark);
  const { ctx } = chart;
  ctx.save();
  ctx.fillStyle = tokens.color('--color-ink');
  ctx.beginPath();
  ctx.arc(x, y, 5.5, 0, Math.PI * 2);
  ctx.fill();
  ctx.restore();
}

function drawRing(chart: Chart, mark: Mark, tokens: ChartTokens): void {
  const { x, y } = place(chart, mark);
  const { ctx, chartArea } = chart;
  ctx.save();
  ctx.strokeStyle = tokens.color('--color-ahead');
  ctx.fillStyle = tokens.color('--color-sheet');
  ctx.lineWidth = 3;
  ctx.beginPath();
  ctx.arc(x, y, 6, 0, Math.PI * 2);
  ctx.fill();
  ctx.stroke();
  if (mark.label) {
    ctx.font = `600 15px ${tokens.fontFamily}`;
    ctx.fillStyle = tokens.color('--color-ahead');
    ctx.textBaseline = 'middle';
    ctx.textAlign = 'center';
    const half = ctx.measureText(mark.label).width / 2;
    const middle = Math.min(Math.max(x, chartArea.left + half), chartArea.right - half);
    // Under the line, on a patch of paper, so that neither the line nor the grid runs through the words.
    ctx.lineWidth = 4;
    ctx.strokeStyle = tokens.color('--color-sheet');
    ctx.strokeText(mark.label, middle, y + 23);
    ctx.fillText(mark.label, middle, y + 23);
  }
  ctx.restore();
}
