import { useEffect, useMemo, useState } from 'react';
import { type Levers, leversSchema } from '#shared/facts/scenario.ts';
import type { Outcome } from '#shared/try/outcome.ts';
import { type TryBasis, tryLevers } from '#shared/try/try-levers.ts';
import type { ValueFault } from '#src/lib/form.ts';
import { type Draft, storeDraft, storedDraft } from './draft.ts';
import { type LeverName, type LeverTexts, untouched } from './lever-texts.ts';
import { readLevers } from './read-levers.ts';

/** Levers and what they come to. */
export type Shown = { levers: Levers; outcome: Outcome; assumed: readonly string[] };
type Stepped = {
  faults: readonly ValueFault[];
  /** Null until something could be worked out. */
  shown: Shown | null;
};

export const NO_LEVERS: Levers = leversSchema.parse({});
/** The name under which each step's time stands in the browser's performance timeline. */
export const STEP_MEASURE = 'try-step';

/** One step: the texts read and the projection made anew. Where that cannot be, what was shown stands, beside the faults. */
function step(tryBasis: TryBasis, texts: LeverTexts, before: Shown | null): Stepped {
  const start = performance.now();
  const reading = readLevers(texts, tryBasis.basis.facts.plans);
  if (!reading.ok) return { faults: reading.faults, shown: before };
  const tried = tryLevers(tryBasis, reading.body);
  performance.measure(STEP_MEASURE, { start, end: performance.now() });
  if (tried.ok) return { faults: [], shown: { levers: reading.body, outcome: tried.outcome, assumed: tried.assumed } };
  const faults = tried.faults.map(({ field, message }) => ({ path: field, message }));
  return { faults: faults.length > 0 ? faults : [{ path: '', message: tried.why }], shown: before };
}

/** The levers of this tab, and what they come to, recomputed on every input. */
export function useTry(householdId: string, tryBasis: TryBasis) {
  const rest = useMemo(() => untouched(tryBasis.basis), [tryBasis]);
  const base = useMemo(() => tryLevers(tryBasis, NO_LEVERS), [tryBasis]);
  const [draft, setDraft] = useState<Draft>(() => storedDraft(householdId, rest));
  const [stepped, setStepped] = useState(() => ({ of: tryBasis, ...step(tryBasis, draft.texts, null) }));
  const [left, setLeft] = useState<ReadonlySet<string>>(new Set());
  useEffect(() => storeDraft(householdId, draft), [householdId, draft]);
  // The record moved on behind the page: the same levers on the new basis.
  if (stepped.of !== tryBasis) setStepped({ of: tryBasis, ...step(tryBasis, draft.texts, null) });

  const put = (next: Partial<Draft>) => {
    const whole = { ...draft, ...next };
    setDraft(whole);
    if (next.texts) setStepped({ of: tryBasis, ...step(tryBasis, whole.texts, stepped.shown) });
  };
  const set = <N extends LeverName>(name: N, part: Partial<LeverTexts[N]>) =>
    put({ texts: { ...draft.texts, [name]: { ...draft.texts[name], ...part } } });
  const reset = (name: LeverName) => put({ texts: { ...draft.texts, [name]: rest[name] } });
  const resetAll = () => put({ texts: rest, openedId: null });
  /** A fault is said once its field was left; one of a lever as a whole at once. */
  const errorAt = (path: string) =>
    left.has(path) || !path.includes('.') ? stepped.faults.find((fault) => fault.path === path)?.message : undefined;
  const leave = (path: string) => {
    if (!left.has(path)) setLeft(new Set([...left, path]));
  };
  return { draft, put, set, reset, resetAll, errorAt, leave, rest, base, faults: stepped.faults, shown: stepped.shown };
}
export type Tryout = ReturnType<typeof useTry>;
