import type { ChartConfiguration } from 'chart.js';
import { useEffect, useRef } from 'react';
import { Chart } from './register.ts';
import { type ChartTokens, readTokens, watchTokens } from './tokens.ts';

/**
 * A chart on a canvas, drawn anew when its data, the theme or the medium changes. `label` states the finding, since a canvas says nothing to
 * a reader who cannot see it; the figures themselves stand in a table beside it. `build` must keep its identity while nothing changed.
 */
export function CanvasChart({
  label,
  build,
  className,
}: {
  label: string;
  build: (tokens: ChartTokens, context: CanvasRenderingContext2D) => ChartConfiguration;
  className: string;
}) {
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const context = canvas.current?.getContext('2d');
    if (!context) return;
    let chart: Chart | null = null;
    const draw = () => {
      chart?.destroy();
      chart = new Chart(context, build(readTokens(), context));
    };
    draw();
    // The canvas does not know when a web font arrives; text measured before would stand askew.
    let gone = false;
    void document.fonts.ready.then(() => {
      if (!gone) chart?.update('none');
    });
    const unwatch = watchTokens(draw);
    return () => {
      gone = true;
      unwatch();
      chart?.destroy();
    };
  }, [build]);
  return (
    <div className={`relative ${className}`}>
      <canvas ref={canvas} role="img" aria-label={label} />
    </div>
  );
}
