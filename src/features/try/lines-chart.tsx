import { useCallback } from 'react';
import { CanvasChart } from '#src/ui/chart/canvas-chart.tsx';
import type { ChartTokens } from '#src/ui/chart/tokens.ts';
import { tryChart } from './try-chart.ts';
import type { TryLine } from './try-lines.ts';

/** The drawn chart, in a chunk of its own with Chart.js. */
export default function LinesChart({
  lines,
  summary,
  phone,
}: {
  lines: readonly TryLine[];
  summary: string;
  phone: boolean;
}) {
  const build = useCallback((tokens: ChartTokens) => tryChart(lines, tokens, phone), [lines, phone]);
  return <CanvasChart label={summary} build={build} className={phone ? 'h-[230px]' : 'h-[320px]'} />;
}
