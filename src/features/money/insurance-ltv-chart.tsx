import { useCallback } from 'react';
import { CanvasChart } from '#src/ui/chart/canvas-chart.tsx';
import type { ChartTokens } from '#src/ui/chart/tokens.ts';
import { type LtvDrawn, ltvChart } from './insurance-chart.ts';

/** The drawn chart, in a chunk of its own with Chart.js. `drawn` must keep its identity while nothing changed. */
export default function LtvChart({ drawn, summary, phone }: { drawn: LtvDrawn; summary: string; phone: boolean }) {
  const build = useCallback((tokens: ChartTokens) => ltvChart(drawn, tokens, phone), [drawn, phone]);
  return <CanvasChart label={summary} build={build} className={phone ? 'h-[220px]' : 'h-[300px]'} />;
}
