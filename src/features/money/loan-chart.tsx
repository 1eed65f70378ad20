import { useCallback } from 'react';
import { CanvasChart } from '#src/ui/chart/canvas-chart.tsx';
import type { ChartTokens } from '#src/ui/chart/tokens.ts';
import type { LoanYear } from './loan-years.ts';
import { yearsChart } from './loan-years-chart.ts';

/** The drawn chart, in a chunk of its own with Chart.js. */
export default function LoanChart({ years, summary, phone }: { years: LoanYear[]; summary: string; phone: boolean }) {
  const build = useCallback(
    (tokens: ChartTokens, context: CanvasRenderingContext2D) => yearsChart(years, tokens, context, phone),
    [years, phone],
  );
  return <CanvasChart label={summary} build={build} className={phone ? 'h-[220px]' : 'h-[260px]'} />;
}
