import type { PlanInForce } from '#shared/facts/household.ts';
import type { Levers } from '#shared/facts/scenario.ts';
import type { ProjectionBasis } from '#shared/position/basis.ts';
import { cents, dollarsText } from '#shared/units/cents.ts';
import { addMonths, type Day, dayOf, monthOf, monthsBetween, yearOf } from '#shared/units/day.ts';
import { kwhText } from '#shared/units/energy.ts';
import { percentOfFraction, textOf } from '#src/lib/typed-values.ts';

type Pulled = { pulled: boolean };
/** The levers as they stand on the page: texts as typed, kept while a lever is let go. Field names are those of `Levers`. */
export type LeverTexts = {
  paydown: Pulled & { on: string; amountCents: string; reamortize: boolean };
  cash: Pulled;
  refinance: Pulled & { on: string; annualRate: string; termMonths: string; costsCents: string };
  priceRise: Pulled & { percent: string };
  exportCut: Pulled & { from: string; keep: string };
  /** `which` is the number of one of the household's plans, or `pasted`. */
  plan: Pulled & { from: string; which: string; json: string };
  moreUse: Pulled & { from: string; whPerDay: string; fromHour: string; toHour: string };
  degradation: Pulled & { percent: string };
  replacement: Pulled & { on: string; costCents: string };
  sale: Pulled & { on: string; roofValueCents: string };
};
export type LeverName = keyof LeverTexts;
export const LEVER_NAMES: readonly LeverName[] = [
  'paydown',
  'cash',
  'refinance',
  'priceRise',
  'exportCut',
  'plan',
  'moreUse',
  'degradation',
  'replacement',
  'sale',
];
export const PASTED = 'pasted';

/** What stands in each lever before it is touched: the record's own figures where it has them. None is pulled. */
export function untouched({ close, today, facts }: ProjectionBasis): LeverTexts {
  const soon = firstOfNextMonth(today > close.on ? today : close.on);
  const { loan, assumptions } = facts;
  const received = close.creditReceivedCents;
  const loanEnds = loan ? addMonths(loan.firstPaymentOn, loan.termMonths - 1) : soon;
  return {
    paydown: {
      pulled: false,
      on: soon,
      amountCents: dollarsText(received > 0 ? received : cents(100_000)),
      reamortize: true,
    },
    cash: { pulled: false },
    refinance: {
      pulled: false,
      on: soon,
      annualRate: loan ? percentOfFraction(loan.annualRate) : '',
      termMonths: String(Math.max(12, monthsBetween(soon, loanEnds) + 1)),
      costsCents: '0.00',
    },
    priceRise: { pulled: false, percent: percentOfFraction(assumptions.priceRise) },
    exportCut: { pulled: false, from: dayOf(yearOf(soon) + 1, 1, 1), keep: '50' },
    plan: { pulled: false, from: soon, which: facts.plans.length > 1 ? '0' : PASTED, json: '' },
    moreUse: { pulled: false, from: soon, whPerDay: '8', fromHour: '22', toHour: '6' },
    degradation: { pulled: false, percent: percentOfFraction(assumptions.degradation) },
    replacement: { pulled: false, on: addMonths(soon, 120), costCents: '2000.00' },
    sale: { pulled: false, on: addMonths(soon, 96), roofValueCents: '0.00' },
  };
}

function firstOfNextMonth(date: Day): Day {
  return dayOf(yearOf(date), monthOf(date) + 1, 1);
}

/** Levers as texts, with `rest` in those that are not pulled. */
export function textsOf(levers: Levers, plans: readonly PlanInForce[], rest: LeverTexts): LeverTexts {
  const { paydown, refinance, priceRise, exportCut, plan, moreUse, degradation, replacement, sale } = levers;
  const same = plan ? plans.findIndex((one) => JSON.stringify(one.plan) === JSON.stringify(plan.plan)) : -1;
  const texts: LeverTexts = letGo(rest);
  if (paydown) texts.paydown = { ...paydown, pulled: true, amountCents: textOf.cents(paydown.amountCents) };
  texts.cash = { pulled: levers.cash };
  if (refinance) {
    texts.refinance = {
      pulled: true,
      on: refinance.on,
      annualRate: percentOfFraction(refinance.annualRate),
      termMonths: String(refinance.termMonths),
      costsCents: textOf.cents(refinance.costsCents),
    };
  }
  if (priceRise !== null) texts.priceRise = { pulled: true, percent: percentOfFraction(priceRise) };
  if (exportCut) texts.exportCut = { pulled: true, from: exportCut.from, keep: percentOfFraction(exportCut.keep) };
  if (plan) {
    texts.plan = {
      pulled: true,
      from: plan.from,
      which: same < 0 ? PASTED : String(same),
      json: same < 0 ? JSON.stringify(plan.plan, null, 2) : rest.plan.json,
    };
  }
  if (moreUse) {
    texts.moreUse = {
      pulled: true,
      from: moreUse.from,
      whPerDay: kwhText(moreUse.whPerDay),
      fromHour: String(moreUse.fromHour),
      toHour: String(moreUse.toHour),
    };
  }
  if (degradation !== null) texts.degradation = { pulled: true, percent: percentOfFraction(degradation) };
  if (replacement) {
    texts.replacement = { pulled: true, on: replacement.on, costCents: textOf.cents(replacement.costCents) };
  }
  if (sale) texts.sale = { pulled: true, on: sale.on, roofValueCents: textOf.cents(sale.roofValueCents) };
  return texts;
}

/** Every lever let go, what is typed in them kept. */
export function letGo(texts: LeverTexts): LeverTexts {
  return Object.fromEntries(
    LEVER_NAMES.map((name) => [name, { ...texts[name], pulled: false }]),
  ) as unknown as LeverTexts;
}
