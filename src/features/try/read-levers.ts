import type { PlanInForce } from '#shared/facts/household.ts';
import { type Levers, leversSchema } from '#shared/facts/scenario.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { type Cents, parseDollars, ZERO_CENTS } from '#shared/units/cents.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import { parseKwh, ZERO_WH } from '#shared/units/energy.ts';
import { FaultList, type Reading } from '#src/lib/form.ts';
import { fractionOfPercent, MONEY_FAULT } from '#src/lib/typed-values.ts';
import { type LeverTexts, PASTED } from './lever-texts.ts';

const NOTHING = leversSchema.parse({});
const DATE_FAULT = 'Choose a date.';
const PERCENT_FAULT = 'Write a percent such as 2.5.';
const NO_DAY = '1970-01-01' as Day;

/** The levers that the texts say, or every fault by its path (`paydown.on`). A lever that is let go is not read. */
export function readLevers(texts: LeverTexts, plans: readonly PlanInForce[]): Reading<Levers> {
  const list = new FaultList();
  const day = (text: string, path: string) => list.needed(text, parseDay, path, DATE_FAULT, NO_DAY);
  const fromZero = (text: string, path: string) => list.needed(text, notNegative, path, MONEY_FAULT, ZERO_CENTS);
  // The bounds of a percent are the engine's to say.
  const percent = (text: string, path: string) => list.needed(text, fractionOfPercent, path, PERCENT_FAULT, '0');
  const whole = (text: string, least: number, most: number, path: string) =>
    list.needed(text, wholeWithin(least, most), path, `Write a whole number from ${least} to ${most}.`, least);
  const { paydown, refinance, priceRise, exportCut, plan, moreUse, degradation, replacement, sale } = texts;
  const levers: Levers = { ...NOTHING, cash: texts.cash.pulled };
  if (paydown.pulled) {
    levers.paydown = {
      on: day(paydown.on, 'paydown.on'),
      amountCents: list.needed(
        paydown.amountCents,
        aboveZero,
        'paydown.amountCents',
        'Write an amount above zero, such as 1,204.50.',
        ZERO_CENTS,
      ),
      reamortize: paydown.reamortize,
    };
  }
  if (refinance.pulled) {
    levers.refinance = {
      on: day(refinance.on, 'refinance.on'),
      annualRate: percent(refinance.annualRate, 'refinance.annualRate'),
      termMonths: whole(refinance.termMonths, 1, 480, 'refinance.termMonths'),
      costsCents: fromZero(refinance.costsCents, 'refinance.costsCents'),
    };
  }
  if (priceRise.pulled) levers.priceRise = percent(priceRise.percent, 'priceRise');
  if (exportCut.pulled) {
    levers.exportCut = {
      from: day(exportCut.from, 'exportCut.from'),
      keep: percent(exportCut.keep, 'exportCut.keep'),
    };
  }
  if (plan.pulled) {
    const from = day(plan.from, 'plan.from');
    const chosen = planChosen(plan, plans);
    if (typeof chosen === 'string') list.add(plan.which === PASTED ? 'plan.json' : 'plan.which', chosen);
    else levers.plan = { from, plan: chosen };
  }
  if (moreUse.pulled) {
    levers.moreUse = {
      from: day(moreUse.from, 'moreUse.from'),
      whPerDay: list.needed(
        moreUse.whPerDay,
        (text) => ((parseKwh(text) ?? -1) >= 0 ? parseKwh(text) : null),
        'moreUse.whPerDay',
        'Write kWh a day as a number such as 8.',
        ZERO_WH,
      ),
      fromHour: whole(moreUse.fromHour, 0, 23, 'moreUse.fromHour'),
      toHour: whole(moreUse.toHour, 1, 24, 'moreUse.toHour'),
    };
  }
  if (degradation.pulled) levers.degradation = percent(degradation.percent, 'degradation');
  if (replacement.pulled) {
    levers.replacement = {
      on: day(replacement.on, 'replacement.on'),
      costCents: fromZero(replacement.costCents, 'replacement.costCents'),
    };
  }
  if (sale.pulled) {
    levers.sale = {
      on: day(sale.on, 'sale.on'),
      roofValueCents: fromZero(sale.roofValueCents, 'sale.roofValueCents'),
    };
  }
  return list.reading(levers);
}

function aboveZero(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount > 0 ? amount : null;
}

function notNegative(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount >= 0 ? amount : null;
}

function wholeWithin(least: number, most: number): (text: string) => number | null {
  return (text) => {
    const value = Number(text.trim());
    return /^\d{1,4}$/.test(text.trim()) && value >= least && value <= most ? value : null;
  };
}

/** The plan chosen or pasted, or what is wrong with it. */
function planChosen({ which, json }: LeverTexts['plan'], plans: readonly PlanInForce[]): RatePlan | string {
  if (which === PASTED) return readPasted(json);
  return plans[Number(which)]?.plan ?? 'Choose a plan.';
}

// A settlement is made ready once per plan object, so the same text must give the same object while other levers move.
let lastPasted: { json: string; read: RatePlan | string } | null = null;

function readPasted(json: string): RatePlan | string {
  if (lastPasted?.json !== json) lastPasted = { json, read: readPlan(json) };
  return lastPasted.read;
}

/** A pasted plan may come with the day it held from, as its file does. */
function readPlan(json: string): RatePlan | string {
  if (json.trim() === '') return 'Paste a plan, or take one in from a file.';
  let value: unknown;
  try {
    value = JSON.parse(json);
  } catch {
    return 'This is not JSON. Paste a whole plan, from { to }.';
  }
  const parsed = parsePlan(typeof value === 'object' && value !== null && 'plan' in value ? value.plan : value);
  return parsed.ok ? parsed.value : (parsed.problem.faults[0]?.message ?? parsed.problem.detail ?? 'Not a rate plan.');
}
