import type { Outcome } from '#shared/try/outcome.ts';
import { dollars, monthYear } from '#src/lib/format.ts';
import type { Beside } from './beside.ts';
import { BASE_LOOK, changeLook, type LineLook } from './line-look.ts';

/** Settled today month by month, as one line of the chart. */
export type TryLine = { key: string; name: string; look: LineLook; outcome: Outcome };

export const BASE_NAME = 'As things stand';

export function tryLines(base: Outcome, beside: readonly Beside[]): TryLine[] {
  return [
    { key: 'base', name: BASE_NAME, look: BASE_LOOK, outcome: base },
    ...beside.map((one, index) => ({ key: one.key, name: one.name, look: changeLook(index), outcome: one.outcome })),
  ];
}

/** What the chart shows, for those who cannot see it. */
export function linesSummary(lines: readonly TryLine[]): string {
  const said = lines.map(({ name, outcome }) => {
    const last = outcome.months.at(-1);
    const end = last ? `, ${dollars(last.settledTodayCents)} in ${monthYear(last.on)}` : '';
    return `${name}: ${outcome.evenOn ? `even in ${monthYear(outcome.evenOn)}` : 'not even within the months projected'}${end}`;
  });
  return `Settled today, month by month. ${said.join('. ')}.`;
}
