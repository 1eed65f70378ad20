import { zodResolver } from '@hookform/resolvers/zod';
import { useFieldArray, useForm } from 'react-hook-form';
import * as z from 'zod/mini';
import { type SetupView, setupApi } from '#shared/api/setup.ts';
import { type Cents, cents, parseDollars } from '#shared/units/cents.ts';
import { money } from '#src/lib/format.ts';
import { newId } from '#src/lib/new-id.ts';
import { fieldValue, fractionOfPercent, percentOfFraction, textOf, typed } from '#src/lib/typed-values.ts';
import { Choices, Field, SelectField } from '#src/ui/field.tsx';
import { AddRow, Columns, FormRow, Part } from '#src/ui/rows.tsx';
import { StepForm } from './step-form.tsx';

const treatment = z.enum(['qualified', 'reduction', 'leftOut']);
const rows = z.array(
  z
    .object({
      key: z.string(),
      label: z.string().check(z.trim(), z.minLength(1, { error: 'Say what it is.' }), z.maxLength(160)),
      amount: typed.moneyAboveZero,
      treatment,
      reason: z.string(),
    })
    .check(
      z.refine((row) => row.treatment === 'qualified' || row.reason.trim() !== '', {
        error: 'Say why, for whoever reads it at tax time.',
        path: ['reason'],
      }),
    ),
);
const creditForm = z.object({
  has: z.enum(['yes', 'no']),
  placedInServiceOn: typed.dayOrNone,
  homePercent: z.string().check(
    z.refine((text) => /^(0*100(\.0+)?|0*\d{1,2}(\.\d{1,4})?)$/.test(text.trim()), {
      error: 'Write a percent from 0 to 100.',
    }),
  ),
  rows,
});
type CreditForm = z.infer<typeof creditForm>;

export function CreditStep({ view }: { view: SetupView }) {
  const { credit } = view;
  // What the form does not ask stays as it is.
  const known = new Map(credit?.costs.map((cost) => [cost.id, cost]));
  const answered = view.steps.some((one) => one.step === 'credit' && one.state === 'done');
  const form = useForm<CreditForm, unknown, CreditForm>({
    resolver: zodResolver(creditForm),
    mode: 'onTouched',
    defaultValues: {
      has: credit === null && answered ? 'no' : 'yes',
      placedInServiceOn: textOf.text(credit?.placedInServiceOn ?? null),
      homePercent: percentOfFraction(credit?.homeShare ?? '1'),
      rows: (credit?.costs ?? []).map((cost) => ({
        key: cost.id,
        label: cost.label,
        amount: textOf.cents(cost.amountCents),
        treatment: cost.treatment,
        reason: textOf.text(cost.reason),
      })),
    },
  });
  const costs = useFieldArray({ control: form.control, name: 'rows' });
  const { errors } = form.formState;
  const [has, typedRows] = form.watch(['has', 'rows']);
  return (
    <StepForm
      step="credit"
      form={form}
      endpoint={setupApi.credit}
      toBody={(values) => ({
        credit:
          values.has === 'no'
            ? null
            : {
                placedInServiceOn: fieldValue.dayOrNull(values.placedInServiceOn),
                homeShare: fractionOfPercent(values.homePercent) ?? '1',
                costs: values.rows.map((row) => ({
                  id: row.key,
                  label: row.label.trim(),
                  amountCents: fieldValue.cents(row.amount),
                  treatment: row.treatment,
                  reason: row.reason.trim() === '' ? null : row.reason.trim(),
                  placedInServiceOn: known.get(row.key)?.placedInServiceOn ?? null,
                  documentId: known.get(row.key)?.documentId ?? null,
                })),
              },
      })}
    >
      <Choices
        legend="Is the federal credit for the roof yours to claim?"
        hint="With a lease or a power-purchase agreement it belongs to the system’s owner."
        name="has"
        value={has}
        onChange={(value) => form.setValue('has', value === 'no' ? 'no' : 'yes', { shouldDirty: true })}
        options={[
          { value: 'yes', label: 'Yes, the household owns the system' },
          { value: 'no', label: 'No' },
        ]}
      />
      {has === 'yes' && (
        <>
          <Field
            label="Placed in service on"
            hint="The day installation was completed, as the installer’s paper or the final inspection says. It decides the rate; what was paid earlier or later does not matter."
            type="date"
            className="max-w-[220px]"
            error={errors.placedInServiceOn?.message}
            {...form.register('placedInServiceOn')}
          />
          <Part
            title="What it cost, line by line"
            hint="From the contract. A rebate from the maker or installer, or a utility’s subsidy, is taken off. Leave out what is not part of the system: a dealer fee, interest, an extended warranty, ordinary roofing."
          >
            {costs.fields.map((row, index) => {
              const at = errors.rows?.[index];
              const how = typedRows[index]?.treatment ?? 'qualified';
              return (
                <FormRow key={row.id} title={`Line ${index + 1}`} onRemove={() => costs.remove(index)}>
                  <Field label="What" error={at?.label?.message} {...form.register(`rows.${index}.label`)} />
                  <Columns>
                    <Field
                      label="Amount"
                      inputMode="decimal"
                      unit="$"
                      error={at?.amount?.message}
                      {...form.register(`rows.${index}.amount`)}
                    />
                    <SelectField label="On the form" {...form.register(`rows.${index}.treatment`)}>
                      <option value="qualified">Counts as a cost</option>
                      <option value="reduction">Is taken off the cost</option>
                      <option value="leftOut">Left out</option>
                    </SelectField>
                  </Columns>
                  {how !== 'qualified' && (
                    <Field label="Why" error={at?.reason?.message} {...form.register(`rows.${index}.reason`)} />
                  )}
                </FormRow>
              );
            })}
            <AddRow
              onClick={() => costs.append({ key: newId(), label: '', amount: '', treatment: 'qualified', reason: '' })}
            >
              Add a line
            </AddRow>
            <Totals rows={typedRows} />
          </Part>
          <Field
            label="Share that is for the home"
            hint="100 unless a part of the system serves a business."
            inputMode="decimal"
            unit="%"
            className="max-w-[140px]"
            error={errors.homePercent?.message}
            {...form.register('homePercent')}
          />
          {credit && credit.years.length > 0 && (
            <p className="hint mt-3">The returns entered on the Tax credit screen are kept.</p>
          )}
        </>
      )}
    </StepForm>
  );
}

/** Exact sums of what is typed; a line that does not read yet is not counted. */
function Totals({ rows: typedRows }: { rows: CreditForm['rows'] }) {
  const sum = (how: CreditForm['rows'][number]['treatment']): Cents =>
    cents(
      typedRows
        .filter((row) => row.treatment === how)
        .reduce((total, row) => total + (parseDollars(row.amount) ?? 0), 0),
    );
  if (typedRows.length === 0) return null;
  const [costs, off, out] = [sum('qualified'), sum('reduction'), sum('leftOut')];
  return (
    <p className="mt-4" aria-live="polite">
      Qualified cost <b>{money(cents(costs - off))}</b>
      <span className="hint">
        {' '}
        = {money(costs)} less {money(off)}; {money(out)} left out.
      </span>
    </p>
  );
}
