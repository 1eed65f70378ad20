import type { ReactNode } from 'react';
import type { FieldPath, UseFormReturn } from 'react-hook-form';
import { Choices, Field, SelectField } from '#src/ui/field.tsx';
import type { PlanEntries } from './plan-entries.ts';
import { type PlanForm, type PriceName, pricesAsked } from './plan-form.ts';
import { AddRow, Columns, FormRow, Part } from './rows.tsx';

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

function TaxQuestions({
  answers,
  set,
  error,
  at,
}: {
  answers: PlanForm;
  set: <N extends keyof PlanForm>(name: N, value: PlanForm[N]) => void;
  error: string | undefined;
  at: string;
}) {
  return (
    <>
      <fieldset className="field">
        <legend className="field-label">It is on</legend>
        {error && <span className="field-error">{error}</span>}
        <Ticks>
          <Tick label="energy" checked={answers.taxOnEnergy} onChange={(on) => set('taxOnEnergy', on)} />
          {answers.hasCustomer && (
            <Tick
              label="the customer charge"
              checked={answers.taxOnCustomer}
              onChange={(on) => set('taxOnCustomer', on)}
            />
          )}
          {answers.hasGross && (
            <Tick
              label={answers.labels.gross || 'the charge on every kWh bought'}
              checked={answers.taxOnGross}
              onChange={(on) => set('taxOnGross', on)}
            />
          )}
        </Ticks>
      </fieldset>
      <Choices
        legend="The tax is worked out"
        name={`${at}.taxAfterCredits`}
        value={answers.taxAfterCredits ? 'after' : 'before'}
        onChange={(value) => set('taxAfterCredits', value === 'after')}
        options={[
          { value: 'after', label: 'on what credits leave to pay' },
          { value: 'before', label: 'on the charges before credits' },
        ]}
      />
    </>
  );
}

const PRICE_LABELS: Record<PriceName, { label: string; unit: (answers: PlanForm) => string }> = {
  energy: { label: 'A kWh bought', unit: () => '$ per kWh' },
  exported: { label: 'A kWh sent out', unit: () => '$ per kWh' },
  customer: { label: 'Customer charge', unit: (answers) => (answers.customerPer === 'day' ? '$ a day' : '$ a bill') },
  gross: { label: 'On every kWh bought', unit: () => '$ per kWh' },
  taxPercent: { label: 'Tax', unit: () => '%' },
};

function Prices({ form, index, asked, answers }: { form: Form; index: number; asked: PriceName[]; answers: PlanForm }) {
  const at = `plans.${index}.form` as const;
  const errors = form.formState.errors.plans?.[index]?.form?.prices;
  const rows = answers.prices;
  const change = (next: PlanForm['prices']) => form.setValue(`${at}.prices`, next, { shouldDirty: true });
  return (
    <Part title="Prices by date" hint="The first row is complete. In a later one fill in only what changed that day.">
      {rows.map((row, place) => (
        <FormRow
          // biome-ignore lint/suspicious/noArrayIndexKey: a price row has no name but its place
          key={place}
          title={place === 0 ? 'First prices' : `Change ${place}`}
          onRemove={place === 0 ? null : () => change(rows.filter((other) => other !== row))}
        >
          <div className="grid items-end gap-x-6 sm:grid-cols-3">
            <Field
              label="From"
              type="date"
              error={errors?.[place]?.from?.message}
              {...form.register(`${at}.prices.${place}.from`)}
            />
            {asked.map((name) => (
              <Field
                key={name}
                label={name === 'gross' || name === 'taxPercent' ? nameOf(name, answers) : PRICE_LABELS[name].label}
                inputMode="decimal"
                unit={PRICE_LABELS[name].unit(answers)}
                placeholder={place === 0 ? undefined : 'as before'}
                className="input-number"
                error={errors?.[place]?.[name]?.message}
                {...form.register(`${at}.prices.${place}.${name}`)}
              />
            ))}
          </div>
        </FormRow>
      ))}
      <AddRow
        onClick={() =>
          change([...rows, { from: '', energy: '', exported: '', customer: '', gross: '', taxPercent: '' }])
        }
      >
        Add prices from a later day
      </AddRow>
    </Part>
  );
}

function nameOf(name: 'gross' | 'taxPercent', answers: PlanForm): string {
  const label = name === 'gross' ? answers.labels.gross : answers.labels.tax;
  return label.trim() || PRICE_LABELS[name].label;
}

function Ticks({ children }: { children: ReactNode }) {
  return <div className="mt-1">{children}</div>;
}

function Tick({
  label,
  hint,
  checked,
  onChange,
}: {
  label: string;
  hint?: string;
  checked: boolean;
  onChange: (on: boolean) => void;
}) {
  return (
    <label className="flex min-h-11 items-start gap-3 py-2">
      <input
        type="checkbox"
        className="mt-1 size-5 accent-accent"
        checked={checked}
        onChange={(event) => onChange(event.target.checked)}
      />
      <span>
        {label}
        {hint && <span className="hint block">{hint}</span>}
      </span>
    </label>
  );
}
