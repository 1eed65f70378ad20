import type { Plugin } from 'chart.js';
import { spreadMarks } from './spread.ts';
import type { ChartTokens } from './tokens.ts';

const RADIUS = 10;
const GAP = RADIUS * 2 + 3;

/** Numbered flags above the chart, each with a dotted line down to its day; flags that would touch are nudged apart. */
export function flagsPlugin(flags: { x: number; number: number }[], tokens: ChartTokens): Plugin {
  return {
    id: 'flags',
    afterDatasetsDraw(chart) {
      const scale = chart.scales.x;
      if (!scale) return;
      const { ctx, chartArea } = chart;
      const at = flags.map((flag) => scale.getPixelForValue(flag.x));
      const heads = spreadMarks(at, GAP, chartArea.left, chartArea.right - RADIUS);
      const top = chartArea.top - RADIUS - 12;
      ctx.save();
      ctx.font = `600 13px ${tokens.fontFamily}`;
      ctx.textAlign = 'center';
      ctx.textBaseline = 'middle';
      ctx.lineWidth = 1;
      for (const [index, flag] of flags.entries()) {
        const x = at[index] ?? 0;
        const head = heads[index] ?? x;
        ctx.strokeStyle = tokens.tint('--color-soft', 0.7);
        ctx.setLineDash([1, 4]);
        ctx.beginPath();
        ctx.moveTo(head, top + RADIUS);
        ctx.lineTo(x, chartArea.top);
        ctx.lineTo(x, chartArea.bottom);
        ctx.stroke();
        ctx.setLineDash([]);
        ctx.strokeStyle = tokens.color('--color-soft');
        ctx.fillStyle = tokens.color('--color-sheet');
        ctx.beginPath();
        ctx.arc(head, top, RADIUS, 0, Math.PI * 2);
        ctx.fill();
        ctx.stroke();
        ctx.fillStyle = tokens.color('--color-ink');
        ctx.fillText(String(flag.number), head, top + 1);
      }
      ctx.restore();
    },
  };
}
