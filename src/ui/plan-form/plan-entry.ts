import type { PlanInForce } from '#shared/facts/household.ts';
import { type RatePlan, ratePlanSchema } from '#shared/settlement/plan.ts';
import { planWithoutRoof } from '#shared/settlement/without-roof.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import type { FormFault } from './edit.ts';
import { emptyText, type PlanText, planOfText, textFaults, textOf, textSoFar } from './plan-text.ts';

/** A plan being written: since when it holds, what it says, and the plan the house would have without a roof. */
export type PlanEntry = PlanText & {
  from: string;
  withoutRoof: 'same' | 'other';
  /** The other plan as written; kept while the same one is chosen. Null until it is asked for. */
  other: PlanText | null;
};

/** What stands in the form for a plan of a household. */
export function entryOf({ from, plan, withoutRoof }: PlanInForce): PlanEntry {
  return {
    ...textOf(plan, from),
    from,
    withoutRoof: withoutRoof ? 'other' : 'same',
    other: withoutRoof && textOf(withoutRoof, from),
  };
}

export function emptyEntry(from: string): PlanEntry {
  return { ...emptyText(from), from, withoutRoof: 'same', other: null };
}

/** Another day for the plan to hold from; first prices that would begin only after it begin with it. */
export function holdingFrom(entry: PlanEntry, from: string): PlanEntry {
  const other = entry.other && withFirstPrices(entry.other, entry.from, from);
  return { ...withFirstPrices(entry, entry.from, from), from, other };
}

function withFirstPrices<T extends PlanText>(text: T, before: string, from: string): T {
  const [first, ...later] = text.form.prices;
  if (!first || (first.from !== '' && first.from !== before && from >= first.from)) return text;
  return { ...text, form: { ...text.form, prices: [{ ...first, from }, ...later] } };
}

/** What is missing or does not read, by the path of its field; of the plan without a roof, under `other`. `taken`: days other plans begin on. */
export function entryFaults(entry: PlanEntry, taken: readonly string[] = []): FormFault[] {
  const other = entry.withoutRoof === 'other' && entry.other ? textFaults(entry.other, entry.from) : [];
  return [
    ...startFaults(entry.from, taken),
    ...textFaults(entry, entry.from),
    ...other.map(({ path, message }) => ({ path: `other.${path}`, message })),
  ];
}

function startFaults(from: string, taken: readonly string[]): FormFault[] {
  if (parseDay(from) === null) return [{ path: 'from', message: 'Choose a date.' }];
  if (!taken.includes(from)) return [];
  return [{ path: 'from', message: 'Another plan begins on this day. Change that one, or choose another day.' }];
}

/** The plan of an entry without faults. */
export function planOfEntry(entry: PlanEntry, timeZone: string): PlanInForce {
  const { from, withoutRoof, other } = entry;
  return {
    from: from as Day,
    plan: planOfText(entry, timeZone),
    withoutRoof: withoutRoof === 'other' && other ? planOfText(other, timeZone) : null,
  };
}

/** The plan so far without what is there because of the roof, and what that leaves out, by name; null while it does not hold its shape. */
export function ordinaryPlan(text: PlanText, timeZone: string): { plan: RatePlan; leftOut: string[] } | null {
  const read = ratePlanSchema.safeParse(textSoFar(text, timeZone));
  if (!read.success) return null;
  const plan = planWithoutRoof({ from: '' as Day, plan: read.data, withoutRoof: null });
  const kept = new Set(plan.charges.map(({ id }) => id));
  const gone = read.data.charges.filter(({ id }) => !kept.has(id));
  return { plan, leftOut: [...gone, ...read.data.credits, ...read.data.banks].map(({ label, id }) => label || id) };
}
