import type { PlanInForce } from '#shared/facts/household.ts';
import { type RatePlan, ratePlanSchema } from '#shared/settlement/plan.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import type { FormFault } from './edit.ts';
import { planFormFaults } from './form-faults.ts';
import { emptyPlanForm } from './new-parts.ts';
import type { PlanForm } from './plan-form.ts';
import { planInput, planOf } from './plan-of.ts';
import { planFormOf } from './read-plan.ts';

/** A plan being written: since when it holds, and what it says, by questions or as JSON. */
export type PlanEntry = {
  from: string;
  written: 'questions' | 'json';
  form: PlanForm;
  json: string;
  /** The plan without a roof as it stands, kept untouched; empty for none. */
  withoutRoof: string;
};

/** What stands in the form for a plan: questions where they can say it exactly, else its JSON. */
export function entryOf(inForce: PlanInForce): PlanEntry {
  const form = planFormOf(inForce.plan);
  return {
    from: inForce.from,
    written: form ? 'questions' : 'json',
    form: form ?? emptyPlanForm(inForce.from),
    json: JSON.stringify(inForce.plan, null, 2),
    withoutRoof: inForce.withoutRoof ? JSON.stringify(inForce.withoutRoof) : '',
  };
}

export function emptyEntry(from: string): PlanEntry {
  return { from, written: 'questions', form: emptyPlanForm(from), json: '', withoutRoof: '' };
}

/** Another day for the plan to hold from; first prices that would begin only after it begin with it. */
export function holdingFrom(entry: PlanEntry, from: string): PlanEntry {
  const [first, ...later] = entry.form.prices;
  if (!first || (first.from !== '' && first.from !== entry.from && from >= first.from)) return { ...entry, from };
  const moved = first.from === '' || first.from === entry.from || from < first.from;
  return { ...entry, from, form: { ...entry.form, prices: [moved ? { ...first, from } : first, ...later] } };
}

/** A plan from JSON text, or what is wrong with it in a sentence. The server checks that it holds together. */
export function readPlanJson(text: string): RatePlan | string {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    return 'This is not JSON. Check for a missing comma, quote or brace.';
  }
  const parsed = ratePlanSchema.safeParse(value);
  if (parsed.success) return parsed.data;
  const issue = parsed.error.issues[0];
  return `At ${issue?.path.join(' › ') || 'the top'}: ${issue?.message ?? 'not a rate plan'}.`;
}

/** What is missing or does not read, by the path of its field. */
export function entryFaults(entry: PlanEntry): FormFault[] {
  const faults: FormFault[] = parseDay(entry.from) ? [] : [{ path: 'from', message: 'Choose a date.' }];
  if (entry.written === 'json') {
    const read = readPlanJson(entry.json);
    return typeof read === 'string' ? [...faults, { path: 'json', message: read }] : faults;
  }
  const found = planFormFaults(entry.form, entry.from).map(({ path, message }) => ({ path: `form.${path}`, message }));
  if (found.length > 0) return [...faults, ...found];
  const shape = ratePlanSchema.safeParse(planInput(entry.form, 'UTC'));
  return shape.success
    ? faults
    : [...faults, ...shape.error.issues.map(({ path, message }) => ({ path: `form.${path.join('.')}`, message }))];
}

/** The plan as far as it is written, for an example; a sentence where its JSON does not read. */
export function planSoFar(entry: PlanEntry, timeZone: string): unknown {
  return entry.written === 'json' ? readPlanJson(entry.json) : planInput(entry.form, timeZone);
}

/** The plan of an entry without faults. */
export function planOfEntry(entry: PlanEntry, timeZone: string): PlanInForce {
  const plan = entry.written === 'json' ? readPlanJson(entry.json) : planOf(entry.form, timeZone);
  if (typeof plan === 'string') throw new Error(`a checked plan does not read: ${plan}`);
  const without = entry.withoutRoof === '' ? null : readPlanJson(entry.withoutRoof);
  return { from: entry.from as Day, plan, withoutRoof: typeof without === 'string' ? null : without };
}

/** The other way of writing the same plan: as JSON from the questions, or as questions where they can say the JSON. */
export function writtenAs(entry: PlanEntry, written: PlanEntry['written'], timeZone: string): PlanEntry {
  if (written === 'json') return { ...entry, written, json: JSON.stringify(planInput(entry.form, timeZone), null, 2) };
  const read = readPlanJson(entry.json);
  const form = typeof read === 'string' ? null : planFormOf(read);
  return { ...entry, written, form: form ?? entry.form };
}

/** Whether questions can say the JSON as it stands. */
export function questionsCanSay(json: string): boolean {
  const read = readPlanJson(json);
  return typeof read !== 'string' && planFormOf(read) !== null;
}
