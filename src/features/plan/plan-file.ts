import { type PlanInForce, planInForce } from '#shared/facts/household.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { emptyEntry, entryOf, type PlanEntry } from '#src/ui/plan-form/plan-entry.ts';
import { readPlanJson } from '#src/ui/plan-form/plan-text.ts';

/** A plan as a file of its own; with its day and the plan without a roof where one is stated, so that neither is lost. */
export function planText(one: PlanInForce): string {
  return `${JSON.stringify(one.withoutRoof === null ? one.plan : one, null, 2)}\n`;
}

export function planFileName(plan: RatePlan, from: string): string {
  const name = plan.name
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '');
  return `${name || 'rate-plan'}-${from}.json`;
}

/** What a file or pasted text says: a plan, or a plan with the day it holds from. A text that is none stays as JSON, with its fault said there. */
export function entryOfText(text: string, from: string): PlanEntry {
  const dated = readDated(text);
  if (dated) return entryOf(dated);
  const plan = readPlanJson(text);
  if (typeof plan === 'string') return { ...emptyEntry(from), written: 'json', json: text };
  const first = plan.charges[0]?.rates[0]?.from;
  const entry = entryOf({ from: first ?? ('' as never), plan, withoutRoof: null });
  return { ...entry, from: from || entry.from };
}

function readDated(text: string) {
  try {
    const read = planInForce.safeParse({ withoutRoof: null, ...JSON.parse(text) });
    return read.success ? read.data : null;
  } catch {
    return null;
  }
}
