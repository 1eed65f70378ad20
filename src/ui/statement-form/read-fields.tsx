import { useFieldArray } from 'react-hook-form';
import { Button } from '#src/ui/button.tsx';
import { Field, SelectField } from '#src/ui/field.tsx';
import { type Form, TakeOut, Three } from './fields-row.tsx';
import { MeterExchange } from './meter-exchange.tsx';
import { emptyRead } from './statement-values.ts';

/** The register reads of a statement, and the kWh it prints. */
export function ReadFields({ form }: { form: Form }) {
  const reads = useFieldArray({ control: form.control, name: 'reads' });
  const { errors } = form.formState;
  const kwh = { inputMode: 'decimal', unit: 'kWh', className: 'input-number' } as const;
  return (
    <section className="sheet">
      <h2>Meter reads</h2>
      <p className="hint">
        With previous and current read the kWh follow from the meter. Without them, type the kWh alone; a read without a
        current figure is not taken in.
      </p>
      {reads.fields.map((row, index) => (
        <ReadRow key={row.id} form={form} index={index} onRemove={() => reads.remove(index)} />
      ))}
      <p className="mt-3">
        <Button look="plain" onClick={() => reads.append(emptyRead(form.getValues('reads.0')))}>
          Add a read
        </Button>
      </p>
      <MeterExchange form={form} onAdd={(next) => reads.replace(next)} />
      <Three>
        <Field label="Bought, as printed" {...kwh} error={errors.importKwh?.message} {...form.register('importKwh')} />
        <Field
          label="Sent out, as printed"
          {...kwh}
          error={errors.exportKwh?.message}
          {...form.register('exportKwh')}
        />
        <Field
          label="Made, if printed"
          {...kwh}
          error={errors.productionKwh?.message}
          {...form.register('productionKwh')}
        />
      </Three>
    </section>
  );
}

/** A register read: which meter and register, from what to what; what seldom changes stands in a fold. */
function ReadRow({ form, index, onRemove }: { form: Form; index: number; onRemove: () => void }) {
  const errors = form.formState.errors.reads?.[index];
  const at = `reads.${index}` as const;
  const number = { inputMode: 'decimal', className: 'input-number' } as const;
  const [from, to, multiplier] = form.getValues([`${at}.from`, `${at}.to`, `${at}.multiplier`]);
  const unusual = from !== '' || to !== '' || multiplier !== '1';
  const wrong = errors?.from ?? errors?.to ?? errors?.dials ?? errors?.multiplier;
  return (
    <fieldset className="min-w-0 border-t border-rule pt-2 pb-2">
      <legend className="visually-hidden">Read {index + 1}</legend>
      <div className="grid grid-cols-2 items-end gap-x-4 sm:grid-cols-[1.2fr_1fr_1fr_1fr_1fr]">
        <Field label="Meter" error={errors?.meter?.message} {...form.register(`${at}.meter`)} />
        <SelectField label="Counts" {...form.register(`${at}.channel`)}>
          <option value="import">bought</option>
          <option value="export">sent out</option>
          <option value="production">made</option>
        </SelectField>
        <Field label="Previous" {...number} error={errors?.previous?.message} {...form.register(`${at}.previous`)} />
        <Field label="Current" {...number} error={errors?.current?.message} {...form.register(`${at}.current`)} />
        <SelectField label="Read" {...form.register(`${at}.type`)}>
          <option value="actual">actual</option>
          <option value="estimated">estimated</option>
        </SelectField>
      </div>
      <div className="mt-1 flex flex-wrap items-start justify-between gap-x-6">
        <details open={unusual || wrong !== undefined} className="min-w-0 flex-1">
          <summary className="link hint inline-flex min-h-11 cursor-pointer items-center">
            Own dates, dials, multiplier
          </summary>
          <p className="hint">
            After a meter exchange each read has dates of its own. Left empty, they are those of the statement.
          </p>
          <div className="grid grid-cols-2 items-end gap-x-4 sm:grid-cols-4">
            <Field label="From" type="date" error={errors?.from?.message} {...form.register(`${at}.from`)} />
            <Field label="To" type="date" error={errors?.to?.message} {...form.register(`${at}.to`)} />
            <Field
              label="Dials"
              inputMode="numeric"
              className="input-number"
              error={errors?.dials?.message}
              {...form.register(`${at}.dials`)}
            />
            <Field
              label="Multiplier"
              {...number}
              error={errors?.multiplier?.message}
              {...form.register(`${at}.multiplier`)}
            />
          </div>
        </details>
        <TakeOut what={`read ${index + 1}`} onClick={onRemove} />
      </div>
    </fieldset>
  );
}
