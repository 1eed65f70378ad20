import { useFieldArray } from 'react-hook-form';
import type { PrintedLine } from '#shared/facts/papers.ts';
import { Button } from '#src/ui/button.tsx';
import { Field, SelectField } from '#src/ui/field.tsx';
import { type Form, TakeOut } from './fields-row.tsx';
import { emptyLine } from './statement-values.ts';

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

/** The printed lines of a statement. */
export function LineFields({ form }: { form: Form }) {
  const lines = useFieldArray({ control: form.control, name: 'lines' });
  return (
    <section className="sheet">
      <h2>Lines</h2>
      <p className="hint">
        As printed; a credit with a minus or CR. Untick what is printed but not in the amount due, such as credit put
        into the bank. A line left without quantity and amount is not taken in.
      </p>
      {lines.fields.map((row, index) => (
        <LineRow key={row.id} form={form} index={index} onRemove={() => lines.remove(index)} />
      ))}
      <p className="mt-3">
        <Button look="plain" onClick={() => lines.append(emptyLine())}>
          Add a line
        </Button>
      </p>
    </section>
  );
}

function LineRow({ form, index, onRemove }: { form: Form; index: number; onRemove: () => void }) {
  const errors = form.formState.errors.lines?.[index];
  const at = `lines.${index}` as const;
  const kind = form.watch(`${at}.kind`);
  const number = { inputMode: 'decimal', className: 'input-number' } as const;
  return (
    <fieldset className="min-w-0 border-t border-rule pt-1 pb-3">
      <legend className="visually-hidden">Line {index + 1}</legend>
      <div className="grid grid-cols-2 items-end gap-x-4 sm:grid-cols-3 lg:grid-cols-[1.6fr_1.85fr_0.9fr_0.8fr_0.9fr_0.95fr]">
        <Field label="Label" error={errors?.label?.message} {...form.register(`${at}.label`)} />
        <SelectField label="Kind" {...form.register(`${at}.kind`)}>
          {(KINDS.includes(kind) ? KINDS : [...KINDS, kind]).map((one) => (
            <option key={one} value={one}>
              {KIND_NAMES[one]}
            </option>
          ))}
        </SelectField>
        <Field label="Quantity" {...number} error={errors?.quantity?.message} {...form.register(`${at}.quantity`)} />
        <SelectField label="Unit" {...form.register(`${at}.unit`)}>
          <option value="">none</option>
          <option value="kWh">kWh</option>
          <option value="kW">kW</option>
          <option value="day">days</option>
          <option value="cycle">cycle</option>
          <option value="USD">$</option>
        </SelectField>
        <Field label="Rate" {...number} error={errors?.rate?.message} {...form.register(`${at}.rate`)} />
        <Field
          label="Amount"
          {...number}
          inputMode="text"
          error={errors?.amount?.message}
          {...form.register(`${at}.amount`)}
        />
      </div>
      <div className="mt-1 flex flex-wrap items-center justify-between gap-x-6">
        <label className="flex min-h-11 items-center gap-3">
          <input type="checkbox" className="size-5 accent-accent" {...form.register(`${at}.inDue`)} />
          part of what is due
        </label>
        <TakeOut what={`line ${index + 1}`} onClick={onRemove} />
      </div>
    </fieldset>
  );
}
