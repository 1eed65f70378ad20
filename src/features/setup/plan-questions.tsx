import type { FieldPath, UseFormReturn } from 'react-hook-form';
import { Choices, Field, SelectField } from '#src/ui/field.tsx';
import { Columns, Part } from '#src/ui/rows.tsx';
import { Tick, Ticks } from '#src/ui/ticks.tsx';
import type { PlanEntries } from './plan-entries.ts';
import { type PlanForm, pricesAsked } from './plan-form.ts';
import { Prices } from './plan-prices.tsx';
import { TaxQuestions } from './plan-tax.tsx';

type Form = UseFormReturn<PlanEntries, unknown, PlanEntries>;

const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

const EXPORT_RULES: { value: PlanForm['exportRule']; label: string; hint: string }[] = [
  {
    value: 'priced',
    label: 'Every kWh sent out earns a price in dollars',
    hint: 'Net billing: two registers, two prices.',
  },
  {
    value: 'pricedAfterNetting',
    label: 'It is taken off what you buy; what is left at the end of the cycle earns a price',
    hint: 'Net metering with a monthly price for the surplus.',
  },
  {
    value: 'carried',
    label: 'It is taken off what you buy; kWh left over are carried to later months',
    hint: 'Net metering with a kWh bank.',
  },
  { value: 'nothing', label: 'Nothing is credited', hint: 'What you send out is given away.' },
];

/** The plain questions a rate plan answers. */
export function PlanQuestions({ form, index }: { form: Form; index: number }) {
  const at = `plans.${index}.form` as const;
  const answers = form.watch(at);
  const errors = form.formState.errors.plans?.[index]?.form;
  const set = <N extends keyof PlanForm>(name: N, value: PlanForm[N]) =>
    form.setValue(`${at}.${name}` as FieldPath<PlanEntries>, value as never, {
      shouldDirty: true,
      shouldValidate: form.formState.isSubmitted,
    });
  const money = answers.exportRule === 'priced' || answers.exportRule === 'pricedAfterNetting';
  return (
    <>
      <Field label="Its name, as the rate sheet says" error={errors?.name?.message} {...form.register(`${at}.name`)} />
      <Choices
        legend="What happens when you send out more than you use?"
        name={`${at}.exportRule`}
        value={answers.exportRule}
        onChange={(value) => set('exportRule', EXPORT_RULES.find((rule) => rule.value === value)?.value ?? 'priced')}
        options={EXPORT_RULES}
      />
      <Part title="What is on the bill">
        <Ticks>
          <Tick
            label="A customer charge, whatever is used"
            checked={answers.hasCustomer}
            onChange={(on) => set('hasCustomer', on)}
          />
          <Tick
            label="A charge on every kWh bought, whatever you send out"
            hint="Often called public benefits or a non-bypassable charge."
            checked={answers.hasGross}
            onChange={(on) => set('hasGross', on)}
          />
          <Tick
            label="A tax or franchise fee in percent"
            checked={answers.hasTax}
            onChange={(on) => set('hasTax', on)}
          />
        </Ticks>
        {(answers.hasGross || answers.hasTax) && (
          <Columns>
            {answers.hasGross && (
              <Field
                label="Name of that charge"
                error={errors?.labels?.gross?.message}
                {...form.register(`${at}.labels.gross`)}
              />
            )}
            {answers.hasTax && (
              <Field
                label="Name of the tax"
                error={errors?.labels?.tax?.message}
                {...form.register(`${at}.labels.tax`)}
              />
            )}
          </Columns>
        )}
        {answers.hasCustomer && (
          <Choices
            legend="The customer charge is"
            name={`${at}.customerPer`}
            value={answers.customerPer}
            onChange={(value) => set('customerPer', value === 'day' ? 'day' : 'cycle')}
            options={[
              { value: 'cycle', label: 'one sum for each bill' },
              { value: 'day', label: 'a sum for each day' },
            ]}
          />
        )}
        {answers.hasTax && <TaxQuestions answers={answers} set={set} error={errors?.taxOnEnergy?.message} at={at} />}
      </Part>
      <Prices form={form} index={index} asked={pricesAsked(answers)} answers={answers} />
      {(money || answers.exportRule === 'carried') && (
        <Part title="The credit bank">
          {money && (
            <Choices
              legend="Where may the credit be spent?"
              name={`${at}.spendOn`}
              value={answers.spendOn}
              onChange={(value) => set('spendOn', value === 'all' ? 'all' : 'energy')}
              options={[
                { value: 'energy', label: 'On energy only' },
                {
                  value: 'all',
                  label: 'On all charges',
                  hint: 'Except a tax that is worked out after credits.',
                },
              ]}
            />
          )}
          <Choices
            legend="May a month’s credit pay that same month’s bill?"
            name={`${at}.spendWhen`}
            value={answers.spendWhen}
            onChange={(value) => set('spendWhen', value === 'next' ? 'next' : 'same')}
            options={[
              { value: 'same', label: 'Yes' },
              { value: 'next', label: 'No, from the next bill on' },
            ]}
          />
          <Choices
            legend="What becomes of credit that stays unused?"
            name={`${at}.lapse`}
            value={answers.lapse}
            onChange={(value) => set('lapse', value === 'expire' ? 'expire' : value === 'pay' ? 'pay' : 'never')}
            options={[
              { value: 'never', label: 'It is carried on' },
              { value: 'expire', label: 'It lapses once a year' },
              { value: 'pay', label: 'It is paid out once a year' },
            ]}
          />
          {answers.lapse !== 'never' && (
            <Columns>
              <SelectField label="With the bill that ends in" {...form.register(`${at}.lapseMonth`)}>
                {MONTHS.map((month, number) => (
                  <option key={month} value={String(number + 1)}>
                    {month}
                  </option>
                ))}
              </SelectField>
              {answers.lapse === 'pay' && (
                <SelectField label="It is paid" {...form.register(`${at}.payTo`)}>
                  <option value="separate">by cheque, apart from the bill</option>
                  <option value="bill">on the bill</option>
                </SelectField>
              )}
              {answers.lapse === 'pay' && answers.exportRule === 'carried' && (
                <Field
                  label="Paid for each kWh left"
                  inputMode="decimal"
                  unit="$ per kWh"
                  error={errors?.payRate?.message}
                  {...form.register(`${at}.payRate`)}
                />
              )}
            </Columns>
          )}
        </Part>
      )}
      <Choices
        legend="When a price changes inside a billing cycle"
        name={`${at}.priceChange`}
        value={answers.priceChange}
        onChange={(value) => set('priceChange', value === 'readDate' ? 'readDate' : 'days')}
        options={[
          { value: 'days', label: 'the cycle is shared by days, old price and new' },
          { value: 'readDate', label: 'the price on the day of the read holds for all of it' },
        ]}
      />
    </>
  );
}
