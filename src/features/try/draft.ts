import * as z from 'zod/mini';
import type { Levers } from '#shared/facts/scenario.ts';
import { LEVER_NAMES, type LeverTexts } from './lever-texts.ts';

/** What is being tried in this tab: it outlives a reload, and closes with the tab. */
export type Draft = {
  texts: LeverTexts;
  /** The kept change that was opened, by id. */
  openedId: string | null;
  /** Kept changes set beside the one being tried, by id. */
  besideIds: string[];
};

const stored = z.object({
  texts: z.record(z.string(), z.record(z.string(), z.union([z.string(), z.boolean()]))),
  openedId: z.nullable(z.string()),
  besideIds: z.array(z.string()),
});

const keyOf = (householdId: string) => `gablebook.try.${householdId}`;

export function storeDraft(householdId: string, draft: Draft): void {
  try {
    sessionStorage.setItem(keyOf(householdId), JSON.stringify(draft));
  } catch {
    // A browser that keeps nothing: the page works, and a reload begins anew.
  }
}

/** The draft as it was left. What is missing or of another kind in it, as after a change of this page, is as untouched. */
export function storedDraft(householdId: string, untouched: LeverTexts): Draft {
  const fresh: Draft = { texts: untouched, openedId: null, besideIds: [] };
  try {
    return draftOf(JSON.parse(sessionStorage.getItem(keyOf(householdId)) ?? ''), untouched);
  } catch {
    return fresh;
  }
}

export function draftOf(value: unknown, untouched: LeverTexts): Draft {
  const read = stored.safeParse(value);
  if (!read.success) return { texts: untouched, openedId: null, besideIds: [] };
  const { texts, openedId, besideIds } = read.data;
  const merged = LEVER_NAMES.map((name) => {
    const plain: Record<string, string | boolean> = untouched[name];
    const given = texts[name] ?? {};
    const same = Object.entries(plain).map(([key, now]) => [key, typeof given[key] === typeof now ? given[key] : now]);
    return [name, Object.fromEntries(same)];
  });
  return { texts: Object.fromEntries(merged) as LeverTexts, openedId, besideIds };
}

export function sameLevers(a: Levers, b: Levers): boolean {
  return JSON.stringify(a) === JSON.stringify(b);
}
