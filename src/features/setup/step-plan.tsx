import { zodResolver } from '@hookform/resolvers/zod';
import { useFieldArray, useForm } from 'react-hook-form';
import { type SetupView, setupApi } from '#shared/api/setup.ts';
import { useHousehold } from '#src/lib/household.ts';
import { fieldValue, textOf } from '#src/lib/typed-values.ts';
import { Field, TextArea } from '#src/ui/field.tsx';
import { AddRow, Columns, FormRow, Part } from '#src/ui/rows.tsx';
import { emptyEntry, entryOf, openingWith, type PlanEntries, planEntries, planOfEntry } from './plan-entries.ts';
import { planOf } from './plan-form.ts';
import { PlanQuestions } from './plan-questions.tsx';
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
  const unit = first?.written === 'questions' ? (first.form.exportRule === 'carried' ? 'kWh' : '$') : '';
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
          <>
            <Field
              label="Holds from"
              hint="It starts with the first cycle that begins on or after this day; cycles before the first plan use the first."
              type="date"
              className="max-w-[220px]"
              error={errors.plans?.[index]?.from?.message}
              {...form.register(`plans.${index}.from`, {
                onChange: (event: { target: { value: string } }) => {
                  // Prices have to hold from the plan's first day; later ones than that cannot be the first.
                  const first = form.getValues(`plans.${index}.form.prices.0.from`);
                  if (first === '' || event.target.value < first) {
                    form.setValue(`plans.${index}.form.prices.0.from`, event.target.value);
                  }
                },
              })}
            />
            {one.written === 'questions' ? (
              <PlanQuestions form={form} index={index} />
            ) : (
              <TextArea
                label="The plan, written as JSON"
                hint="This plan says more than the questions can. It is kept as it is; change or paste it here."
                rows={16}
                spellCheck={false}
                style={{ fontFamily: 'ui-monospace, monospace', fontSize: '14px' }}
                error={errors.plans?.[index]?.json?.message}
                {...form.register(`plans.${index}.json`)}
              />
            )}
            <p className="mt-4">
              <button
                type="button"
                className="link hint min-h-11"
                onClick={() => {
                  if (one.written === 'questions') {
                    form.setValue(`plans.${index}.json`, JSON.stringify(planOf(one.form, timeZone), null, 2));
                    form.setValue(`plans.${index}.written`, 'json', { shouldDirty: true });
                  } else {
                    form.setValue(`plans.${index}.written`, 'questions', { shouldDirty: true });
                  }
                }}
              >
                {one.written === 'questions' ? 'Write this plan as JSON instead' : 'Answer questions instead'}
              </button>
            </p>
            {one.withoutRoof !== '' && (
              <p className="hint">The plan this house would have without a roof is stated too, and kept.</p>
            )}
          </>
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
