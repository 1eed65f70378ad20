import type { UseFormReturn } from 'react-hook-form';
import type { PrintedLine } from '#shared/facts/papers.ts';
import { Field, SelectField } from '#src/ui/field.tsx';
import type { StatementFormValues } from './statement-form-values.ts';

const KIND_NAMES: Record<PrintedLine['kind'], string> = {
  import: 'energy bought',
  export: 'export credit',
  credit: 'credit used',
  incentive: 'incentive',
  fixed: 'customer charge',
  nonbypassable: 'on every kWh bought',
  demand: 'demand',
  tax: 'tax or franchise fee',
  minimum: 'minimum bill',
  trueup: 'true-up',
  adjustment: 'other electric charge',
  previousBalance: 'previous balance',
  payment: 'payment',
  otherService: 'not electricity',
};
/** The previous balance and payments have fields of their own. */
const KINDS: PrintedLine['kind'][] = (Object.keys(KIND_NAMES) as PrintedLine['kind'][]).filter(
  (kind) => kind !== 'previousBalance' && kind !== 'payment',
);

export function LineRows({
  form,
  fields,
  onRemove,
}: {
  form: UseFormReturn<StatementFormValues, unknown, StatementFormValues>;
  fields: { id: string }[];
  onRemove: (index: number) => void;
}) {
  return (
    <>
      {fields.map((row, index) => {
        const errors = form.formState.errors.lines?.[index];
        const at = `lines.${index}` as const;
        const kind = form.watch(`${at}.kind`);
        return (
          <fieldset key={row.id} className="min-w-0 border-t border-rule pt-1 pb-3">
            <legend className="visually-hidden">Line {index + 1}</legend>
            <div className="grid grid-cols-2 items-end gap-x-4 sm:grid-cols-[2fr_1.3fr_1fr_1fr_1fr]">
              <Field label="Label" error={errors?.label?.message} {...form.register(`${at}.label`)} />
              <SelectField label="Kind" {...form.register(`${at}.kind`)}>
                {(KINDS.includes(kind) ? KINDS : [...KINDS, kind]).map((one) => (
                  <option key={one} value={one}>
                    {KIND_NAMES[one]}
                  </option>
                ))}
              </SelectField>
              <Field
                label="Quantity"
                inputMode="decimal"
                className="input-number"
                error={errors?.quantity?.message}
                {...form.register(`${at}.quantity`)}
              />
              <Field
                label="Rate"
                inputMode="decimal"
                className="input-number"
                error={errors?.rate?.message}
                {...form.register(`${at}.rate`)}
              />
              <Field
                label="Amount"
                inputMode="text"
                className="input-number"
                error={errors?.amount?.message}
                {...form.register(`${at}.amount`)}
              />
            </div>
            <div className="mt-1 flex flex-wrap items-center justify-between gap-x-6">
              <label className="flex min-h-11 items-center gap-3">
                <input type="checkbox" className="size-5 accent-accent" {...form.register(`${at}.inDue`)} />
                part of what is due
              </label>
              <button type="button" className="link hint min-h-11" onClick={() => onRemove(index)}>
                Take out<span className="visually-hidden"> line {index + 1}</span>
              </button>
            </div>
          </fieldset>
        );
      })}
    </>
  );
}
