import * as z from 'zod/mini';
import { insuranceEndRule, type MortgageFacts, type MortgageTerms } from '#shared/facts/finance.ts';
import { ZERO_CENTS } from '#shared/units/cents.ts';
import { fieldValue, percentOfFraction, textOf, typed, typedWhole } from '#src/lib/typed-values.ts';
import { monthsOf, termText } from './term.ts';

const text = z.string();
const kind = z.enum(['conventional', 'fha', 'va']);
const termUnit = z.enum(['years', 'months']);
const insured = z.enum(['yes', 'no']);
const removed = z.enum(['still', 'roof', 'other']);

const details = z
  .object({
    has: z.literal('yes'),
    lender: text.check(z.maxLength(120)),
    kind,
    principal: typed.moneyAboveZero,
    value: typed.moneyAboveZero,
    percent: typed.percent,
    term: typedWhole(1, 480),
    termUnit,
    firstPaymentOn: typed.day,
    extra: typed.moneyFromZero,
    endedOn: typed.dayOrNone,
    insured,
    premium: text,
    removed,
    removedOn: text,
    endRule: insuranceEndRule,
    appreciationOn: typed.dayOrNone,
  })
  .check(
    z.refine((form) => monthsOf(form.term, form.termUnit) <= 480, { error: 'At most 40 years.', path: ['term'] }),
    z.refine((form) => form.insured === 'no' || typed.moneyAboveZero.safeParse(form.premium).success, {
      error: 'Write the monthly premium, such as 94.00.',
      path: ['premium'],
    }),
    z.refine(
      (form) => form.insured === 'no' || form.removed === 'still' || typed.day.safeParse(form.removedOn).success,
      { error: 'Choose the first month without it.', path: ['removedOn'] },
    ),
    z.refine(
      (form) =>
        form.insured === 'no' ||
        form.removed !== 'roof' ||
        form.endRule !== 'appreciation' ||
        form.appreciationOn.trim() !== '',
      { error: 'State the day, since you chose this rule.', path: ['appreciationOn'] },
    ),
  );
const none = z.object({
  has: z.literal('no'),
  lender: text,
  kind,
  principal: text,
  value: text,
  percent: text,
  term: text,
  termUnit,
  firstPaymentOn: text,
  extra: text,
  endedOn: text,
  insured,
  premium: text,
  removed,
  removedOn: text,
  endRule: insuranceEndRule,
  appreciationOn: text,
});
export const mortgageForm = z.discriminatedUnion('has', [details, none]);
export type MortgageForm = z.infer<typeof mortgageForm>;

/** The form filled in with what is stated. `answered` tells "no mortgage" from "not asked yet". */
export function mortgageFormOf(mortgage: MortgageFacts | null, answered: boolean): MortgageForm {
  const insurance = mortgage?.insurance ?? null;
  return {
    has: mortgage === null && answered ? 'no' : 'yes',
    lender: mortgage?.lender ?? '',
    kind: mortgage?.kind ?? 'conventional',
    principal: textOf.cents(mortgage?.principalCents ?? null),
    value: textOf.cents(mortgage?.originalValueCents ?? null),
    percent: mortgage ? percentOfFraction(mortgage.annualRate) : '',
    ...termText(mortgage?.termMonths ?? 360),
    firstPaymentOn: mortgage?.firstPaymentOn ?? '',
    extra:
      mortgage && mortgage.extraPrincipalMonthlyCents !== 0 ? textOf.cents(mortgage.extraPrincipalMonthlyCents) : '',
    endedOn: textOf.text(mortgage?.endedOn ?? null),
    insured: mortgage !== null && insurance === null ? 'no' : 'yes',
    premium: textOf.cents(insurance?.premiumMonthlyCents ?? null),
    removed: !insurance?.removedOn ? 'still' : insurance.becauseOfRoof ? 'roof' : 'other',
    removedOn: textOf.text(insurance?.removedOn ?? null),
    endRule: insurance?.endRule ?? 'prudent',
    appreciationOn: textOf.text(insurance?.appreciationOn ?? null),
  };
}

/** The facts of a form that has passed its schema. */
export function mortgageOf(form: MortgageForm): MortgageTerms | null {
  if (form.has === 'no') return null;
  const gone = form.removed !== 'still';
  return {
    lender: form.lender.trim(),
    kind: form.kind,
    principalCents: fieldValue.cents(form.principal),
    annualRate: fieldValue.fraction(form.percent),
    termMonths: monthsOf(form.term, form.termUnit),
    firstPaymentOn: fieldValue.day(form.firstPaymentOn),
    originalValueCents: fieldValue.cents(form.value),
    extraPrincipalMonthlyCents: fieldValue.centsOr(form.extra, ZERO_CENTS),
    endedOn: fieldValue.dayOrNull(form.endedOn),
    insurance:
      form.insured === 'no'
        ? null
        : {
            premiumMonthlyCents: fieldValue.cents(form.premium),
            removedOn: gone ? fieldValue.day(form.removedOn) : null,
            becauseOfRoof: form.removed === 'roof',
            endRule: form.endRule,
            appreciationOn: fieldValue.dayOrNull(form.appreciationOn),
          },
  };
}
