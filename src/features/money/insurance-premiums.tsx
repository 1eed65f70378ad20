import { useState } from 'react';
import { type UseFormReturn, useFieldArray } from 'react-hook-form';
import { fullDate, money } from '#src/lib/format.ts';
import { Field } from '#src/ui/field.tsx';
import { Fold } from '#src/ui/fold.tsx';
import { AddRow, Columns, FormRow } from '#src/ui/rows.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import type { InsuranceProps } from './insurance-props.ts';
import { type PremiumsBody, useMortgageChange } from './insurance-queries.ts';
import { type PremiumsValues, premiumsValues, readPremiums } from './insurance-values.ts';

/** The premium over time: the one it started with, and each later one from its day. */
export function InsurancePremiums(props: InsuranceProps) {
  const [editing, setEditing] = useState(false);
  const { facts } = props.view;
  const later = [...facts.premiums].sort((a, b) => (a.from < b.from ? -1 : 1));
  return (
    <Fold
      title="The premium over time"
      summary={later.length === 0 ? 'one premium' : `changed ${later.length === 1 ? 'once' : `${later.length} times`}`}
    >
      <ul className="border-t border-rule">
        <li className="flex justify-between gap-5 border-b border-rule py-2">
          <span>At the start</span>
          <span>{facts.insurance && money(facts.insurance.premiumMonthlyCents)}</span>
        </li>
        {later.map((one) => (
          <li key={one.from} className="flex justify-between gap-5 border-b border-rule py-2">
            <span>From {fullDate(one.from)}</span>
            <span>{money(one.premiumMonthlyCents)}</span>
          </li>
        ))}
      </ul>
      <p className="hint mt-2">
        Once the insurance is gone: what the premium would have been. Some contracts lower it with the balance or after
        ten years; the certificate of insurance says so.
      </p>
      {props.canEdit && (
        <p className="no-print mt-1">
          <button type="button" className="link min-h-11 sm:min-h-9" onClick={() => setEditing(true)}>
            Change the later premiums
          </button>
        </p>
      )}
      {editing && <PremiumsDialog {...props} onClose={() => setEditing(false)} />}
    </Fold>
  );
}

function PremiumsDialog({ view, householdId, today, onClose }: InsuranceProps & { onClose: () => void }) {
  const change = useMortgageChange(householdId);
  const premium = view.facts.insurance?.premiumMonthlyCents;
  return (
    <SaveDialog<PremiumsValues, PremiumsBody>
      title="The premium over time"
      hint={`${premium === undefined ? '' : `It started at ${money(premium)} a month. `}Add each later premium with the day it begins.`}
      defaults={premiumsValues(view.facts)}
      read={readPremiums}
      save={(body) => change.mutateAsync({ kind: 'putPremiums', body })}
      onClose={onClose}
    >
      {(form) => <PremiumRows form={form} today={today} />}
    </SaveDialog>
  );
}

function PremiumRows({ form, today }: { form: UseFormReturn<PremiumsValues>; today: string }) {
  const rows = useFieldArray({ control: form.control, name: 'premiums' });
  const { errors } = form.formState;
  return (
    <>
      {rows.fields.map((row, index) => (
        <FormRow key={row.id} title={`Premium ${index + 1}`} onRemove={() => rows.remove(index)}>
          <Columns>
            <Field
              label="From"
              type="date"
              error={errors.premiums?.[index]?.from?.message}
              {...form.register(`premiums.${index}.from`)}
            />
            <Field
              label="A month"
              unit="$"
              inputMode="decimal"
              error={errors.premiums?.[index]?.premiumMonthlyCents?.message}
              {...form.register(`premiums.${index}.premiumMonthlyCents`)}
            />
          </Columns>
        </FormRow>
      ))}
      <AddRow onClick={() => rows.append({ from: today, premiumMonthlyCents: '' })}>Add a premium</AddRow>
    </>
  );
}
