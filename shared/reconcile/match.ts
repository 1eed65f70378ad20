import type { PrintedLine } from '../facts/papers.ts';
import type { RatePlan } from '../settlement/plan.ts';

type Component = { id: string; kind: string; words: Set<string> };

/** Words must overlap by at least half to take a printed label for a component's. */
const LIKE_ENOUGH = 0.5;

/** Kinds no rate plan speaks of: other services, and the account's own movements. */
const OUTSIDE_PLAN: ReadonlySet<string> = new Set(['otherService', 'previousBalance', 'payment']);

/**
 * The plan's component for each printed line, in order; null where none fits. First what the line itself names; then the component of the same
 * kind whose label is most alike; then the only component of a kind for the only line of it left. Several printed lines may be one component: a
 * price that changes inside the cycle is printed once per part.
 */
export function matchLines(lines: readonly PrintedLine[], plan: RatePlan): (string | null)[] {
  const components = componentsOf(plan);
  const matched: (string | null)[] = lines.map(({ component: named }) =>
    named !== null && components.some((component) => component.id === named) ? named : null,
  );
  if (!matched.includes(null)) return matched;
  lines.forEach((line, at) => {
    if (matched[at] !== null || OUTSIDE_PLAN.has(line.kind)) return;
    const words = wordsOf(line.label);
    let best: { id: string; score: number } | null = null;
    for (const component of components) {
      if (component.kind !== line.kind) continue;
      const score = likeness(words, component.words);
      if (score >= LIKE_ENOUGH && (best === null || score > best.score)) best = { id: component.id, score };
    }
    if (best) matched[at] = best.id;
  });
  lines.forEach((line, at) => {
    if (matched[at] !== null || OUTSIDE_PLAN.has(line.kind)) return;
    const free = components.filter((c) => c.kind === line.kind && !matched.includes(c.id));
    const waiting = lines.filter((other, i) => matched[i] === null && other.kind === line.kind);
    const [only] = free;
    if (only && free.length === 1 && waiting.length === 1) matched[at] = only.id;
  });
  return matched;
}

const known = new WeakMap<RatePlan, readonly Component[]>();

/** The plan's components, looked up once per plan object; a plan is never changed in place. */
function componentsOf(plan: RatePlan): readonly Component[] {
  const made = known.get(plan) ?? listComponents(plan);
  known.set(plan, made);
  return made;
}

function listComponents(plan: RatePlan): Component[] {
  const components: Component[] = [];
  for (const charge of plan.charges) components.push(component(charge.id, charge.kind, charge.label));
  for (const credit of plan.credits) components.push(component(credit.id, credit.kind, credit.label));
  for (const bank of plan.banks) {
    if (bank.unit === 'USD' && bank.offsets.length > 0) components.push(component(bank.id, 'credit', bank.label));
    if (bank.trueUps.length > 0) components.push(component(bank.id, 'trueup', bank.label));
  }
  return components;
}

function component(id: string, kind: string, label: string): Component {
  return { id, kind, words: wordsOf(label) };
}

/** The words of a label, small letters, each once. */
export function wordsOf(label: string): Set<string> {
  return new Set(label.toLowerCase().match(/[\p{L}]+/gu) ?? []);
}

/** Dice's coefficient of two sets of words: 1 when equal, 0 when they share none. */
function likeness(a: ReadonlySet<string>, b: ReadonlySet<string>): number {
  if (a.size + b.size === 0) return 0;
  let shared = 0;
  for (const word of a) if (b.has(word)) shared += 1;
  return (2 * shared) / (a.size + b.size);
}
