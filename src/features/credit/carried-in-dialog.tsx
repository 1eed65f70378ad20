import type { CreditFacts } from '#shared/facts/finance.ts';
import { Choices, Field } from '#src/ui/field.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import { type CarriedInBody, usePutCarriedIn } from './credit-queries.ts';
import { type CarriedInValues, carriedInValues, readCarriedIn } from './credit-values.ts';

/** What a return before this record carried forward. */
export function CarriedInDialog({
  credit,
  householdId,
  onClose,
}: {
  credit: CreditFacts;
  householdId: string;
  onClose: () => void;
}) {
  const put = usePutCarriedIn(householdId);
  return (
    <SaveDialog<CarriedInValues, CarriedInBody>
      title="Carried in from before this record"
      hint="Where earlier returns are not entered here: line 16 of the last of them. It stands on line 12 of the first year of the list."
      defaults={carriedInValues(credit)}
      read={readCarriedIn}
      save={(body) => put.mutateAsync(body)}
      onClose={onClose}
    >
      {({ register, watch, setValue, formState: { errors } }) => (
        <>
          <Choices
            legend="Was something carried in?"
            name="has"
            value={watch('has')}
            onChange={(value) => setValue('has', value === 'yes' ? 'yes' : 'no', { shouldDirty: true })}
            options={[
              { value: 'no', label: 'No, every return with this credit is in the list' },
              { value: 'yes', label: 'Yes' },
            ]}
          />
          {watch('has') === 'yes' && (
            <>
              <Field
                label="Tax year of that return"
                inputMode="numeric"
                error={errors.taxYear?.message}
                {...register('taxYear')}
              />
              <Field
                label="Its line 16"
                unit="$"
                inputMode="decimal"
                error={errors.amountCents?.message}
                {...register('amountCents')}
              />
            </>
          )}
        </>
      )}
    </SaveDialog>
  );
}
