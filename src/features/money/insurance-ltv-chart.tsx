import { useCallback } from 'react';
import type { MortgageView } from '#shared/api/money-mortgage.ts';
import { CanvasChart } from '#src/ui/chart/canvas-chart.tsx';
import type { ChartTokens } from '#src/ui/chart/tokens.ts';
import { ltvChart } from './insurance-chart.ts';

/** The drawn chart, in a chunk of its own with Chart.js. */
export default function LtvChart({ view, summary, phone }: { view: MortgageView; summary: string; phone: boolean }) {
  const build = useCallback((tokens: ChartTokens) => ltvChart(view, tokens, phone), [view, phone]);
  return <CanvasChart label={summary} build={build} className={phone ? 'h-[220px]' : 'h-[300px]'} />;
}
