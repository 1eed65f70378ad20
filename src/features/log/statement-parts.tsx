import type { UseFormReturn } from 'react-hook-form';
import { subtractCents } from '#shared/units/cents.ts';
import { money } from '#src/lib/format.ts';
import { Field, SelectField } from '#src/ui/field.tsx';
import { isUntouched, runningSum, type StatementFormValues } from './statement-form-values.ts';

type Form = UseFormReturn<StatementFormValues, unknown, StatementFormValues>;

/** A register read: which meter and register, from what to what. */
export function ReadFields({ form, index, onRemove }: { form: Form; index: number; onRemove: () => void }) {
  const errors = form.formState.errors.reads?.[index];
  return (
    <fieldset className="min-w-0 border-t border-rule pt-2">
      <legend className="visually-hidden">Read {index + 1}</legend>
      <div className="grid grid-cols-2 items-end gap-x-4 sm:grid-cols-[1.2fr_1fr_1fr_1fr_1fr_auto]">
        <Field label="Meter" error={errors?.meter?.message} {...form.register(`reads.${index}.meter`)} />
        <SelectField label="Counts" {...form.register(`reads.${index}.channel`)}>
          <option value="import">bought</option>
          <option value="export">sent out</option>
          <option value="production">made</option>
        </SelectField>
        <Field
          label="Previous"
          inputMode="decimal"
          className="input-number"
          error={errors?.previous?.message}
          {...form.register(`reads.${index}.previous`)}
        />
        <Field
          label="Current"
          inputMode="decimal"
          className="input-number"
          error={errors?.current?.message}
          {...form.register(`reads.${index}.current`)}
        />
        <SelectField label="Read" {...form.register(`reads.${index}.type`)}>
          <option value="actual">actual</option>
          <option value="estimated">estimated</option>
        </SelectField>
        <button type="button" className="link hint min-h-11 text-left" onClick={onRemove}>
          Take out<span className="visually-hidden"> read {index + 1}</span>
        </button>
      </div>
    </fieldset>
  );
}

/** What the typed lines come to, held against the amount due in whole cents. */
export function Sum({ form }: { form: Form }) {
  const [lines, previousBalance, payments, due] = form.watch(['lines', 'previousBalance', 'payments', 'due']);
  const sum = runningSum({ lines: lines.filter((line) => !isUntouched(line)), previousBalance, payments, due });
  return (
    <p className="mt-4 border-t-4 border-double border-ink pt-2" aria-live="polite">
      The lines, balance and payments come to <b>{money(sum.linesCents)}</b>
      {sum.dueCents === null || sum.unread > 0 ? (
        <span className="hint"> so far.</span>
      ) : sum.dueCents === sum.linesCents ? (
        <span className="mark-ok ml-3">they add up to the amount due</span>
      ) : (
        <span className="mark-no ml-3">
          the amount due is {money(subtractCents(sum.dueCents, sum.linesCents))} away
        </span>
      )}
    </p>
  );
}
