import type { Levers, Scenario } from '#shared/facts/scenario.ts';
import type { Outcome } from '#shared/try/outcome.ts';
import { type TryBasis, tryLevers } from '#shared/try/try-levers.ts';
import { sameLevers } from './draft.ts';
import { NO_LEVERS, type Shown } from './use-try.ts';

/** A change beside things as they stand: a column of the table, a line of the chart. */
export type Beside = { key: string; name: string; levers: Levers; outcome: Outcome; assumed: readonly string[] };

/** Changes that can stand side by side: more columns than this, and lines, are not told apart. */
export const MOST_BESIDE = 4;

export const TRIED_KEY = 'tried';

/** What the kept changes come to; one that cannot be pulled any more, as with a day gone by, says why. */
export function workedOut(
  tryBasis: TryBasis,
  scenarios: readonly Scenario[],
  ids: readonly string[],
): { beside: Beside[]; failed: { id: string; name: string; why: string }[] } {
  const beside: Beside[] = [];
  const failed: { id: string; name: string; why: string }[] = [];
  for (const { id, name, levers } of scenarios) {
    if (!ids.includes(id)) continue;
    const tried = tryLevers(tryBasis, levers);
    if (tried.ok) beside.push({ key: id, name, levers, outcome: tried.outcome, assumed: tried.assumed });
    else failed.push({ id, name, why: tried.why });
  }
  return { beside, failed };
}

/** The change being tried, where any lever is pulled, and after it the kept ones chosen; the same change stands once. */
export function sideBySide(shown: Shown | null, opened: Scenario | null, kept: readonly Beside[]): Beside[] {
  if (shown === null || sameLevers(shown.levers, NO_LEVERS)) return kept.slice(0, MOST_BESIDE);
  const isOpened = opened !== null && sameLevers(opened.levers, shown.levers);
  const tried = { key: TRIED_KEY, name: isOpened ? opened.name : 'This change', ...shown };
  return [tried, ...kept.filter((one) => !(isOpened && one.key === opened.id))].slice(0, MOST_BESIDE);
}
