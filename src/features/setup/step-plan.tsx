import { zodResolver } from '@hookform/resolvers/zod';
import { useFieldArray, useForm } from 'react-hook-form';
import { type SetupView, setupApi } from '#shared/api/setup.ts';
import { useHousehold } from '#src/lib/household.ts';
import { fieldValue, textOf } from '#src/lib/typed-values.ts';
import { Field } from '#src/ui/field.tsx';
import { emptyEntry, entryOf, ordinaryPlan, planOfEntry } from '#src/ui/plan-form/plan-entry.ts';
import { PlanEntryFields } from '#src/ui/plan-form/plan-entry-fields.tsx';
import { AddRow, Columns, FormRow, Part } from '#src/ui/rows.tsx';
import { openingWith, type PlanEntries, planEntries } from './plan-entries.ts';
import { StepForm } from './step-form.tsx';

export function PlanStep({ view }: { view: SetupView }) {
  const { canEdit } = useHousehold();
  const { timeZone, switchOn } = view.house;
  const firstBank = view.plans[0]?.plan.banks[0]?.id ?? null;
  const held = firstBank === null ? undefined : view.opening.banks[firstBank];
  // A balance by period or in lots is more than one field can say: it stays as it is.
  const openingIsPlain = held === undefined || typeof held === 'string';
  const form = useForm<PlanEntries, unknown, PlanEntries>({
    resolver: zodResolver(planEntries),
    mode: 'onTouched',
    defaultValues: {
      plans: view.plans.length === 0 ? [emptyEntry(switchOn ?? '')] : view.plans.map(entryOf),
      openingBank: typeof held === 'string' ? held : '',
      openingBalance: textOf.cents(view.opening.balanceCents),
    },
  });
  const plans = useFieldArray({ control: form.control, name: 'plans' });
  const { errors } = form.formState;
  const watched = form.watch('plans');
  const several = plans.fields.length > 1;
  const first = watched[0];
  const unit = first?.written === 'questions' ? (first.form.banks[0]?.unit === 'kWh' ? 'kWh' : '$') : '';
  return (
    <StepForm
      step="plan"
      form={form}
      endpoint={setupApi.plan}
      toBody={(values) => {
        const inForce = values.plans.map((one) => planOfEntry(one, timeZone));
        const bank = openingIsPlain ? (inForce[0]?.plan.banks[0]?.id ?? null) : null;
        const balance = fieldValue.centsOrNull(values.openingBalance);
        return { plans: inForce, opening: openingWith(view.opening, bank, values.openingBank, balance) };
      }}
    >
      {plans.fields.map((row, index) => {
        const one = watched[index];
        const body = one && (
          <PlanEntryFields
            entry={one}
            onChange={(entry) =>
              form.setValue(`plans.${index}`, entry, { shouldDirty: true, shouldValidate: form.formState.isSubmitted })
            }
            timeZone={timeZone}
            others={watched.flatMap((other, at) => {
              const plan = at === index ? null : ordinaryPlan(other, timeZone)?.plan;
              return plan ? [{ label: plan.name || `Plan ${at + 1}`, from: other.from, plan }] : [];
            })}
            showAll={form.formState.submitCount > 0}
            prefix={`plans.${index}`}
          />
        );
        return several ? (
          <FormRow key={row.id} title={`Plan ${index + 1}`} onRemove={() => plans.remove(index)}>
            {body}
          </FormRow>
        ) : (
          <div key={row.id}>{body}</div>
        );
      })}
      <Part
        title="Before the first cycle"
        hint="What the utility’s books held when the roof was switched on. Leave empty if the statement does not say."
      >
        <Columns>
          {openingIsPlain && (
            <Field
              label="Credit in the bank"
              inputMode="decimal"
              unit={unit}
              error={errors.openingBank?.message}
              {...form.register('openingBank')}
            />
          )}
          <Field
            label="Account balance"
            hint="Owed is positive, a credit negative."
            inputMode="text"
            unit="$"
            error={errors.openingBalance?.message}
            {...form.register('openingBalance')}
          />
        </Columns>
      </Part>
      {canEdit && (
        <Part
          title="Did the rules themselves change?"
          hint="New prices are a row above. Another way of crediting what you send out is a plan of its own."
        >
          <AddRow onClick={() => plans.append(emptyEntry(''))}>Add a plan that starts later</AddRow>
        </Part>
      )}
    </StepForm>
  );
}
