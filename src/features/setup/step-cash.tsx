import { zodResolver } from '@hookform/resolvers/zod';
import { useFieldArray, useForm } from 'react-hook-form';
import * as z from 'zod/mini';
import { type SetupView, setupApi } from '#shared/api/setup.ts';
import { ZERO_CENTS } from '#shared/units/cents.ts';
import { newId } from '#src/lib/new-id.ts';
import { fieldValue, textOf, typed } from '#src/lib/typed-values.ts';
import { Field, SelectField } from '#src/ui/field.tsx';
import { AddRow, Columns, FormRow, Part } from '#src/ui/rows.tsx';
import { StepForm } from './step-form.tsx';

const kind = z.enum(['signing', 'permit']);
const cashForm = z.object({
  rows: z.array(
    z.object({
      key: z.string(),
      kind,
      label: z.string().check(z.trim(), z.minLength(1, { error: 'Say what it was for.' }), z.maxLength(160)),
      on: typed.day,
      amount: typed.moneyAboveZero,
    }),
  ),
  upkeep: typed.moneyFromZero,
});

export function CashStep({ view }: { view: SetupView }) {
  const given = view.costs.filter((cost) => cost.kind === 'signing' || cost.kind === 'permit');
  // What the form does not ask stays as it is.
  const known = new Map(given.map((cost) => [cost.id, cost]));
  const form = useForm({
    resolver: zodResolver(cashForm),
    mode: 'onTouched',
    defaultValues: {
      rows: given.map((cost) => ({
        key: cost.id,
        kind: cost.kind === 'permit' ? ('permit' as const) : ('signing' as const),
        label: cost.label,
        on: String(cost.on),
        amount: textOf.cents(cost.amountCents),
      })),
      upkeep: textOf.cents(view.assumptions.upkeepYearlyCents),
    },
  });
  const rows = useFieldArray({ control: form.control, name: 'rows' });
  const { errors } = form.formState;
  return (
    <StepForm
      step="cash"
      form={form}
      endpoint={setupApi.cash}
      toBody={(values) => ({
        costs: values.rows.map((row) => ({
          id: row.key,
          on: fieldValue.day(row.on),
          kind: row.kind,
          label: row.label.trim(),
          amountCents: fieldValue.cents(row.amount),
          documentId: known.get(row.key)?.documentId ?? null,
          every: known.get(row.key)?.every ?? null,
          until: known.get(row.key)?.until ?? null,
        })),
        upkeepYearlyCents: fieldValue.centsOr(values.upkeep, ZERO_CENTS),
      })}
    >
      <Part title="Paid at signing and for permits">
        {rows.fields.length === 0 && (
          <p className="mt-3">Nothing entered. If the loan covered everything, leave it so.</p>
        )}
        {rows.fields.map((row, index) => {
          const at = errors.rows?.[index];
          return (
            <FormRow key={row.id} title={`Payment ${index + 1}`} onRemove={() => rows.remove(index)}>
              <Columns>
                <Field label="For" error={at?.label?.message} {...form.register(`rows.${index}.label`)} />
                <SelectField label="Kind" {...form.register(`rows.${index}.kind`)}>
                  <option value="signing">Cash at signing</option>
                  <option value="permit">Permit or inspection</option>
                </SelectField>
                <Field label="Paid on" type="date" error={at?.on?.message} {...form.register(`rows.${index}.on`)} />
                <Field
                  label="Amount"
                  inputMode="decimal"
                  unit="$"
                  error={at?.amount?.message}
                  {...form.register(`rows.${index}.amount`)}
                />
              </Columns>
            </FormRow>
          );
        })}
        <AddRow
          onClick={() => rows.append({ key: newId(), kind: 'signing', label: 'Cash at signing', on: '', amount: '' })}
        >
          Add a payment
        </AddRow>
      </Part>
      <Part title="Upkeep" hint="Only the projection uses this; what you really pay is entered on the Money screen.">
        <Field
          label="In a usual year"
          inputMode="decimal"
          unit="$ a year"
          className="max-w-[200px]"
          error={errors.upkeep?.message}
          {...form.register('upkeep')}
        />
      </Part>
    </StepForm>
  );
}
