import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import * as z from 'zod/mini';
import { type SetupView, setupApi } from '#shared/api/setup.ts';
import { fieldValue, typed } from '#src/lib/typed-values.ts';
import { Choices, Field } from '#src/ui/field.tsx';
import { Columns } from '#src/ui/rows.tsx';
import { StepForm } from './step-form.tsx';

const paidAs = z.enum(['separate', 'billCredit']);
const details = z
  .object({
    has: z.literal('yes'),
    payer: z.string().check(z.maxLength(120)),
    rate: typed.rate,
    firstDay: typed.day,
    lastDay: typed.day,
    paidAs,
  })
  .check(
    z.refine((form) => form.firstDay <= form.lastDay, {
      error: 'The last day comes after the first.',
      path: ['lastDay'],
    }),
  );
const none = z.object({
  has: z.literal('no'),
  payer: z.string(),
  rate: z.string(),
  firstDay: z.string(),
  lastDay: z.string(),
  paidAs,
});
const incentiveForm = z.discriminatedUnion('has', [details, none]);
type IncentiveForm = z.infer<typeof incentiveForm>;

export function IncentiveStep({ view }: { view: SetupView }) {
  const { incentive } = view;
  const answered = view.steps.some((one) => one.step === 'incentive' && one.state === 'done');
  const form = useForm<IncentiveForm, unknown, IncentiveForm>({
    resolver: zodResolver(incentiveForm),
    mode: 'onTouched',
    defaultValues: {
      has: incentive === null && answered ? 'no' : 'yes',
      payer: incentive?.payer ?? '',
      rate: incentive?.ratePerKwh ?? '',
      firstDay: incentive?.firstDay ?? view.house.switchOn ?? '',
      lastDay: incentive?.lastDay ?? '',
      paidAs: incentive?.paidAs ?? 'separate',
    },
  });
  const { errors } = form.formState;
  const [has, paid] = form.watch(['has', 'paidAs']);
  return (
    <StepForm
      step="incentive"
      form={form}
      endpoint={setupApi.incentive}
      toBody={(values) => ({
        incentive:
          values.has === 'no'
            ? null
            : {
                payer: values.payer.trim(),
                ratePerKwh: fieldValue.decimal(values.rate),
                firstDay: fieldValue.day(values.firstDay),
                lastDay: fieldValue.day(values.lastDay),
                paidAs: values.paidAs,
              },
      })}
    >
      <Choices
        legend="Does somebody pay for every kWh the roof makes?"
        name="has"
        value={has}
        onChange={(value) => form.setValue('has', value === 'no' ? 'no' : 'yes', { shouldDirty: true })}
        options={[
          { value: 'yes', label: 'Yes, by the kWh' },
          { value: 'no', label: 'No' },
        ]}
      />
      {has === 'yes' && (
        <>
          <Field label="Who pays" error={errors.payer?.message} {...form.register('payer')} />
          <Field
            label="Rate"
            inputMode="decimal"
            unit="$ per kWh"
            className="max-w-[200px]"
            error={errors.rate?.message}
            {...form.register('rate')}
          />
          <Columns>
            <Field label="First day" type="date" error={errors.firstDay?.message} {...form.register('firstDay')} />
            <Field
              label="Last day"
              hint="Both days count."
              type="date"
              error={errors.lastDay?.message}
              {...form.register('lastDay')}
            />
          </Columns>
          <Choices
            legend="How does it come?"
            name="paidAs"
            value={paid}
            onChange={(value) =>
              form.setValue('paidAs', value === 'billCredit' ? 'billCredit' : 'separate', { shouldDirty: true })
            }
            options={[
              {
                value: 'separate',
                label: 'Apart from the bill',
                hint: 'A cheque or transfer; enter each on the Money screen when it arrives.',
              },
              {
                value: 'billCredit',
                label: 'On the bill',
                hint: 'As a credit line. It is counted here once, not again in the bill.',
              },
            ]}
          />
        </>
      )}
    </StepForm>
  );
}
