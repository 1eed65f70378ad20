import * as z from 'zod/mini';
import type { PlanInForce } from '#shared/facts/household.ts';
import { type RatePlan, ratePlanSchema } from '#shared/settlement/plan.ts';
import type { Opening } from '#shared/settlement/settlement.ts';
import type { Day } from '#shared/units/day.ts';
import { plainDecimal, typed, typedWhole } from '#src/lib/typed-values.ts';
import { emptyPlanForm, type PlanForm, planOf, pricesAsked } from './plan-form.ts';
import { planFormOf } from './plan-form-read.ts';

const label = z.string().check(z.trim(), z.minLength(1, { error: 'Name it as the statement does.' }), z.maxLength(120));
const asIs = z.string();

const questions = z.object({
  name: z.string().check(z.maxLength(120)),
  exportRule: z.enum(['priced', 'pricedAfterNetting', 'carried', 'nothing']),
  prices: z.array(
    z.object({ from: asIs, energy: asIs, exported: asIs, customer: asIs, gross: asIs, taxPercent: asIs }),
  ),
  customerPer: z.enum(['cycle', 'day']),
  hasCustomer: z.boolean(),
  hasGross: z.boolean(),
  hasTax: z.boolean(),
  taxOnEnergy: z.boolean(),
  taxOnCustomer: z.boolean(),
  taxOnGross: z.boolean(),
  taxAfterCredits: z.boolean(),
  spendOn: z.enum(['energy', 'all']),
  spendWhen: z.enum(['same', 'next']),
  lapse: z.enum(['never', 'expire', 'pay']),
  lapseMonth: typedWhole(1, 12),
  payTo: z.enum(['bill', 'separate']),
  payRate: asIs,
  priceChange: z.enum(['days', 'readDate']),
  labels: z.object({ energy: label, customer: label, gross: label, tax: label, credit: label, bank: label }),
  ids: z.object({ energy: asIs, customer: asIs, gross: asIs, tax: asIs, credit: asIs, bank: asIs }),
  order: z.array(z.enum(['energy', 'customer', 'gross', 'tax'])),
});

const MISSING = {
  energy: 'Write the price of a kWh bought, such as 0.1684.',
  exported: 'Write the price of a kWh sent out, such as 0.0950.',
  customer: 'Write the customer charge, such as 14.50.',
  gross: 'Write the charge on each kWh bought, such as 0.0061.',
  taxPercent: 'Write the tax in percent, such as 3.1.',
} as const;

function checkPrices(form: PlanForm): { path: (string | number)[]; message: string }[] {
  const faults: { path: (string | number)[]; message: string }[] = [];
  form.prices.forEach((row, index) => {
    const before = form.prices[index - 1];
    if (!typed.day.safeParse(row.from).success) {
      faults.push({ path: ['prices', index, 'from'], message: 'Choose the day these prices began.' });
    } else if (before && before.from >= row.from) {
      faults.push({ path: ['prices', index, 'from'], message: 'Later prices begin on a later day.' });
    }
    for (const name of pricesAsked(form)) {
      const text = row[name].replace('%', '');
      const blank = text.trim() === '';
      if (blank ? index === 0 : plainDecimal(text) === null) {
        faults.push({ path: ['prices', index, name], message: MISSING[name] });
      }
    }
  });
  return faults;
}

const entry = z
  .object({
    from: typed.day,
    written: z.enum(['questions', 'json']),
    form: questions,
    json: z.string(),
    /** The plan without a roof as it stands, kept untouched; empty for none. */
    withoutRoof: z.string(),
  })
  .check((context) => {
    const { written, form, json } = context.value;
    const push = (path: (string | number)[], message: string) =>
      context.issues.push({ code: 'custom', input: context.value, path, message });
    if (written === 'json') {
      const read = readPlanJson(json);
      if (typeof read === 'string') push(['json'], read);
      return;
    }
    for (const fault of checkPrices(form)) push(['form', ...fault.path], fault.message);
    if (form.exportRule === 'carried' && form.lapse === 'pay' && plainDecimal(form.payRate) === null) {
      push(['form', 'payRate'], 'Write what is paid for a leftover kWh, such as 0.04.');
    }
    const taxed = form.taxOnEnergy || (form.taxOnCustomer && form.hasCustomer) || (form.taxOnGross && form.hasGross);
    if (form.hasTax && !taxed) push(['form', 'taxOnEnergy'], 'Say what the tax is on.');
  });

export const planEntries = z.object({
  plans: z.array(entry).check(z.minLength(1)),
  /** What the first bank held before the first cycle, in its unit. */
  openingBank: typed.rateOrNone,
  openingBalance: typed.moneyOrNone,
});
export type PlanEntries = z.infer<typeof planEntries>;
export type PlanEntry = PlanEntries['plans'][number];

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

/** The plan of an entry that has passed its schema. */
export function planOfEntry(one: PlanEntry, timeZone: string): PlanInForce {
  const plan = one.written === 'json' ? readPlanJson(one.json) : planOf(one.form, timeZone);
  if (typeof plan === 'string') throw new Error(`a checked plan does not read: ${plan}`);
  const without = one.withoutRoof === '' ? null : readPlanJson(one.withoutRoof);
  return { from: one.from as Day, plan, withoutRoof: typeof without === 'string' ? null : without };
}

/** The opening with the first bank's credit and the account's balance as typed; whatever else it holds stays. */
export function openingWith(
  opening: Opening,
  bank: string | null,
  credit: string,
  balanceCents: Opening['balanceCents'],
): Opening {
  const text = plainDecimal(credit);
  if (bank === null) return { ...opening, balanceCents };
  const { [bank]: _, ...others } = opening.banks;
  return { ...opening, balanceCents, banks: text === null ? others : { ...others, [bank]: text } };
}
