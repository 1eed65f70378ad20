import { type RatePlan, ratePlanSchema } from '#shared/settlement/plan.ts';
import type { FormFault } from './edit.ts';
import { planFormFaults } from './form-faults.ts';
import { emptyPlanForm } from './new-parts.ts';
import type { PlanForm } from './plan-form.ts';
import { planInput, planOf } from './plan-of.ts';
import { planFormOf } from './read-plan.ts';

/** What a plan being written says, by questions or as JSON. */
export type PlanText = { written: 'questions' | 'json'; form: PlanForm; json: string };

/** What stands in the form for a plan: questions where they can say it exactly, else its JSON. */
export function textOf(plan: RatePlan, from: string): PlanText {
  const form = planFormOf(plan);
  return {
    written: form ? 'questions' : 'json',
    form: form ?? emptyPlanForm(from),
    json: JSON.stringify(plan, null, 2),
  };
}

export function emptyText(from: string): PlanText {
  return { written: 'questions', form: emptyPlanForm(from), json: '' };
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

/** What is missing or does not read in a plan that holds from a day, by the path of its field. */
export function textFaults(text: PlanText, from: string): FormFault[] {
  if (text.written === 'json') {
    const read = readPlanJson(text.json);
    return typeof read === 'string' ? [{ path: 'json', message: read }] : [];
  }
  const found = planFormFaults(text.form, from);
  const shape = found.length > 0 ? null : ratePlanSchema.safeParse(planInput(text.form, 'UTC'));
  const issues = shape?.success === false ? shape.error.issues : [];
  const misshapen = issues.map(({ path, message }) => ({ path: path.join('.'), message }));
  return [...found, ...misshapen].map(({ path, message }) => ({ path: `form.${path}`, message }));
}

/** The plan as far as it is written; a sentence where its JSON does not read. */
export function textSoFar({ written, json, form }: PlanText, timeZone: string): unknown {
  return written === 'json' ? readPlanJson(json) : planInput(form, timeZone);
}

/** The plan of a text without faults. */
export function planOfText({ written, json, form }: PlanText, timeZone: string): RatePlan {
  const plan = written === 'json' ? readPlanJson(json) : planOf(form, timeZone);
  if (typeof plan === 'string') throw new Error(`a checked plan does not read: ${plan}`);
  return plan;
}

/** The other way of writing the same plan: as JSON from the questions, or as questions where they can say the JSON. */
export function writtenAs<T extends PlanText>(text: T, written: PlanText['written'], timeZone: string): T {
  if (written === 'json') return { ...text, written, json: JSON.stringify(planInput(text.form, timeZone), null, 2) };
  const read = readPlanJson(text.json);
  const form = typeof read === 'string' ? null : planFormOf(read);
  return { ...text, written, form: form ?? text.form };
}

/** Whether questions can say the JSON as it stands. */
export function questionsCanSay(json: string): boolean {
  const read = readPlanJson(json);
  return typeof read !== 'string' && planFormOf(read) !== null;
}
