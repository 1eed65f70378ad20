import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import * as z from 'zod/mini';
import { type SetupView, setupApi } from '#shared/api/setup.ts';
import { parseDollars, subtractCents, ZERO_CENTS } from '#shared/units/cents.ts';
import { money } from '#src/lib/format.ts';
import { fieldValue, percentOfFraction, textOf, typed, typedWhole } from '#src/lib/typed-values.ts';
import { Choices, Field, SelectField } from '#src/ui/field.tsx';
import { Columns } from '#src/ui/rows.tsx';
import { StepForm } from './step-form.tsx';
import { monthsOf, termText } from './term.ts';

const details = z
  .object({
    has: z.literal('yes'),
    lender: z.string().check(z.maxLength(120)),
    principal: typed.moneyAboveZero,
    dealerFee: typed.moneyFromZero,
    percent: typed.percent,
    term: typedWhole(1, 480),
    termUnit: z.enum(['years', 'months']),
    fundedOn: typed.day,
    firstPaymentOn: typed.day,
  })
  .check(
    z.refine((form) => form.fundedOn <= form.firstPaymentOn, {
      error: 'The first payment cannot come before the money.',
      path: ['firstPaymentOn'],
    }),
    z.refine((form) => (parseDollars(form.dealerFee) ?? 0) <= (parseDollars(form.principal) ?? 0), {
      error: 'The fee is a part of the principal and cannot be more than it.',
      path: ['dealerFee'],
    }),
    z.refine((form) => monthsOf(form.term, form.termUnit) <= 480, { error: 'At most 40 years.', path: ['term'] }),
  );
const typedAny = z.string();
const none = z.object({
  has: z.literal('no'),
  lender: typedAny,
  principal: typedAny,
  dealerFee: typedAny,
  percent: typedAny,
  term: typedAny,
  termUnit: z.enum(['years', 'months']),
  fundedOn: typedAny,
  firstPaymentOn: typedAny,
});
const loanForm = z.discriminatedUnion('has', [details, none]);
type LoanForm = z.infer<typeof loanForm>;

export function LoanStep({ view }: { view: SetupView }) {
  const { loan } = view;
  const answered = view.steps.some((one) => one.step === 'loan' && one.state === 'done');
  const form = useForm<LoanForm, unknown, LoanForm>({
    resolver: zodResolver(loanForm),
    mode: 'onTouched',
    defaultValues: {
      has: loan === null && answered ? 'no' : 'yes',
      lender: loan?.lender ?? '',
      principal: textOf.cents(loan?.principalCents ?? null),
      dealerFee: textOf.cents(loan?.dealerFeeCents ?? null),
      percent: loan ? percentOfFraction(loan.annualRate) : '',
      ...termText(loan?.termMonths ?? null),
      fundedOn: loan?.fundedOn ?? '',
      firstPaymentOn: loan?.firstPaymentOn ?? '',
    },
  });
  const { errors } = form.formState;
  const [has, principal, fee] = form.watch(['has', 'principal', 'dealerFee']);
  const principalCents = parseDollars(principal);
  const feeCents = parseDollars(fee);
  return (
    <StepForm
      step="loan"
      form={form}
      endpoint={setupApi.loan}
      toBody={(values) => ({
        loan:
          values.has === 'no'
            ? null
            : {
                lender: values.lender.trim(),
                principalCents: fieldValue.cents(values.principal),
                dealerFeeCents: fieldValue.centsOr(values.dealerFee, ZERO_CENTS),
                annualRate: fieldValue.fraction(values.percent),
                termMonths: monthsOf(values.term, values.termUnit),
                fundedOn: fieldValue.day(values.fundedOn),
                firstPaymentOn: fieldValue.day(values.firstPaymentOn),
              },
      })}
    >
      <Choices
        legend="How was the roof paid for?"
        name="has"
        value={has}
        onChange={(value) => form.setValue('has', value === 'no' ? 'no' : 'yes', { shouldDirty: true })}
        options={[
          { value: 'yes', label: 'With a loan for it' },
          { value: 'no', label: 'Without a loan', hint: 'Cash belongs to “Cash and upkeep”.' },
        ]}
      />
      {has === 'yes' && (
        <>
          <Field label="Lender" error={errors.lender?.message} {...form.register('lender')} />
          <Columns>
            <Field
              label="Principal"
              hint="The amount financed, as the note says."
              inputMode="decimal"
              unit="$"
              error={errors.principal?.message}
              {...form.register('principal')}
            />
            <Field
              label="Dealer fee inside it, if known"
              hint="Shown beside the loan; not a cost of its own."
              inputMode="decimal"
              unit="$"
              error={errors.dealerFee?.message}
              {...form.register('dealerFee')}
            />
          </Columns>
          {principalCents !== null && feeCents !== null && feeCents > 0 && feeCents <= principalCents && (
            <p className="hint mt-2">
              Without the fee the roof was financed at {money(subtractCents(principalCents, feeCents))}.
            </p>
          )}
          <Columns three>
            <Field
              label="Rate"
              inputMode="decimal"
              unit="% a year"
              error={errors.percent?.message}
              {...form.register('percent')}
            />
            <Field label="Term" inputMode="numeric" error={errors.term?.message} {...form.register('term')} />
            <SelectField label="counted in" {...form.register('termUnit')}>
              <option value="years">years</option>
              <option value="months">months</option>
            </SelectField>
          </Columns>
          <Columns>
            <Field
              label="Funded on"
              hint="Interest runs from this day."
              type="date"
              error={errors.fundedOn?.message}
              {...form.register('fundedOn')}
            />
            <Field
              label="First payment due"
              hint="Later ones fall on the same day of the month."
              type="date"
              error={errors.firstPaymentOn?.message}
              {...form.register('firstPaymentOn')}
            />
          </Columns>
          {loan && loan.payments.length > 0 && (
            <p className="hint mt-3">
              The {loan.payments.length} recorded payments are kept; they are on the Money screen.
            </p>
          )}
        </>
      )}
    </StepForm>
  );
}
