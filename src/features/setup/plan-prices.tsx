import type { UseFormReturn } from 'react-hook-form';
import { Field } from '#src/ui/field.tsx';
import { AddRow, FormRow, Part } from '#src/ui/rows.tsx';
import type { PlanEntries } from './plan-entries.ts';
import type { PlanForm, PriceName } from './plan-form.ts';

type Form = UseFormReturn<PlanEntries, unknown, PlanEntries>;

const PRICE_LABELS: Record<PriceName, { label: string; unit: (answers: PlanForm) => string }> = {
  energy: { label: 'A kWh bought', unit: () => '$ per kWh' },
  exported: { label: 'A kWh sent out', unit: () => '$ per kWh' },
  customer: { label: 'Customer charge', unit: (answers) => (answers.customerPer === 'day' ? '$ a day' : '$ a bill') },
  gross: { label: 'On every kWh bought', unit: () => '$ per kWh' },
  taxPercent: { label: 'Tax', unit: () => '%' },
};

/** The prices of a plan by date: a complete first row, then what changed. */
export function Prices({
  form,
  index,
  asked,
  answers,
}: {
  form: Form;
  index: number;
  asked: PriceName[];
  answers: PlanForm;
}) {
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
