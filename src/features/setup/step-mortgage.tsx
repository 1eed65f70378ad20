import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { type SetupView, setupApi } from '#shared/api/setup.ts';
import { Choices, Field, SelectField } from '#src/ui/field.tsx';
import { Columns, Part } from '#src/ui/rows.tsx';
import { type MortgageForm, mortgageForm, mortgageFormOf, mortgageOf } from './mortgage-form.ts';
import { StepForm } from './step-form.tsx';

export function MortgageStep({ view }: { view: SetupView }) {
  const answered = view.steps.some((one) => one.step === 'mortgage' && one.state === 'done');
  const form = useForm<MortgageForm, unknown, MortgageForm>({
    resolver: zodResolver(mortgageForm),
    mode: 'onTouched',
    defaultValues: mortgageFormOf(view.mortgage, answered),
  });
  const { errors } = form.formState;
  const [has, insured, removed, kind] = form.watch(['has', 'insured', 'removed', 'kind']);
  return (
    <StepForm
      step="mortgage"
      form={form}
      endpoint={setupApi.mortgage}
      toBody={(values) => ({ mortgage: mortgageOf(values) })}
    >
      <Choices
        legend="Is there a mortgage on the house?"
        name="has"
        value={has}
        onChange={(value) => form.setValue('has', value === 'no' ? 'no' : 'yes', { shouldDirty: true })}
        options={[
          { value: 'yes', label: 'Yes' },
          { value: 'no', label: 'No, or it never carried insurance' },
        ]}
      />
      {has === 'yes' && (
        <>
          <Columns>
            <Field label="Lender or servicer" error={errors.lender?.message} {...form.register('lender')} />
            <SelectField label="Kind" error={errors.kind?.message} {...form.register('kind')}>
              <option value="conventional">Conventional</option>
              <option value="fha">FHA</option>
              <option value="va">VA</option>
            </SelectField>
            <Field
              label="Original principal"
              inputMode="decimal"
              unit="$"
              error={errors.principal?.message}
              {...form.register('principal')}
            />
            <Field
              label="Original value"
              hint="The lesser of price and appraisal."
              inputMode="decimal"
              unit="$"
              error={errors.value?.message}
              {...form.register('value')}
            />
            <Field
              label="Rate"
              inputMode="decimal"
              unit="% a year"
              error={errors.percent?.message}
              {...form.register('percent')}
            />
            <div className="grid grid-cols-2 items-end gap-x-4">
              <Field label="Term" inputMode="numeric" error={errors.term?.message} {...form.register('term')} />
              <SelectField label="counted in" {...form.register('termUnit')}>
                <option value="years">years</option>
                <option value="months">months</option>
              </SelectField>
            </div>
            <Field
              label="First payment due"
              type="date"
              error={errors.firstPaymentOn?.message}
              {...form.register('firstPaymentOn')}
            />
            <Field
              label="Extra principal each month"
              hint="If you pay more than asked."
              inputMode="decimal"
              unit="$"
              error={errors.extra?.message}
              {...form.register('extra')}
            />
          </Columns>
          <Field
            label="Refinanced, sold or paid off on"
            hint="Leave empty while the mortgage runs. Insurance ends with it, whatever else is true."
            type="date"
            className="max-w-[220px]"
            error={errors.endedOn?.message}
            {...form.register('endedOn')}
          />
          <Part title="Its insurance">
            {kind === 'fha' && (
              <p className="hint mt-1">
                FHA premiums mostly run for a fixed term or the whole loan; a new appraisal does not end them.
              </p>
            )}
            {kind === 'va' && <p className="hint mt-1">A VA loan carries no monthly mortgage insurance.</p>}
            <Choices
              legend="Did it carry monthly mortgage insurance?"
              name="insured"
              value={insured}
              onChange={(value) => form.setValue('insured', value === 'no' ? 'no' : 'yes', { shouldDirty: true })}
              options={[
                { value: 'yes', label: 'Yes' },
                { value: 'no', label: 'No' },
              ]}
            />
            {insured === 'yes' && (
              <Field
                label="Premium a month"
                inputMode="decimal"
                unit="$"
                className="max-w-[200px]"
                error={errors.premium?.message}
                {...form.register('premium')}
              />
            )}
            {insured === 'yes' && (
              <Choices
                legend="Is it still paid?"
                name="removed"
                value={removed}
                onChange={(value) =>
                  form.setValue('removed', value === 'roof' ? 'roof' : value === 'other' ? 'other' : 'still', {
                    shouldDirty: true,
                  })
                }
                options={[
                  { value: 'still', label: 'Yes, it is still paid', hint: 'Nothing is counted until it goes.' },
                  {
                    value: 'roof',
                    label: 'It went because of the roof',
                    hint: 'The appraisal that counted the roof’s value let you ask.',
                  },
                  { value: 'other', label: 'It went for another reason', hint: 'Nothing is counted.' },
                ]}
              />
            )}
            {insured === 'yes' && removed !== 'still' && (
              <Field
                label="First month without it"
                hint="The due date of the first payment that had no premium."
                type="date"
                className="max-w-[220px]"
                error={errors.removedOn?.message}
                {...form.register('removedOn')}
              />
            )}
            {insured === 'yes' && removed === 'roof' && <EndRule form={form} />}
          </Part>
        </>
      )}
    </StepForm>
  );
}

const RULES = [
  {
    value: 'prudent',
    label: 'The earliest of these (prudent)',
    hint: 'The usual choice: it never counts a month in which the insurance might have been gone without the roof.',
  },
  {
    value: 'request80',
    label: 'When the balance reaches 80% of the original value',
    hint: 'The date on which you could have asked.',
  },
  { value: 'automatic78', label: 'When the schedule reaches 78%', hint: 'The date on which it ends by itself.' },
  { value: 'midpoint', label: 'Half-way through the term', hint: 'The latest it can run.' },
  {
    value: 'appreciation',
    label: 'When ordinary rises in value alone would have allowed it',
    hint: 'You state that day below.',
  },
] as const;

function EndRule({ form }: { form: ReturnType<typeof useForm<MortgageForm, unknown, MortgageForm>> }) {
  const rule = form.watch('endRule');
  return (
    <>
      <Choices
        legend="When would it have ended anyway?"
        hint="Premiums count as avoided only up to that date."
        name="endRule"
        value={rule}
        onChange={(value) =>
          form.setValue('endRule', RULES.find((one) => one.value === value)?.value ?? 'prudent', { shouldDirty: true })
        }
        options={[...RULES]}
      />
      <Field
        label="Day on which the house’s rise in value alone would have allowed it"
        hint="Your own statement, without the roof. Leave it empty if you cannot say."
        type="date"
        className="max-w-[220px]"
        error={form.formState.errors.appreciationOn?.message}
        {...form.register('appreciationOn')}
      />
    </>
  );
}
